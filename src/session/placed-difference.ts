import type { Interval } from '../recording/span';

/** How two reviews differ at a place. */
export const PLACED_KINDS = ['only-here', 'only-there', 'class', 'moved', 'span'] as const;
export type PlacedKind = (typeof PLACED_KINDS)[number];

/** One place that two reviews do not agree on. */
export interface PlacedDifference {
  readonly kind: PlacedKind;
  readonly what: string;
  readonly here: string;
  readonly there: string;
  readonly place: Interval;
  /** The beat of this review that stands there; null where none does. */
  readonly tick: number | null;
}
