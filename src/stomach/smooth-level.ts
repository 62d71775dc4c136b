import { log } from '../numeric/elementary';

/** Where the background is estimated: clear of what taking off a line takes away, and of most breathing. */
const FIT_CPM = { lowCpm: 0.5, highCpm: 12 };
const MOST_DEGREE = 3;
const PASSES = 6;
/** Mean of the logarithm of an exponential variable of mean 1 is minus this (Euler's constant). */
export const EULER = 0.5772156649015329;

/** The smooth course of a logarithm of density over the logarithm of frequency. */
export interface SmoothLevel {
  /**
   * The polynomial of degree 1 to 3 in log frequency through `y` in 0.5-12 cpm by least squares;
   * what stands more than `most` above it is a line, not background, and has no say. Bin 0 is 0.
   */
  through(y: Float64Array, degree: number, most: number): Float64Array;
}

/** By bin width: epochs have one, their halves another. */
const known = new Map<number, Float64Array>();

/** Natural logarithms of the frequencies of at least `count` bins; 0 for bin 0. Kept by bin width. */
export function logFrequencies(binCpm: number, count: number): Float64Array {
  const before = known.get(binCpm);
  if (before && before.length >= count) return before;
  const logs = Float64Array.from({ length: count }, (_, k) => (k === 0 ? 0 : log(k * binCpm)));
  known.set(binCpm, logs);
  return logs;
}

/** Polynomials in log frequency, orthonormal over the bins from..end under the weights of `product`. */
function orthonormal(binCpm: number, count: number, from: number, end: number): Float64Array[] {
  const x = logFrequencies(binCpm, count).subarray(0, count);
  const made: Float64Array[] = [];
  for (let degree = 0; degree <= MOST_DEGREE; degree += 1) {
    const last = made[degree - 1];
    const next = last ? x.map((value, k) => value * last[k]) : x.map(() => 1);
    for (const earlier of made) {
      const share = product(next, earlier, from, end);
      for (let k = 0; k < count; k += 1) next[k] -= share * earlier[k];
    }
    const norm = 1 / Math.sqrt(product(next, next, from, end));
    made.push(next.map((value) => value * norm));
  }
  return made;
}

/** Each octave weighs the same, so that breathing above the search band does not tilt what lies below. */
function product(a: Float64Array, b: Float64Array, from: number, end: number): number {
  let sum = 0;
  for (let k = from; k < end; k += 1) sum += (a[k] * b[k]) / k;
  return sum;
}

/** For spectra of `count` bins, bin k at k * binCpm. */
export function smoothLevel(binCpm: number, count: number): SmoothLevel {
  const from = Math.ceil(FIT_CPM.lowCpm / binCpm);
  const end = Math.min(count - 1, Math.floor(FIT_CPM.highCpm / binCpm) + 1);
  const basis = orthonormal(binCpm, count, from, end);
  const weighted = basis.map((one) => one.map((value, k) => (k === 0 ? 0 : value / k)));
  return {
    through(y, degree, most) {
      const level = new Float64Array(count);
      const heard = Float64Array.from(y);
      for (let pass = 0; pass < PASSES; pass += 1) {
        if (pass > 0)
          for (let k = from; k < end; k += 1) heard[k] = y[k] - level[k] > most ? level[k] : y[k];
        level.fill(0);
        for (let d = 0; d <= degree; d += 1) {
          const [one, heavy] = [basis[d], weighted[d]];
          let share = 0;
          for (let k = from; k < end; k += 1) share += heard[k] * heavy[k];
          for (let k = 1; k < count; k += 1) level[k] += share * one[k];
        }
      }
      return level;
    },
  };
}
