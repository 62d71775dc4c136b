import type { DoubtsRange } from '../recording/evidence/ranges';
import { type Figures, numberOf } from '../recording/figure';
import type { BreathingSeries, RrSeries } from '../recording/heart-series';
import type { Phase } from '../recording/phase';
import type { Settings } from '../recording/settings';
import { decidedAbout, mendedBy, reaches, type Undecided } from './decisions';
import { heartFigures } from './heart-figures';
import { rrSeries } from './rr-series';
import type { SegmentResult } from './segments';
import { extremesOfSegments, type UndecidedSegment, undecidedSegments } from './undecided-segments';
import { extremesOfSums } from './undecided-sums';

/** Figures that a segment turning irregular changes though no interval of theirs is decided. */
const OF_REGULAR = ['rmssd_ms', 'pnn50_pct'] as const;

export interface DoubtRangesInput {
  readonly undecided: Undecided;
  /** The series of the beats as they stand. */
  readonly rr: RrSeries;
  readonly part: Phase;
  readonly settings: Settings;
  /** The part's figures as printed. */
  readonly figures: Figures;
  readonly timingSdMs: number;
  readonly breathing: BreathingSeries;
  /** Segments tried before, for the same beats and decisions. */
  readonly known: Map<string, SegmentResult>;
}

/**
 * Where a part's heart figures may lie if every open decision is taken one way or the other, by key; empty where no decision
 * reaches the part. Yields how far it is.
 */
export function* heartDoubtRanges(
  input: DoubtRangesInput,
): Generator<number, Readonly<Record<string, DoubtsRange>>> {
  const { undecided, rr, part, settings, figures, known } = input;
  const doubts = reaches(undecided).filter(
    ({ fromS, toS }) => fromS < part.toS && toS > part.fromS,
  ).length;
  if (doubts === 0) return {};
  const segments = yield* undecidedSegments(undecided, part, settings.variability, known);
  const sums = yield* extremesOfSums(
    undecided,
    rr,
    part,
    segments.map(({ stands }) => stands.shown),
  );
  const turned = segments.flatMap(turnedBy);
  const told: [string, DoubtsRange][] = Object.entries(extremesOfSegments(segments)).map(
    ([key, range]) => [key, { ...range, doubts }],
  );
  for (const [key, range] of Object.entries(sums ?? {}))
    told.push([key, { ...range, exact: turned.length === 0 || !isOfRegular(key), doubts }]);
  const ranges = new Map(told);
  for (const mended of turned) {
    widen(ranges, figuresAfter(input, mended));
    yield 1;
  }
  return Object.fromEntries(
    [...ranges].filter(
      ([key, { low, high }]) =>
        figures[key]?.kind !== 'withheld' && Number.isFinite(low) && Number.isFinite(high),
    ),
  );
}

const isOfRegular = (key: string): boolean => OF_REGULAR.some((one) => one === key);

/** Decisions, alone or together, that turn a segment irregular or regular. */
function turnedBy({
  decisions,
  stands,
  tried,
  all,
}: UndecidedSegment): readonly (readonly number[])[] {
  const isIrregular = ({ shown }: SegmentResult) => shown.state === 'irregular';
  return tried.flatMap((segment, k) => {
    if (isIrregular(segment) === isIrregular(stands)) return [];
    return [all ? mendedBy(k, decisions) : [decisions[k - 1]]];
  });
}

function figuresAfter(input: DoubtRangesInput, mended: readonly number[]): Figures {
  const { undecided, part, settings, timingSdMs, breathing } = input;
  const { rateHz } = undecided;
  const { beats, blocked } = decidedAbout(undecided, part, mended, mended);
  const rr = rrSeries(beats, rateHz, blocked);
  return heartFigures({ rr, beats, rateHz, part, blocked, settings, timingSdMs, breathing })
    .figures;
}

function widen(ranges: Map<string, DoubtsRange>, figures: Figures): void {
  for (const key of OF_REGULAR) {
    const range = ranges.get(key);
    const value = figures[key] ? numberOf(figures[key]) : Number.NaN;
    if (!range || Number.isNaN(value)) continue;
    const [low, high] = [Math.min(range.low, value), Math.max(range.high, value)];
    ranges.set(key, { ...range, low, high });
  }
}
