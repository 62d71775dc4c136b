import { cos, exp, log, pow, sin } from './elementary';
import type { Response } from './kernel';
import { blockSizeFor, overlapSave } from './overlap-save';
import { reciprocalGamma } from './special';

/**
 * The first `count` weights (-1)^k binomial(order, k), by w[k] = w[k-1] (1 - (order + 1)/k)
 * (Podlubny 1999). Order 1 is the difference, -1 the running sum.
 */
export function grunwaldLetnikovWeights(order: number, count: number): Float64Array {
  const weights = new Float64Array(count);
  if (count > 0) weights[0] = 1;
  for (let k = 1; k < count; k++) weights[k] = weights[k - 1] * (1 - (order + 1) / k);
  return weights;
}

/** Past samples a memory of `memorySamples` uses in a signal of `length` samples. */
function pastSamples(memorySamples: number, length: number): number {
  if (!(memorySamples >= 0)) throw new Error(`memory must be 0 samples or more: ${memorySamples}`);
  return Math.min(Math.floor(memorySamples), Math.max(0, length - 1));
}

/**
 * Gruenwald-Letnikov derivative of any real order, steps of stepS seconds, in units per second^order
 * (Podlubny 1999): step^-order sum over k of w[k] x[n - k], k from 0 to the memory (all of the past
 * unless given). Before its start x counts as 0. As long as x.
 */
export function grunwaldLetnikov(
  x: Float64Array,
  order: number,
  stepS: number,
  memorySamples = Number.POSITIVE_INFINITY,
): Float64Array {
  if (x.length === 0) return new Float64Array(0);
  const past = pastSamples(memorySamples, x.length);
  const taps = grunwaldLetnikovWeights(order, past + 1);
  const scale = pow(stepS, -order);
  for (let k = 0; k < taps.length; k++) taps[k] *= scale;
  const kernel = { taps, origin: 0 };
  const blockSize = blockSizeFor([kernel], x.length);
  return overlapSave(x, { blockSize, kernels: [kernel], decimate: 1, ends: 'zero' })[0];
}

/** Angles are computed anew after so many steps of rotation. */
const RESYNC = 256;

/**
 * Frequency response of that operator: sum w[k] e^(-i k angle) / step^order, in closed form
 * ((1 - e^(-i angle)) / step)^order for an unlimited memory, angle = 2 pi f step.
 * freqHz from 0 (above 0 for an unlimited memory of negative order) to half of 1/stepS.
 */
export function grunwaldLetnikovResponse(
  order: number,
  stepS: number,
  memorySamples: number,
  freqHz: number,
): Response {
  const angle = 2 * Math.PI * freqHz * stepS;
  if (memorySamples === Number.POSITIVE_INFINITY) {
    const chord = (2 * sin(angle / 2)) / stepS;
    if (chord === 0)
      return { re: order === 0 ? 1 : order > 0 ? 0 : Number.POSITIVE_INFINITY, im: 0 };
    const gain = exp(order * log(chord));
    const phase = order * (Math.PI / 2 - angle / 2);
    return { re: gain * cos(phase), im: gain * sin(phase) };
  }
  const scale = pow(stepS, -order);
  const sum = rotatingSum(grunwaldLetnikovWeights(order, Math.floor(memorySamples) + 1), angle);
  return { re: scale * sum.re, im: scale * sum.im };
}

/** sum w[k] e^(-i k angle). */
function rotatingSum(weights: Float64Array, angle: number): Response {
  const [stepCos, stepSin] = [cos(angle), sin(angle)];
  let [re, im, c, s] = [0, 0, 1, 0];
  for (let k = 0; k < weights.length; k++) {
    if (k % RESYNC === 0) [c, s] = [cos(k * angle), sin(k * angle)];
    re += weights[k] * c;
    im -= weights[k] * s;
    [c, s] = [c * stepCos - s * stepSin, s * stepCos + c * stepSin];
  }
  return { re, im };
}

/**
 * The most that dropping everything older than memoryS seconds can change a derivative of order
 * 0 to 1 of a signal that stays within -1..1: memoryS^-order / gamma(1 - order), in units per
 * second^order (Podlubny 1999, short memory principle).
 */
export function truncationBound(order: number, memoryS: number): number {
  if (!(order > 0 && order <= 1) || !(memoryS > 0))
    throw new Error(`the bound holds for orders in (0, 1] and memories above 0 s`);
  return pow(memoryS, -order) * reciprocalGamma(1 - order);
}
