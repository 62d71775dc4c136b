import fc from 'fast-check';
import { noise } from './numeric/signals';

/** Options under which a property draws the same cases every time and everywhere. */
export const always = (numRuns: number) => ({ seed: 208, numRuns, endOnFailure: true });

/** A signal that a failing property names instead of listing its samples. */
function named(signal: Float64Array, name: string): Float64Array {
  return Object.defineProperty(signal, fc.toStringMethod, { value: () => name });
}

/** White noise of a length from `least` to `most` samples. */
export const signals = (least: number, most: number): fc.Arbitrary<Float64Array> =>
  fc
    .tuple(fc.integer({ min: least, max: most }), fc.nat())
    .map(([length, draw]) => named(noise(length, draw), `noise(${length}, ${draw})`));

/** Two signals of one length. */
export const pairs = (least: number, most: number): fc.Arbitrary<[Float64Array, Float64Array]> =>
  fc.tuple(fc.integer({ min: least, max: most }), fc.nat(), fc.nat()).map(([length, ...draws]) => {
    const [x, y] = draws.map((draw) => named(noise(length, draw), `noise(${length}, ${draw})`));
    return [x, y];
  });

/** A number within limits, neither NaN nor -0. */
export const numbers = (min: number, max: number): fc.Arbitrary<number> =>
  fc.double({ min, max, noNaN: true }).map((value) => value + 0);

/** Places at which a stream is cut, as shares of its length; the same one twice gives an empty block. */
export const cuts: fc.Arbitrary<number[]> = fc.array(numbers(0, 1), { maxLength: 9 });

/** x in blocks that end at the cuts. */
export function cutAt(x: Float64Array, shares: readonly number[]): Float64Array[] {
  const ends = [...shares.map((share) => Math.floor(share * x.length)), x.length];
  ends.sort((a, b) => a - b);
  return ends.map((end, i) => x.subarray(i === 0 ? 0 : ends[i - 1], end));
}

/** a x + b y, sample by sample. */
export const mixed = (a: number, x: Float64Array, b: number, y: Float64Array): Float64Array =>
  x.map((value, i) => a * value + b * y[i]);

/** x with every sample times a factor. */
export const times = (factor: number, x: Float64Array): Float64Array =>
  x.map((value) => factor * value);

/** The largest size of any sample; at least 1e-300, so that it can be divided by. */
export const sizeOf = (x: ArrayLike<number>): number => {
  let size = 1e-300;
  for (let i = 0; i < x.length; i++) size = Math.max(size, Math.abs(x[i]));
  return size;
};
