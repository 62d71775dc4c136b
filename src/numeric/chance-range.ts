import { type BlockDraws, blockReplicates, sumReplicates } from './block-bootstrap';
import { exp, log } from './elementary';
import { blockVariance, cosineDegrees, cosineVariance } from './long-run-variance';
import { createRandom } from './random';
import { standardDeviation } from './statistics';
import { studentT95 } from './student-t';

/** A range in the unit of the figure it belongs to. */
export interface Range {
  readonly low: number;
  readonly high: number;
}

/** A range by chance; `degrees` of freedom of Student's t in it, null where there is no t in it. */
export interface ChanceRange extends Range {
  readonly degrees: number | null;
}

/** On what scale chance moves a figure alike to both sides; percentages on that of the log-odds. */
export type ChanceScale = 'linear' | 'log' | 'percent';

/** Things in order, as the bootstrap draws them. */
export interface Ordered {
  readonly count: number;
  /** Neighbours drawn together: those that share samples, or hang together by breathing. */
  readonly blockLength: number;
  /** Minutes that they span. */
  readonly minutes: number;
}

/** A figure as a function of what is drawn. */
export type Drawable =
  | {
      readonly kind: 'sums';
      readonly above: Float64Array;
      readonly below: Float64Array;
      readonly figure: (above: number, below: number) => number;
    }
  | {
      readonly kind: 'places';
      readonly figure: (places: Int32Array) => number;
      /** What each thing adds to the figure, to first order and up to a factor. */
      readonly influence: Float64Array;
    };

const REPLICATES = 300;
/** The spread of very many things is found as well with fewer replicates. */
const FEWER_REPLICATES = 100;
const MANY = 1000;
const RANDOM = 1;
const FEWEST_TERMS = 3;
/** A range of a figure above 0 whose ends differ by more than this factor says nothing. */
const WIDEST_FACTOR = 20;

/** How many cosines the slow movement of so many minutes is measured by. */
export const termsFor = (minutes: number): number =>
  Math.max(FEWEST_TERMS, Math.round(FEWEST_TERMS * Math.sqrt(minutes / 30)));

const toScale: Readonly<Record<ChanceScale, (value: number) => number>> = {
  linear: (value) => value,
  log,
  percent: (value) => log(value / (100 - value)),
};
const fromScale: Readonly<Record<ChanceScale, (value: number) => number>> = {
  linear: (value) => value,
  log: exp,
  percent: (value) => 100 / (1 + exp(-value)),
};

/** A range that reaches so far to both sides of a figure on a scale. */
export function rangeAbout(value: number, half: number, scale: ChanceScale): Range {
  const centre = toScale[scale](value);
  return { low: fromScale[scale](centre - half), high: fromScale[scale](centre + half) };
}

function influenceOf(from: Drawable): Float64Array {
  if (from.kind === 'places') return from.influence;
  const { above, below } = from;
  let [a, b] = [0, 0];
  for (let i = 0; i < above.length; i += 1) {
    a += above[i];
    b += below[i];
  }
  const ratio = a / b;
  return above.map((value, i) => value - ratio * below[i]);
}

/**
 * The nominal 95 % range by chance of a figure; null where too little is there or nothing moves. Its spread is that of the
 * moving-block bootstrap (Kuensch 1989; fixed seed), which misses what moves more slowly than a block: so it is stretched by
 * how much more the first few cosines across the whole length hold than the blocks do (`cosineVariance`), and taken with
 * Student's t for the degrees of freedom that they have.
 */
export function chanceRange(
  from: Drawable,
  value: number,
  { count, blockLength, minutes }: Ordered,
  scale: ChanceScale,
): ChanceRange | null {
  const terms = termsFor(minutes);
  if (count < 2 * blockLength || count <= terms + 1) return null;
  const influence = influenceOf(from);
  const blocks = blockVariance(influence, blockLength);
  const draws: BlockDraws = {
    count,
    blockLength,
    replicates: count > MANY && from.kind === 'places' ? FEWER_REPLICATES : REPLICATES,
    random: createRandom(RANDOM),
  };
  const to = toScale[scale];
  const replicates =
    from.kind === 'sums'
      ? sumReplicates(draws, from.above, from.below, (a, b) => to(from.figure(a, b)))
      : blockReplicates(draws, (places) => to(from.figure(places)));
  const degrees = cosineDegrees(terms);
  const stretch = Math.sqrt(cosineVariance(influence, terms) / blocks);
  const half = studentT95(degrees) * stretch * standardDeviation(replicates);
  const range = rangeAbout(value, half, scale);
  const finite = half > 0 && Number.isFinite(range.low) && Number.isFinite(range.high);
  const told = finite && (scale !== 'log' || range.high <= WIDEST_FACTOR * range.low);
  return told ? { ...range, degrees } : null;
}

/** A figure with its range. */
export interface Ranged extends ChanceRange {
  readonly value: number;
}

/**
 * Range of `after` less `before`, of two that know nothing of each other, from the range of each (Zou and Donner 2008; for
 * Wilson's ranges of two shares it is Newcombe's tenth method, 1998); degrees of freedom of both together after Welch 1947.
 */
export function differenceRange(before: Ranged, after: Ranged): ChanceRange {
  const change = after.value - before.value;
  const down = together(after.value - after.low, after, before.high - before.value, before);
  const up = together(after.high - after.value, after, before.value - before.low, before);
  return { low: change - down, high: change + up, degrees: before.degrees };
}

function together(a: number, { degrees: ofA }: Ranged, b: number, { degrees: ofB }: Ranged) {
  if (ofA === null || ofB === null) return Math.hypot(a, b);
  const [va, vb] = [(a / studentT95(ofA)) ** 2, (b / studentT95(ofB)) ** 2];
  const degrees = (va + vb) ** 2 / (va ** 2 / ofA + vb ** 2 / ofB);
  return studentT95(degrees) * Math.sqrt(va + vb);
}
