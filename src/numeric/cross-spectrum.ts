import { detrended, realSpectrum, type WelchOptions } from './spectrum';

/** Averages over segments, one value a bin of rateHz / size up to half the rate. */
export interface CrossSpectrum {
  /** One-sided conj(X) Y in units^2/Hz, interleaved re, im. Its phase is above 0 where y is ahead of x. */
  readonly cross: Float64Array;
  /** Magnitude-squared coherence |cross|^2 / (density of x times that of y), 0 to 1; 0 where there is no power. */
  readonly coherence: Float64Array;
  /** Segments averaged; coherence of one alone is 1 and means nothing. */
  readonly segments: number;
}

/** Sums over segments: conj(X) Y interleaved, |X|^2 and |Y|^2. */
interface Sums {
  readonly cross: Float64Array;
  readonly x: Float64Array;
  readonly y: Float64Array;
}

const isWhole = (x: Float64Array) => x.every((value) => !Number.isNaN(value));

/** Full spectrum of a detrended segment under the taper. */
function segmentSpectrum(segment: Float64Array, options: WelchOptions): Float64Array {
  const level = detrended(segment, options.detrend);
  const padded = new Float64Array(options.size);
  for (let i = 0; i < level.length; i++) padded[i] = level[i] * options.taper[i];
  return realSpectrum(padded);
}

function addProducts(sums: Sums, a: Float64Array, b: Float64Array): void {
  for (let k = 0; k < sums.x.length; k++) {
    const [aRe, aIm, bRe, bIm] = [a[2 * k], a[2 * k + 1], b[2 * k], b[2 * k + 1]];
    sums.cross[2 * k] += aRe * bRe + aIm * bIm;
    sums.cross[2 * k + 1] += aRe * bIm - aIm * bRe;
    sums.x[k] += aRe * aRe + aIm * aIm;
    sums.y[k] += bRe * bRe + bIm * bIm;
  }
}

function averaged(sums: Sums, segments: number, options: WelchOptions): CrossSpectrum {
  const { rateHz, taper, size } = options;
  const squares = taper.reduce((sum, weight) => sum + weight * weight, 0);
  const cross = new Float64Array(sums.cross.length);
  const coherence = new Float64Array(sums.x.length);
  for (let k = 0; k < coherence.length; k++) {
    const [re, im] = [sums.cross[2 * k], sums.cross[2 * k + 1]];
    const scale = (k === 0 || 2 * k === size ? 1 : 2) / (rateHz * squares * segments);
    cross[2 * k] = scale * re;
    cross[2 * k + 1] = scale * im;
    const powers = sums.x[k] * sums.y[k];
    coherence[k] = powers > 0 ? Math.min(1, (re * re + im * im) / powers) : 0;
  }
  return { cross, coherence, segments };
}

/**
 * Cross-spectrum and magnitude-squared coherence of two signals of one rate and length, averaged
 * over segments as long as the taper (Welch 1967; Carter, Knapp & Nuttall 1973), scaled as
 * powerDensity. Segments with a NaN in either signal are left out.
 * Throws where the lengths differ or no segment is left.
 */
export function crossSpectrum(
  x: Float64Array,
  y: Float64Array,
  options: WelchOptions,
): CrossSpectrum {
  const { taper, step, size } = options;
  if (x.length !== y.length) throw new Error(`${x.length} and ${y.length} samples do not pair`);
  if (!(step >= 1) || size < taper.length)
    throw new Error(`segments of ${taper.length} samples every ${step}, transform of ${size}`);
  const bins = Math.floor(size / 2) + 1;
  const [inX, inY] = [new Float64Array(bins), new Float64Array(bins)];
  const sums = { cross: new Float64Array(2 * bins), x: inX, y: inY };
  let segments = 0;
  for (let from = 0; from + taper.length <= x.length; from += step) {
    const a = x.subarray(from, from + taper.length);
    const b = y.subarray(from, from + taper.length);
    if (!isWhole(a) || !isWhole(b)) continue;
    addProducts(sums, segmentSpectrum(a, options), segmentSpectrum(b, options));
    segments += 1;
  }
  if (segments === 0)
    throw new Error(`no whole segment of ${taper.length} samples in ${x.length} samples`);
  return averaged(sums, segments, options);
}
