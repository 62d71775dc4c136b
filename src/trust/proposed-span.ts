import type { Span } from '../recording/span';

/** A spoiled span as the program proposes it; whoever keeps the list of spans gives it its number. */
export type ProposedSpan = Omit<Span, 'id'>;
