import type { Random } from './random';
import { quantileInPlace } from './statistics';

export interface BlockBootstrapOptions {
  /** Number of things in order: epochs, intervals. */
  readonly count: number;
  /** Length of the blocks drawn, from 1 (independent things) to `count`. */
  readonly blockLength: number;
  readonly replicates: number;
  readonly random: Random;
  /** Quantiles wanted, each 0 to 1: 0.025 and 0.975 for 95 %. */
  readonly quantiles: readonly number[];
}

export interface BootstrapQuantiles {
  /** One value a quantile asked for; NaN where no replicate had a value. */
  readonly values: Float64Array;
  /** Replicates whose statistic was a finite number; only they enter. */
  readonly used: number;
}

function check({ count, blockLength, replicates }: BlockBootstrapOptions): void {
  const fits = Number.isInteger(blockLength) && blockLength >= 1 && blockLength <= count;
  if (!Number.isInteger(count) || !fits)
    throw new Error(`blocks of ${blockLength} cannot be drawn from ${count}`);
  if (!Number.isInteger(replicates) || replicates < 1)
    throw new Error(`replicates must be a whole number from 1 on, not ${replicates}`);
}

/**
 * Quantiles of a statistic under the moving-block bootstrap (Kuensch 1989): each replicate is blocks
 * of neighbours drawn with replacement from all that fit, put in a row and cut to `count`. The
 * statistic is given the drawn places, 0 to count - 1; the array is used again for the next
 * replicate. Quantiles are linear between neighbours (type 7). The same for the same generator.
 */
export function blockBootstrap(
  options: BlockBootstrapOptions,
  statistic: (places: Int32Array) => number,
): BootstrapQuantiles {
  check(options);
  const { count, blockLength, replicates, random, quantiles } = options;
  const places = new Int32Array(count);
  const found = new Float64Array(replicates);
  let used = 0;
  for (let r = 0; r < replicates; r++) {
    for (let at = 0; at < count; at += blockLength) {
      const first = random.below(count - blockLength + 1);
      const end = Math.min(count, at + blockLength);
      for (let i = at; i < end; i++) places[i] = first + i - at;
    }
    const value = statistic(places);
    if (!Number.isFinite(value)) continue;
    found[used] = value;
    used += 1;
  }
  const values = Float64Array.from(quantiles, (q) => quantileInPlace(found, q, used));
  return { values, used };
}
