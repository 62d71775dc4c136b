import type { DecidedCell, TwoSums } from '../numeric/extreme-ratio';
import { extremeRatio } from '../numeric/extreme-ratio';
import type { HeartSegment, RrSeries } from '../recording/heart-series';
import { type Interval, isWithin } from '../recording/span';
import { decidedAbout, mendedBy, reaches, type Undecided } from './decisions';
import { rrSeries } from './rr-series';

/** More decisions than this beside one another are too many to try. */
const MOST_BESIDE = 10;

/** Sums over the intervals of a stretch that figures are ratios of. */
interface Sums {
  nn: number;
  ms: number;
  pairs: number;
  squares: number;
  over50: number;
}

const none = (): Sums => ({ nn: 0, ms: 0, pairs: 0, squares: 0, over50: 0 });

/** A stretch of time in which figures feel the same decisions, with its sums for each way of taking them. */
interface Cell extends Interval {
  readonly decisions: readonly number[];
  readonly sums: readonly Sums[];
}

/** A figure that is a function of the ratio of two sums, growing with it. */
interface RatioFigure {
  readonly above: keyof Sums;
  readonly below: keyof Sums;
  readonly figure: (ratio: number) => number;
  /** True where it falls as the ratio grows. */
  readonly falls?: boolean;
}

const RATIO_FIGURES: Readonly<Record<string, RatioFigure>> = {
  heart_rate_bpm: { above: 'ms', below: 'nn', figure: (ms) => 60000 / ms, falls: true },
  nn_mean_ms: { above: 'ms', below: 'nn', figure: (ms) => ms },
  rmssd_ms: { above: 'squares', below: 'pairs', figure: Math.sqrt },
  pnn50_pct: { above: 'over50', below: 'pairs', figure: (share) => 100 * share },
};

/** Adds what ends in [fromS, toS) to some sums: intervals wholly in the part, pairs of them outside `irregular`. */
function addSums(
  into: Sums,
  { timesS, rrMs, nn }: RrSeries,
  { fromS, toS }: Interval,
  part: Interval,
  irregular: readonly Interval[],
): Sums {
  const inPart = (i: number) =>
    timesS[i] - rrMs[i] / 1000 >= part.fromS - 1e-9 && timesS[i] < part.toS;
  const counts = (i: number) => nn[i] === 1 && !isWithin(timesS[i], irregular);
  for (let i = 0; i < timesS.length; i += 1) {
    if (timesS[i] < fromS || timesS[i] >= toS || nn[i] !== 1 || !inPart(i)) continue;
    into.nn += 1;
    into.ms += rrMs[i];
    if (i === 0 || !inPart(i - 1) || !counts(i) || !counts(i - 1)) continue;
    const step = rrMs[i] - rrMs[i - 1];
    into.pairs += 1;
    into.squares += step * step;
    if (Math.abs(step) > 50 + 1e-9) into.over50 += 1;
  }
  return into;
}

/** Stretches that feel the same decisions, in order; those that feel none are left out. */
function laidCells(
  undecided: Undecided,
  part: Interval,
): readonly (Interval & { decisions: readonly number[] })[] {
  const felt = reaches(undecided);
  const borders = [...new Set(felt.flatMap(({ fromS, toS }) => [fromS, toS]))].sort(
    (a, b) => a - b,
  );
  return borders.slice(0, -1).flatMap((fromS, k) => {
    const toS = borders[k + 1];
    const decisions = felt.flatMap((one, j) => (one.fromS <= fromS && one.toS >= toS ? [j] : []));
    const outside = toS <= part.fromS || fromS >= part.toS;
    return decisions.length === 0 || outside ? [] : [{ fromS, toS, decisions }];
  });
}

export interface ExtremesOfSums {
  /** Lowest and highest of mean NN, heart rate, RMSSD and pNN50, by key. */
  readonly figures: Readonly<Record<string, { readonly low: number; readonly high: number }>>;
}

/**
 * The lowest and highest that heart rate, mean NN, RMSSD and pNN50 of a part can be over all ways of deciding, exact for the
 * segments being irregular that are: what decisions do is tried out where they lie, in every combination of those felt
 * together, and the extreme ratios of the sums are found from that. Yields after each stretch; null where more than ten
 * decisions are felt at once.
 */
export function* extremesOfSums(
  undecided: Undecided,
  rr: RrSeries,
  part: Interval,
  segments: readonly HeartSegment[],
): Generator<number, ExtremesOfSums['figures'] | null> {
  const irregular = segments.filter(({ state }) => state === 'irregular');
  const laid = laidCells(undecided, part);
  if (laid.some(({ decisions }) => decisions.length > MOST_BESIDE)) return null;
  const cells: Cell[] = [];
  const fixed = addSums(none(), rr, part, part, irregular);
  for (const one of laid) {
    const sums = Array.from({ length: 1 << one.decisions.length }, (_, mask) => {
      const mended = mendedBy(mask, one.decisions);
      const { beats, blocked } = decidedAbout(undecided, one, one.decisions, mended);
      return addSums(none(), rrSeries(beats, undecided.rateHz, blocked), one, part, irregular);
    });
    for (const key of Object.keys(fixed) as (keyof Sums)[]) fixed[key] -= sums[0][key];
    cells.push({ ...one, sums });
    yield cells.length / laid.length;
  }
  return Object.fromEntries(
    Object.entries(RATIO_FIGURES).map(([key, one]) => [key, extremesOf(fixed, cells, one)]),
  );
}

function extremesOf(
  fixed: Sums,
  cells: readonly Cell[],
  { above, below, figure, falls }: RatioFigure,
) {
  const sums: TwoSums = { above: fixed[above], below: fixed[below] };
  const tables = cells.map(
    (cell): DecidedCell => ({
      decisions: cell.decisions,
      above: Float64Array.from(cell.sums, (one) => one[above]),
      below: Float64Array.from(cell.sums, (one) => one[below]),
    }),
  );
  const least = figure(extremeRatio(sums, tables, -1));
  const most = figure(extremeRatio(sums, tables, 1));
  return falls ? { low: most, high: least } : { low: least, high: most };
}
