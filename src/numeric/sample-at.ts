import { idealLowPass, kaiserAt, kaiserBeta, kaiserTaps } from './windows';

export interface InstantSamplerOptions {
  readonly rateHz: number;
  readonly outputRateHz: number;
  /** Gain 1 up to passHz, below -attenuationDb from stopHz; the -6 dB point is midway. */
  readonly passHz: number;
  readonly stopHz: number;
  readonly attenuationDb: number;
}

/** A low-pass evaluated at the output's own instants while the input runs by. */
export interface InstantSampler {
  /** Takes the next samples, any number of them; NaN marks one that is missing. */
  push(block: Float64Array): void;
  /** Ends the input and gives all outputs. */
  finish(): Float64Array;
}

/** A ratio of whole numbers, or null where none with a small denominator is exact enough. */
interface Ratio {
  readonly over: number;
  readonly under: number;
}

/** Ratios with larger denominators count as irrational. */
const MOST_PHASES = 1024;
/** Weights kept at most; where all phases have more, they are interpolated between fewer rows. */
const MOST_WEIGHTS = 2_000_000;
/**
 * Rows per input sample of the interpolated table: a weight is within 1e-9 of the largest, but for
 * the outermost, where the window ends in a step.
 */
const FINE_PHASES = 256;

/** Continued fraction of x, to the precision of a double; Hardy & Wright 1938, chapter 10. */
function ratioOf(x: number, mostUnder: number): Ratio | null {
  let rest = x;
  let [overBefore, over] = [1, Math.floor(x)];
  let [underBefore, under] = [0, 1];
  while (Math.abs(over / under - x) > 1e-14 * x) {
    rest = 1 / (rest - Math.floor(rest));
    const whole = Math.floor(rest);
    [overBefore, over] = [over, whole * over + overBefore];
    [underBefore, under] = [under, whole * under + underBefore];
    if (!(under <= mostUnder)) return null;
  }
  return { over, under };
}

/**
 * How many instants k / outputRateHz lie at or before the last of `sampleCount` samples.
 * Whole seconds at a rate of at least outputRateHz give exactly outputRateHz a second.
 */
export function instantCount(sampleCount: number, rateHz: number, outputRateHz: number): number {
  if (sampleCount < 1) return 0;
  const ratio = ratioOf(rateHz / outputRateHz, MOST_PHASES);
  const last = sampleCount - 1;
  return ratio
    ? Math.floor((last * ratio.under) / ratio.over) + 1
    : Math.floor((last * outputRateHz) / rateHz) + 1;
}

/** Weights for one output: `weights[j]` belongs to input sample first + j. */
interface Row {
  readonly first: number;
  readonly weights: Float64Array;
  readonly sum: number;
}

/** Gives the row for output k; the row's arrays may be used again by the next call. */
type RowOf = (k: number) => Row;

/** Kernel weights, from input sample -half on, for an instant `fraction` of a sample after 0. */
function phaseWeights(
  fraction: number,
  half: number,
  options: InstantSamplerOptions,
): Float64Array {
  const { rateHz, passHz, stopHz, attenuationDb } = options;
  const weights = new Float64Array(2 * half + 2);
  const beta = kaiserBeta(attenuationDb);
  for (let j = 0; j < weights.length; j++) {
    const offset = j - half - fraction;
    const window = kaiserAt(offset / half, beta);
    if (window > 0) weights[j] = window * idealLowPass((passHz + stopHz) / 2, offset / rateHz);
  }
  return weights;
}

function sumOf(x: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < x.length; i++) sum += x[i];
  return sum;
}

/** Rows for a rational ratio of the rates: `under` phases that come round again, made when met. */
function exactRows(ratio: Ratio, half: number, options: InstantSamplerOptions): RowOf {
  const known: ({ weights: Float64Array; sum: number } | undefined)[] = [];
  return (k) => {
    const position = k * ratio.over;
    const whole = Math.floor(position / ratio.under);
    const phase = position - whole * ratio.under;
    let row = known[phase];
    if (!row) {
      const weights = phaseWeights(phase / ratio.under, half, options);
      row = { weights, sum: sumOf(weights) };
      known[phase] = row;
    }
    return { first: whole - half, weights: row.weights, sum: row.sum };
  };
}

/** Rows for any ratio: cubic (Lagrange) interpolation between four of a table's fine phases. */
function fineRows(half: number, options: InstantSamplerOptions): RowOf {
  const table = Array.from({ length: FINE_PHASES + 3 }, (_, p) =>
    phaseWeights((p - 1) / FINE_PHASES, half, options),
  );
  const weights = new Float64Array(2 * half + 2);
  return (k) => {
    const position = (k * options.rateHz) / options.outputRateHz;
    const whole = Math.floor(position);
    const fine = (position - whole) * FINE_PHASES;
    const at = Math.min(FINE_PHASES - 1, Math.floor(fine));
    const u = fine - at;
    const a = (-u * (u - 1) * (u - 2)) / 6;
    const b = ((u + 1) * (u - 1) * (u - 2)) / 2;
    const c = (-(u + 1) * u * (u - 2)) / 2;
    const d = ((u + 1) * u * (u - 1)) / 6;
    const [rowA, rowB, rowC, rowD] = [table[at], table[at + 1], table[at + 2], table[at + 3]];
    for (let j = 0; j < weights.length; j++)
      weights[j] = a * rowA[j] + b * rowB[j] + c * rowC[j] + d * rowD[j];
    return { first: whole - half, weights, sum: sumOf(weights) };
  };
}

