import {
  type ChanceRange,
  type ChanceScale,
  chanceRange,
  type Ordered,
  rangeAbout,
} from '../numeric/chance-range';
import { quietly } from '../numeric/in-steps';
import { median, wilson } from '../numeric/statistics';
import { type Figures, numberOf } from '../recording/figure';
import type { BreathingSeries } from '../recording/heart-series';
import type { Phase } from '../recording/phase';
import { BREATHING_STEP_S } from './breathing-peak';
import { type HeartFiguresInput, partOfHeart } from './heart-figures';

import { judgedSegments, type PartOfHeart } from './part';
import type { SegmentResult } from './segments';

/** About a minute of beats: what is drawn together keeps breathing and slower swings. */
const BLOCK = 60;
const FEWEST_BLOCKS = 4;
/** Segments that scatter enough to say so; of fewer only what a spectrum's own noise does is told. */
const FEWEST_SEGMENTS = 5;
const Z95 = 1.959963984540054;
/** Windows of the breathing rate that share samples. */
const BREATHING_BLOCK = 4;
const FEWEST_WINDOWS = 10;

export interface HeartRangesInput extends HeartFiguresInput {
  /** The part's figures as printed. */
  readonly figures: Figures;
}

type Told = readonly [key: string, range: ChanceRange | null];

/**
 * Nominal 95 % ranges by chance of a part's heart figures, by key; a figure of which none can be told is not there. Intervals
 * are drawn in blocks of about a minute, LF and HF by segments (`chanceRange`); of fewer than five segments the range of a
 * power is that of its degrees of freedom alone, twice bandwidth times length (Bendat and Piersol 1971). A figure a step.
 */
export function* heartChanceRanges(
  input: HeartRangesInput,
): Generator<number, Readonly<Record<string, ChanceRange>>> {
  const heart = yield* quietly(partOfHeart(input), 0);
  const { figures } = input;
  const groups = [rateRanges, stepRanges, spreadRanges, powerRanges];
  const told: [string, ChanceRange][] = [];
  for (const [place, rangesOf] of groups.entries())
    for (const [key, range] of rangesOf(heart, figures)) {
      if (range && figures[key] && figures[key].kind !== 'withheld') told.push([key, range]);
      yield (place + 1) / groups.length;
    }
  return Object.fromEntries(told);
}

const ones = (count: number) => new Float64Array(count).fill(1);

/** The range of a figure that is a function of the mean of some values, one an interval. */
function ofMean(
  values: Float64Array,
  minutes: number,
  value: number,
  figure: (mean: number) => number,
  scale: ChanceScale = 'log',
): ChanceRange | null {
  const count = values.length;
  if (count < FEWEST_BLOCKS * BLOCK || Number.isNaN(value)) return null;
  return chanceRange(
    { kind: 'sums', above: values, below: ones(count), figure: (sum, n) => figure(sum / n) },
    value,
    { count, blockLength: BLOCK, minutes },
    scale,
  );
}

function* rateRanges({ rr, first, end, allTime }: PartOfHeart, figures: Figures): Generator<Told> {
  const nn = rr.rrMs.slice(first, end).filter((_, i) => rr.nn[first + i] === 1);
  const minutes = allTime.nnSeconds / 60;
  const range = (key: string, figure: (mean: number) => number): Told => [
    key,
    ofMean(nn, minutes, numberOf(figures[key]), figure),
  ];
  yield range('heart_rate_bpm', (mean) => 60000 / mean);
  yield range('nn_mean_ms', (mean) => mean);
}

/** Steps between neighbouring intervals that variability figures stand on. */
function stepsOf({ rr, first, end, regular }: PartOfHeart): Float64Array {
  const steps: number[] = [];
  for (let i = first + 1; i < end; i += 1)
    if (regular[i] === 1 && regular[i - 1] === 1) steps.push(rr.rrMs[i] - rr.rrMs[i - 1]);
  return Float64Array.from(steps);
}

