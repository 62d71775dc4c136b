import { exp, log } from './elementary';

/**
 * Indices i with from <= i < to where x is a local maximum: higher than the value before and the
 * value after it, both of which must exist. Of a level top the middle counts (rounded down), if
 * it lies in the range. Ascending.
 */
export function localMaxima(x: Float64Array, from: number, to: number): Int32Array {
  const found: number[] = [];
  let i = 1;
  while (i < x.length - 1 && i < to) {
    let last = i;
    if (x[i - 1] < x[i]) {
      while (last < x.length - 1 && x[last + 1] === x[i]) last++;
      const middle = (i + last) >> 1;
      if (last < x.length - 1 && x[last + 1] < x[i] && middle >= from && middle < to)
        found.push(middle);
    }
    i = last + 1;
  }
  return Int32Array.from(found);
}

/** Values below this part of the middle one count as it, so that the logarithm exists. */
const FLOOR_OF_MIDDLE = 1e-12;
const SMALLEST = 1e-300;

/**
 * Top of the parabola through the logarithms of three neighbours, `mid` the largest: offset in
 * samples from the middle (-0.5 to 0.5) and height in the values' own unit.
 * A middle of 0 or less is given back as it is.
 */
export function logParabola(
  left: number,
  mid: number,
  right: number,
): { offset: number; height: number } {
  if (!(mid > 0)) return { offset: 0, height: mid };
  const floor = Math.max(SMALLEST, FLOOR_OF_MIDDLE * mid);
  const a = log(Math.max(left, floor));
  const b = log(Math.max(mid, floor));
  const c = log(Math.max(right, floor));
  const bend = a - 2 * b + c;
  if (!(bend < 0)) return { offset: 0, height: mid };
  const offset = Math.max(-0.5, Math.min(0.5, (0.5 * (c - a)) / -bend));
  return { offset, height: exp(b - 0.25 * (a - c) * offset) };
}