/** Sum of weights[j] x[j + shift], in four sums side by side: one alone would wait for each of its own additions. */
function sumOfProducts(weights: Float64Array, x: Float64Array, shift: number): number {
  const { length } = weights;
  const fours = length - (length % 4);
  let [a, b, c, d] = [0, 0, 0, 0];
  for (let j = 0; j < fours; j += 4) {
    const at = j + shift;
    a += weights[j] * x[at];
    b += weights[j + 1] * x[at + 1];
    c += weights[j + 2] * x[at + 2];
    d += weights[j + 3] * x[at + 3];
  }
  for (let j = fours; j < length; j++) a += weights[j] * x[j + shift];
  return a + b + (c + d);
}

/** The weighted mean of the samples a row finds in x (x[0] being sample `start`); NaN left out. */
function weightedMean(row: Row, x: Float64Array, start: number, end: number): number {
  const { weights, first, sum } = row;
  const from = Math.max(0, start - first);
  const to = Math.min(weights.length, end - first);
  const shift = first - start;
  if (from === 0 && to === weights.length) {
    const total = sumOfProducts(weights, x, shift);
    if (Number.isFinite(total)) return total / sum;
  }
  let total = 0;
  let there = 0;
  for (let j = from; j < to; j++) {
    const value = x[j + shift];
    if (!Number.isFinite(value)) continue;
    total += weights[j] * value;
    there += weights[j];
  }
  return there >= 0.5 * sum ? total / there : Number.NaN;
}

function checkOptions(options: InstantSamplerOptions): void {
  const { rateHz, outputRateHz, passHz, stopHz } = options;
  if (!(rateHz > 0 && outputRateHz > 0))
    throw new Error(`rates must be above 0: ${rateHz} Hz, ${outputRateHz} Hz`);
  if (!(passHz >= 0 && stopHz > passHz && stopHz <= rateHz / 2))
    throw new Error(`edges must rise up to half the rate: ${passHz} Hz, ${stopHz} Hz`);
}

/**
 * A zero-phase low-pass (Kaiser windowed sinc, Kaiser 1974) evaluated at k / outputRateHz seconds
 * from the first sample, whatever the ratio of the rates; outputs as instantCount says.
 * Weights are scaled to a sum of 1 over the samples that are there, at the ends and around NaN;
 * an output with less than half of its weight is NaN. Keeps the samples one output needs.
 * Throws where the edges do not rise or lie above half the rate.
 */
export function createInstantSampler(options: InstantSamplerOptions): InstantSampler {
  checkOptions(options);
  const { rateHz, outputRateHz, passHz, stopHz, attenuationDb } = options;
  const half = (kaiserTaps(attenuationDb, stopHz - passHz, rateHz) - 1) / 2 || 1;
  const ratio = ratioOf(rateHz / outputRateHz, MOST_PHASES);
  const few = ratio && ratio.under * 2 * half <= MOST_WEIGHTS;
  const rowOf = few ? exactRows(ratio, half, options) : fineRows(half, options);
  let kept = new Float64Array(8 * (half + 1));
  let start = 0;
  let end = 0;
  let row = rowOf(0);
  let made = 0;
  let outputs = new Float64Array(1024);

  function emit(): void {
    if (made === outputs.length) {
      const longer = new Float64Array(2 * made);
      longer.set(outputs);
      outputs = longer;
    }
    outputs[made] = weightedMean(row, kept, start, end);
    made += 1;
    row = rowOf(made);
  }

  /** Makes room for at least one more sample by dropping what no output needs any more. */
  function dropPassed(): void {
    const needed = Math.min(end, Math.max(start, row.first));
    kept.copyWithin(0, needed - start, end - start);
    start = needed;
    if (end - start > kept.length / 2) {
      const longer = new Float64Array(2 * kept.length);
      longer.set(kept.subarray(0, end - start));
      kept = longer;
    }
  }

  return {
    push(block) {
      for (let at = 0; at < block.length; ) {
        if (end - start === kept.length) dropPassed();
        const count = Math.min(block.length - at, kept.length - (end - start));
        kept.set(block.subarray(at, at + count), end - start);
        at += count;
        end += count;
        while (row.first + row.weights.length <= end) emit();
      }
    },
    finish() {
      const count = instantCount(end, rateHz, outputRateHz);
      while (made < count) emit();
      return outputs.slice(0, count);
    },
  };
}