function* stepRanges(heart: PartOfHeart, figures: Figures): Generator<Told> {
  const steps = stepsOf(heart);
  const minutes = heart.regularTime.nnSeconds / 60;
  const mean = steps.reduce((sum, step) => sum + step, 0) / steps.length;
  const about = steps.map((step) => (step - mean) ** 2);
  const range = (key: string, values: Float64Array, figure: (mean: number) => number): Told => [
    key,
    ofMean(values, minutes, numberOf(figures[key]), figure),
  ];
  yield range(
    'rmssd_ms',
    steps.map((step) => step * step),
    Math.sqrt,
  );
  yield range('sdsd_ms', about, Math.sqrt);
  yield range('sd1_ms', about, (square) => Math.sqrt(square / 2));
  yield ['pnn50_pct', shareOver50(steps, minutes, numberOf(figures.pnn50_pct))];
}

/** Where no step, or every one, is over 50 ms nothing scatters: Wilson's range with a look a minute then. */
function shareOver50(steps: Float64Array, minutes: number, value: number): ChanceRange | null {
  if (!(value <= 0 || value >= 100)) {
    const over = steps.map((step) => (Math.abs(step) > 50 + 1e-9 ? 1 : 0));
    return ofMean(over, minutes, value, (share) => 100 * share, 'percent');
  }
  if (steps.length < FEWEST_BLOCKS * BLOCK) return null;
  const { low, high } = wilson((minutes * value) / 100, minutes);
  return { low: 100 * low, high: 100 * high, degrees: null };
}

/** Squares about the mean of each segment, of those whose SDNN is averaged. */
function squaresInSegments(
  { rr }: PartOfHeart,
  segments: readonly SegmentResult[],
): { readonly squares: Float64Array; readonly minutes: number } {
  const squares: number[] = [];
  let ms = 0;
  for (const { first, end } of segments) {
    const own = rr.rrMs.slice(first, end).filter((_, i) => rr.nn[first + i] === 1);
    const sum = own.reduce((total, one) => total + one, 0);
    for (const one of own) squares.push((one - sum / own.length) ** 2);
    ms += sum;
  }
  return { squares: Float64Array.from(squares), minutes: ms / 60000 };
}

function* spreadRanges(heart: PartOfHeart, figures: Figures): Generator<Told> {
  const { rr, first, end, regular, regularTime } = heart;
  const carried = judgedSegments(heart).filter(({ full, shown }) => full && shown.sdnnMs !== null);
  const { squares, minutes } = squaresInSegments(heart, carried);
  const whole: number[] = [];
  const along: number[] = [];
  for (let i = first; i < end; i += 1) {
    if (regular[i] !== 1) continue;
    const square = (rr.rrMs[i] - regularTime.meanMs) ** 2;
    const paired = i > first && regular[i - 1] === 1;
    const step = paired ? (rr.rrMs[i] - rr.rrMs[i - 1]) ** 2 : regularTime.sdsdMs ** 2;
    whole.push(square);
    along.push(2 * square - step / 2);
  }
  const inAll = regularTime.nnSeconds / 60;
  const range = (key: string, values: ArrayLike<number>, over: number): Told => [
    key,
    ofMean(Float64Array.from(values), over, numberOf(figures[key]), Math.sqrt),
  ];
  yield range('sdnn_ms', squares, minutes);
  yield range('sdnn_whole_ms', whole, inAll);
  yield range('sd2_ms', along, inAll);
}

/** What a power figure is made of in each segment, and how wide its band or bands are. */
interface OfPower {
  readonly above: (segment: SegmentResult) => number | null;
  /** Null where it is averaged over segments. */
  readonly below: ((segment: SegmentResult) => number | null) | null;
  readonly figure: (above: number, below: number) => number;
  readonly scale: ChanceScale;
  readonly widthsHz: readonly number[];
}

