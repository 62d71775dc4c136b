import { cos } from './elementary';
import { convolveSame } from './fir';

/**
 * Gram polynomials, orthogonal on the whole numbers -half..half (Gorry 1990), as functions of
 * i / half and with leading factor 1: `degrees[k][i + half]`, `norms[k]` their sums of squares.
 */
interface GramBasis {
  readonly half: number;
  readonly degrees: readonly Float64Array[];
  readonly norms: readonly number[];
}

function checkWindow(window: number, order: number): void {
  if (!Number.isInteger(window) || window < 1 || window % 2 !== 1)
    throw new Error(`window must be an odd whole number of samples, not ${window}`);
  if (!Number.isInteger(order) || order < 0 || order >= window)
    throw new Error(`order must be a whole number from 0 to below the window, not ${order}`);
}

/** Factor b of p[k+1](u) = u p[k](u) - b p[k-1](u), for n = 2 half + 1 points. */
function gramFactor(k: number, half: number): number {
  const n = 2 * half + 1;
  return (k * k * (n * n - k * k)) / (4 * (4 * k * k - 1) * half * half);
}

function gramBasis(half: number, order: number): GramBasis {
  const n = 2 * half + 1;
  const degrees: Float64Array[] = [];
  const norms: number[] = [];
  for (let k = 0; k <= order; k++) {
    const values = new Float64Array(n);
    let norm = 0;
    for (let i = 0; i < n; i++) {
      const u = half === 0 ? 0 : (i - half) / half;
      values[i] = k === 0 ? 1 : u * degrees[k - 1][i];
      if (k > 1) values[i] -= gramFactor(k - 1, half) * degrees[k - 2][i];
      norm += values[i] * values[i];
    }
    degrees.push(values);
    norms.push(norm);
  }
  return { half, degrees, norms };
}

/** Values at point i of the derivatives d^derivative / di^derivative of degrees 0..order. */
function gramDerivatives(half: number, order: number, derivative: number, i: number): number[] {
  const scale = half === 0 ? 1 : half;
  const u = i / scale;
  let lower = Array.from({ length: order + 1 }, () => 0);
  let values = lower;
  for (let s = 0; s <= derivative; s++) {
    values = [s === 0 ? 1 : 0];
    for (let k = 1; k <= order; k++) {
      values[k] = (s / scale) * lower[k - 1] + u * values[k - 1];
      if (k > 1) values[k] -= gramFactor(k - 1, half) * values[k - 2];
    }
    lower = values;
  }
  return values;
}

/** Weights of the least-squares polynomial's derivative at point i of -half..half. */
function weightsAt(basis: GramBasis, order: number, derivative: number, i: number): Float64Array {
  const target = gramDerivatives(basis.half, order, derivative, i);
  const weights = new Float64Array(2 * basis.half + 1);
  for (let k = 0; k <= order; k++) {
    const factor = target[k] / basis.norms[k];
    const values = basis.degrees[k];
    for (let j = 0; j < weights.length; j++) weights[j] += factor * values[j];
  }
  return weights;
}

/**
 * Savitzky-Golay weights (Savitzky & Golay 1964, by Gram polynomials as Gorry 1990, accurate for
 * long windows): y[n] = sum w[j] x[n + j - half] for `window` = 2 half + 1 points, a polynomial of
 * `order` below the window, and its `derivative` per sample (0 smooths).
 * Throws where the window is even or the order does not fit.
 */
export function savitzkyGolayWeights(window: number, order: number, derivative = 0): Float64Array {
  checkWindow(window, order);
  const half = (window - 1) / 2;
  return weightsAt(gramBasis(half, order), order, derivative, 0);
}

/**
 * Savitzky-Golay smoothing, as long as x. The first and last half window come from one
 * polynomial fitted to the first and last window (scipy's mode 'interp').
 * Throws where the window is even, the order does not fit, or x is shorter than the window.
 */
export function savitzkyGolay(
  x: Float64Array,
  window: number,
  order: number,
  derivative = 0,
): Float64Array {
  checkWindow(window, order);
  if (x.length < window)
    throw new Error(`window of ${window} samples is longer than the ${x.length} given`);
  const half = (window - 1) / 2;
  const basis = gramBasis(half, order);
  const y = convolveSame(x, weightsAt(basis, order, derivative, 0).reverse(), 'zero');
  fitEnd(basis, x.subarray(0, window), order, derivative, (i, value) => {
    if (i < 0) y[i + half] = value;
  });
  fitEnd(basis, x.subarray(x.length - window), order, derivative, (i, value) => {
    if (i > 0) y[x.length - 1 - half + i] = value;
  });
  return y;
}

/** Fits one polynomial to a whole window and reports its value at each point -half..half. */
function fitEnd(
  basis: GramBasis,
  x: Float64Array,
  order: number,
  derivative: number,
  report: (i: number, value: number) => void,
): void {
  const coefficients = basis.degrees.map((values, k) => {
    let sum = 0;
    for (let j = 0; j < x.length; j++) sum += values[j] * x[j];
    return sum / basis.norms[k];
  });
  for (let i = -basis.half; i <= basis.half; i++) {
    const target = gramDerivatives(basis.half, order, derivative, i);
    report(
      i,
      coefficients.reduce((sum, c, k) => sum + c * target[k], 0),
    );
  }
}

/** Gain of smoothing weights at `fraction` of Nyquist (0 to 1); real, since they are symmetric. */
export function savitzkyGolayGain(weights: Float64Array, fraction: number): number {
  const half = (weights.length - 1) / 2;
  let gain = weights[half];
  for (let j = 1; j <= half; j++) gain += 2 * weights[half + j] * cos(Math.PI * fraction * j);
  return gain;
}

/**
 * The lowest frequency, as a fraction of Nyquist, where the smoother's gain is 1/sqrt(2), solved
 * numerically; 1 where it never falls so low (the window holds no more points than the order asks).
 */
export function savitzkyGolayCutoff(window: number, order: number): number {
  const weights = savitzkyGolayWeights(window, order);
  const level = Math.SQRT1_2;
  const step = 1 / (8 * window);
  let below = 0;
  while (savitzkyGolayGain(weights, below + step) > level) {
    below += step;
    if (below >= 1) return 1;
  }
  let above = below + step;
  while (above - below > 1e-13) {
    const middle = (below + above) / 2;
    if (savitzkyGolayGain(weights, middle) > level) below = middle;
    else above = middle;
  }
  return (below + above) / 2;
}
