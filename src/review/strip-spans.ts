import type { Span } from '../recording/span';

/** The leads whose rhythm and beats the strip shows, by key. */
export interface StripLeads {
  readonly stomach: string | null;
  readonly heart: string | null;
}

/** Spans as they act on what the strip shows: the reported lead's stomach row and the heart lead's rate; others left out. */
export function stripSpans(
  spans: readonly Span[],
  { stomach, heart }: StripLeads,
): readonly Span[] {
  return spans.flatMap((span): readonly Span[] => {
    const on = (lead: string | null) => span.lead === null || span.lead === lead;
    const forStomach = span.target !== 'heart' && on(stomach);
    const forHeart = span.target !== 'stomach' && on(heart);
    if (!forStomach && !forHeart) return [];
    const target = forStomach && forHeart ? 'both' : forStomach ? 'stomach' : 'heart';
    return [{ ...span, target }];
  });
}
