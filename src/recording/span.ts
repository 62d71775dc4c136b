import type { Seconds } from '../units/time';

export const SPAN_CAUSES = [
  'talk',
  'move',
  'cough',
  'eat',
  'electrode',
  'flat',
  'rail',
  'step',
  'burst',
  'gap',
  'other',
] as const;
export type SpanCause = (typeof SPAN_CAUSES)[number];

/** Whose figures a spoiled span is kept out of. */
export const SPAN_TARGETS = ['stomach', 'heart', 'both'] as const;
export type SpanTarget = (typeof SPAN_TARGETS)[number];

/** A stretch excluded by a reviewer (`drawn`) or by the program (`proposed`: it acts until a person takes it away). */
export interface Span {
  /** Unique within the session, never used again. */
  readonly id: number;
  readonly fromS: Seconds;
  readonly toS: Seconds;
  /** Key of the lead it spoils; null: all leads. */
  readonly lead: string | null;
  readonly target: SpanTarget;
  readonly cause: SpanCause;
  readonly origin: 'proposed' | 'drawn';
  readonly note: string;
}

/** Spans that act on one lead's figures for one organ. */
export function spansOf(
  spans: readonly Span[],
  lead: string,
  organ: 'stomach' | 'heart',
): readonly Span[] {
  return spans.filter(
    (span) =>
      (span.lead === null || span.lead === lead) &&
      (span.target === 'both' || span.target === organ),
  );
}

export interface Interval {
  readonly fromS: Seconds;
  readonly toS: Seconds;
}

/** Whether a time lies in one of the intervals; each holds its start and not its end. */
export const isWithin = (atS: Seconds, intervals: readonly Interval[]): boolean =>
  intervals.some(({ fromS, toS }) => atS >= fromS && atS < toS);

/** Overlapping and touching intervals joined, in ascending order; empty ones left out. */
export function joinIntervals(intervals: readonly Interval[]): readonly Interval[] {
  const sorted = intervals.filter((one) => one.toS > one.fromS).sort((a, b) => a.fromS - b.fromS);
  const joined: { fromS: number; toS: number }[] = [];
  for (const { fromS, toS } of sorted) {
    const last = joined.at(-1);
    if (last && fromS <= last.toS) last.toS = Math.max(last.toS, toS);
    else joined.push({ fromS, toS });
  }
  return joined;
}

/** Seconds of [fromS, toS) that the intervals cover, overlaps counted once. */
export function coveredSeconds(
  intervals: readonly Interval[],
  fromS: Seconds,
  toS: Seconds,
): Seconds {
  return joinIntervals(intervals).reduce(
    (sum, one) => sum + Math.max(0, Math.min(one.toS, toS) - Math.max(one.fromS, fromS)),
    0,
  );
}

/** What is left of some intervals where others are taken away, ascending and without overlap. */
export function withoutIntervals(
  intervals: readonly Interval[],
  taken: readonly Interval[],
): readonly Interval[] {
  const gone = joinIntervals(taken);
  return joinIntervals(intervals).flatMap(({ fromS, toS }) => {
    const left: Interval[] = [];
    let at = fromS;
    for (const one of gone) {
      if (one.toS <= at || one.fromS >= toS) continue;
      if (one.fromS > at) left.push({ fromS: at, toS: one.fromS });
      at = Math.max(at, one.toS);
    }
    return at < toS ? [...left, { fromS: at, toS }] : left;
  });
}
