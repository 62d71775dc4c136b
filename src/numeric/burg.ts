import { realSpectrum } from './spectrum';

/** x[n] = -sum over k of coefficients[k - 1] x[n - k], and white noise of `variance` (units^2). */
export interface AutoregressiveModel {
  /** a[1] .. a[order]; a[0] is 1. */
  readonly coefficients: Float64Array;
  /** The last coefficient of the fit of each order from 1 on, -1 to 1. */
  readonly reflections: Float64Array;
  readonly variance: number;
}

/** The reflection that leaves the least forward and backward error; both errors are taken on. */
function reflect(forward: Float64Array, backward: Float64Array, order: number): number {
  let product = 0;
  let squares = 0;
  for (let n = order; n < forward.length; n++) {
    product += forward[n] * backward[n - 1];
    squares += forward[n] * forward[n] + backward[n - 1] * backward[n - 1];
  }
  const reflection = squares > 0 ? (-2 * product) / squares : 0;
  for (let n = forward.length - 1; n >= order; n--) {
    const ahead = forward[n];
    const behind = backward[n - 1];
    forward[n] = ahead + reflection * behind;
    backward[n] = behind + reflection * ahead;
  }
  return reflection;
}

/**
 * Autoregressive model of x by Burg's method (Burg 1975): reflections of least forward and backward
 * prediction error, joined by Levinson's recursion. Nothing is detrended; x of zeros gives zeros.
 * O(length order). Throws where the order is no whole number from 0 to below the length.
 */
export function burg(x: Float64Array, order: number): AutoregressiveModel {
  if (!Number.isInteger(order) || order < 0 || order >= x.length)
    throw new Error(`an order of ${order} does not fit ${x.length} samples`);
  const forward = x.slice();
  const backward = x.slice();
  const reflections = new Float64Array(order);
  let coefficients = new Float64Array(order);
  let variance = x.reduce((sum, value) => sum + value * value, 0) / x.length;
  for (let m = 0; m < order; m++) {
    const reflection = reflect(forward, backward, m + 1);
    const longer = coefficients.slice();
    for (let k = 0; k < m; k++) longer[k] += reflection * coefficients[m - 1 - k];
    longer[m] = reflection;
    coefficients = longer;
    reflections[m] = reflection;
    variance *= 1 - reflection * reflection;
  }
  return { coefficients, reflections, variance };
}

/**
 * One-sided density of a model in units^2/Hz at floor(size / 2) + 1 bins of rateHz / size, as
 * powerDensity has them: variance / (rate |A|^2), doubled except at 0 and at half the rate.
 * Throws where the size does not hold the coefficients.
 */
export function autoregressiveDensity(
  model: AutoregressiveModel,
  rateHz: number,
  size: number,
): Float64Array {
  const { coefficients, variance } = model;
  if (!(size > coefficients.length))
    throw new Error(`a transform of ${size} does not hold order ${coefficients.length}`);
  const polynomial = new Float64Array(size);
  polynomial[0] = 1;
  polynomial.set(coefficients, 1);
  const spectrum = realSpectrum(polynomial);
  const density = new Float64Array(Math.floor(size / 2) + 1);
  for (let k = 0; k < density.length; k++) {
    const power = spectrum[2 * k] * spectrum[2 * k] + spectrum[2 * k + 1] * spectrum[2 * k + 1];
    density[k] = ((k === 0 || 2 * k === size ? 1 : 2) * variance) / (rateHz * power);
  }
  return density;
}
