import type { Ends } from '../../src/numeric/ends';
import { extendedAt } from '../../src/numeric/ends';
import type { Kernel } from '../../src/numeric/kernel';
import { createRandom } from '../../src/numeric/random';

/** Standard normal numbers of one seed. */
export function noise(length: number, seed: number): Float64Array {
  const random = createRandom(seed);
  return Float64Array.from({ length }, () => random.gaussian());
}

/** The largest distance of two series of one length; Infinity where the lengths differ. */
export function largestDifference(a: ArrayLike<number>, b: ArrayLike<number>): number {
  if (a.length !== b.length) return Number.POSITIVE_INFINITY;
  let largest = 0;
  for (let i = 0; i < a.length; i++) {
    const difference = Math.abs(a[i] - b[i]);
    if (!(difference <= largest)) largest = difference;
  }
  return largest;
}

/** The definition of a kernel's output at every `decimate`-th sample, summed term by term. */
export function filteredByDefinition(
  x: Float64Array,
  { taps, origin }: Kernel,
  ends: Ends,
  decimate = 1,
): Float64Array {
  return Float64Array.from({ length: Math.ceil(x.length / decimate) }, (_, i) => {
    let sum = 0;
    for (let j = 0; j < taps.length; j++)
      sum += taps[j] * extendedAt(x, i * decimate - (j - origin), ends);
    return sum;
  });
}

/** x cut into blocks of the given lengths, taken in turn. */
export function blocksOf(x: Float64Array, lengths: readonly number[]): Float64Array[] {
  const blocks: Float64Array[] = [];
  for (let at = 0, k = 0; at < x.length; k++) {
    const length = lengths[k % lengths.length];
    blocks.push(x.subarray(at, at + length));
    at += length;
  }
  return blocks;
}

/** amplitude sin(2 pi f t + phase) at `length` samples of a rate. */
export function sine(
  length: number,
  rateHz: number,
  freqHz: number,
  amplitude = 1,
  phase = 0,
): Float64Array {
  return Float64Array.from(
    { length },
    (_, i) => amplitude * Math.sin((2 * Math.PI * freqHz * i) / rateHz + phase),
  );
}