function powersOf({ lfHz, hfHz }: PartOfHeart['settings']): Readonly<Record<string, OfPower>> {
  const [lfWidth, hfWidth] = [lfHz[1] - lfHz[0], hfHz[1] - hfHz[0]];
  const lf = ({ shown }: SegmentResult) => shown.lfMs2;
  const hf = ({ shown }: SegmentResult) => shown.hfMs2;
  const both = { above: lf, below: hf, widthsHz: [lfWidth, hfWidth] };
  const power = (above: OfPower['above'], widthHz: number): OfPower => ({
    above,
    below: null,
    figure: (sum, n) => sum / n,
    scale: 'log',
    widthsHz: [widthHz],
  });
  return {
    lf_ms2: power(lf, lfWidth),
    hf_ms2: power(hf, hfWidth),
    lf_welch_ms2: power((segment) => segment.lfWelchMs2, lfWidth),
    hf_welch_ms2: power((segment) => segment.hfWelchMs2, hfWidth),
    lf_hf_ratio: { ...both, figure: (a, b) => a / b, scale: 'log' },
    lf_nu_pct: { ...both, figure: (a, b) => (100 * a) / (a + b), scale: 'percent' },
    hf_nu_pct: { ...both, figure: (a, b) => (100 * b) / (a + b), scale: 'percent' },
  };
}

function* powerRanges(heart: PartOfHeart, figures: Figures): Generator<Told> {
  const segments = judgedSegments(heart).filter(
    ({ shown }) => shown.lfMs2 !== null || shown.hfMs2 !== null,
  );
  const seconds = segments.reduce((sum, { shown }) => sum + shown.toS - shown.fromS, 0);
  for (const [key, power] of Object.entries(powersOf(heart.settings))) {
    const value = numberOf(figures[key]);
    if (Number.isNaN(value) || seconds === 0) continue;
    yield [
      key,
      segments.length < FEWEST_SEGMENTS
        ? byFreedom(seconds, power, value)
        : bySegments(segments, power, value),
    ];
  }
}

function byFreedom(seconds: number, { widthsHz, scale }: OfPower, value: number): ChanceRange {
  const variance = widthsHz.reduce((sum, hz) => sum + 1 / (hz * seconds), 0);
  return { ...rangeAbout(value, Z95 * Math.sqrt(variance), scale), degrees: null };
}

function bySegments(
  segments: readonly SegmentResult[],
  { above, below, figure, scale }: OfPower,
  value: number,
): ChanceRange | null {
  const carried = segments.filter(
    (one) => above(one) !== null && (below === null || below(one) !== null),
  );
  const count = carried.length;
  if (count < FEWEST_SEGMENTS) return null;
  const ordered: Ordered = {
    count,
    blockLength: 1,
    minutes: carried.reduce((sum, { shown }) => sum + (shown.toS - shown.fromS) / 60, 0),
  };
  return chanceRange(
    {
      kind: 'sums',
      above: Float64Array.from(carried, (one) => above(one) ?? Number.NaN),
      below: below ? Float64Array.from(carried, (one) => below(one) ?? Number.NaN) : ones(count),
      figure,
    },
    value,
    ordered,
    scale,
  );
}

/** The same for a part's breathing rate, from its windows; null where too few tell. */
export function breathingChanceRange(
  { centresS, perMinute }: BreathingSeries,
  part: Phase,
  value: number,
): ChanceRange | null {
  const told = perMinute.filter(
    (rate, i) => centresS[i] >= part.fromS && centresS[i] < part.toS && !Number.isNaN(rate),
  );
  const count = told.length;
  if (count < FEWEST_WINDOWS || Number.isNaN(value)) return null;
  const middle = median(told);
  const drawn = new Float64Array(count);
  return chanceRange(
    {
      kind: 'places',
      figure: (places) => {
        for (let i = 0; i < count; i += 1) drawn[i] = told[places[i]];
        return median(drawn);
      },
      influence: told.map((rate) => Math.sign(rate - middle)),
    },
    value,
    { count, blockLength: BREATHING_BLOCK, minutes: (count * BREATHING_STEP_S) / 60 },
    'linear',
  );
}
