import { sinc } from '../numeric/elementary';
import { kaiserAt } from '../numeric/windows';

/** Steps of a sample that values are read at, and samples used to each side: for signals up to a third of the rate. */
const SUB_STEPS = 64;
const SIDE = 8;
const BETA = 7;

const table = new Map<number, Float64Array>();

/** Kaiser windowed sinc weights (Kaiser 1974) for a value `step`/64 of a sample after sample SIDE - 1 of 2 SIDE. */
function weightsFor(step: number): Float64Array {
  const known = table.get(step);
  if (known) return known;
  const weights = new Float64Array(2 * SIDE);
  let sum = 0;
  for (let j = 0; j < weights.length; j += 1) {
    const off = j - (SIDE - 1) - step / SUB_STEPS;
    weights[j] = sinc(off) * kaiserAt(off / SIDE, BETA);
    sum += weights[j];
  }
  for (let j = 0; j < weights.length; j += 1) weights[j] /= sum;
  table.set(step, weights);
  return weights;
}

/** Value of x at a place between samples, to the nearest 1/64 sample; what lies outside x counts as 0. */
export function valueAt(x: ArrayLike<number>, place: number): number {
  const whole = Math.floor(place);
  const step = Math.round((place - whole) * SUB_STEPS);
  const weights = weightsFor(step);
  let sum = 0;
  for (let j = 0, i = whole - SIDE + 1; j < weights.length; j += 1, i += 1)
    if (i >= 0 && i < x.length) sum += weights[j] * x[i];
  return sum;
}

/** Adds x, read from `place` on at whole steps, to `sum`. */
export function addShifted(sum: Float64Array, x: Float64Array, place: number): void {
  const whole = Math.floor(place);
  const step = Math.round((place - whole) * SUB_STEPS);
  if (step === 0 && whole >= 0 && whole + sum.length <= x.length) {
    for (let n = 0; n < sum.length; n += 1) sum[n] += x[whole + n];
    return;
  }
  const weights = weightsFor(step);
  for (let n = 0; n < sum.length; n += 1) {
    let value = 0;
    const from = whole + n - SIDE + 1;
    for (let j = 0; j < weights.length; j += 1) {
      const i = from + j;
      if (i >= 0 && i < x.length) value += weights[j] * x[i];
    }
    sum[n] += value;
  }
}

/**
 * Place of the crest of a band-limited x near its greatest sample `at`, which must have neighbours: the greatest value at
 * steps of 1/8, refined by a parabola.
 */
export function crestPlace(x: ArrayLike<number>, at: number, sign: 1 | -1 = 1): number {
  let best = at;
  let greatest = sign * x[at];
  for (let k = -8; k <= 8; k += 1) {
    const value = sign * valueAt(x, at + k / 8);
    if (value > greatest) {
      greatest = value;
      best = at + k / 8;
    }
  }
  const before = sign * valueAt(x, best - 1 / 8);
  const after = sign * valueAt(x, best + 1 / 8);
  const bend = before - 2 * greatest + after;
  if (!(bend < 0)) return best;
  return best + Math.max(-0.5, Math.min(0.5, (0.5 * (before - after)) / bend)) / 8;
}
