import type { Random } from './random';
import { quantileInPlace } from './statistics';

export interface BlockDraws {
  /** Number of things in order: epochs, intervals. */
  readonly count: number;
  /** Length of the blocks drawn, from 1 (independent things) to `count`. */
  readonly blockLength: number;
  readonly replicates: number;
  readonly random: Random;
}

export interface BlockBootstrapOptions extends BlockDraws {
  /** Quantiles wanted, each 0 to 1: 0.025 and 0.975 for 95 %. */
  readonly quantiles: readonly number[];
}

export interface BootstrapQuantiles {
  /** One value a quantile asked for; NaN where no replicate had a value. */
  readonly values: Float64Array;
  /** Replicates whose statistic was a finite number; only they enter. */
  readonly used: number;
}

function check({ count, blockLength, replicates }: BlockDraws): void {
  const fits = Number.isInteger(blockLength) && blockLength >= 1 && blockLength <= count;
  if (!Number.isInteger(count) || !fits)
    throw new Error(`blocks of ${blockLength} cannot be drawn from ${count}`);
  if (!Number.isInteger(replicates) || replicates < 1)
    throw new Error(`replicates must be a whole number from 1 on, not ${replicates}`);
}

/**
 * The finite values of a statistic under the moving-block bootstrap (Kuensch 1989): each replicate is blocks of neighbours
 * drawn with replacement from all that fit, put in a row and cut to `count`. `draw` is told where each block begins and how
 * many of its things count, before `value` is asked for.
 */
function drawn(
  options: BlockDraws,
  draw: (first: number, length: number, at: number) => void,
  value: () => number,
): Float64Array {
  check(options);
  const { count, blockLength, replicates, random } = options;
  const found = new Float64Array(replicates);
  let used = 0;
  for (let r = 0; r < replicates; r++) {
    for (let at = 0; at < count; at += blockLength) {
      const first = random.below(count - blockLength + 1);
      draw(first, Math.min(count - at, blockLength), at);
    }
    const one = value();
    if (!Number.isFinite(one)) continue;
    found[used] = one;
    used += 1;
  }
  return found.subarray(0, used);
}

/**
 * What a statistic is in each replicate of the moving-block bootstrap, those left out in which it is no finite number. It is
 * given the drawn places, 0 to count - 1; the array is used again for the next replicate. The same for the same generator.
 */
export function blockReplicates(
  options: BlockDraws,
  statistic: (places: Int32Array) => number,
): Float64Array {
  const places = new Int32Array(Math.max(0, options.count));
  return drawn(
    options,
    (first, length, at) => {
      for (let i = 0; i < length; i++) places[at + i] = first + i;
    },
    () => statistic(places),
  );
}

/**
 * The same draws for a statistic of two sums, over all that is drawn, of `above` and of `below` (both of `count` values): a
 * block costs two subtractions however long it is.
 */
export function sumReplicates(
  options: BlockDraws,
  above: Float64Array,
  below: Float64Array,
  statistic: (above: number, below: number) => number,
): Float64Array {
  const [a, b] = [runningSums(above), runningSums(below)];
  let [sumA, sumB] = [0, 0];
  return drawn(
    options,
    (first, length) => {
      sumA += a[first + length] - a[first];
      sumB += b[first + length] - b[first];
    },
    () => {
      const value = statistic(sumA, sumB);
      [sumA, sumB] = [0, 0];
      return value;
    },
  );
}

function runningSums(x: Float64Array): Float64Array {
  const sums = new Float64Array(x.length + 1);
  for (let i = 0; i < x.length; i++) sums[i + 1] = sums[i] + x[i];
  return sums;
}

/** Quantiles of a statistic under the moving-block bootstrap, linear between neighbours (type 7). */
export function blockBootstrap(
  options: BlockBootstrapOptions,
  statistic: (places: Int32Array) => number,
): BootstrapQuantiles {
  const found = blockReplicates(options, statistic);
  const used = found.length;
  const values = Float64Array.from(options.quantiles, (q) => quantileInPlace(found, q, used));
  return { values, used };
}
