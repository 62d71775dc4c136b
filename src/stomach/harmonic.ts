import { cos, sin } from '../numeric/elementary';
import { hannPeriodic } from '../numeric/windows';
import { type Cpm, cpmToHz, type Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import type { SpectrumPeak } from './dominant-peak';

/** A peak counts as the double of a lower one within this share of it. */
const DOUBLE_TOLERANCE = 0.05;
/** A lower peak this far below its double (20 dB) is a side lobe or chance, not the wave itself. */
const LEAST_SHARE_OF_DOUBLE = 0.01;
/** Consistency of phase from which two lines count as locked, and the least number of windows. */
const LOCKED = 0.8;
const LEAST_WINDOWS = 3;

/** The lower peaks that `peak` may be the second harmonic of, at most 20 dB below it, nearest to its half first. */
export function halfPeaks(
  peak: SpectrumPeak,
  peaks: readonly SpectrumPeak[],
): readonly SpectrumPeak[] {
  const miss = (lower: SpectrumPeak) => Math.abs(peak.cpm - 2 * lower.cpm) / (2 * lower.cpm);
  return peaks
    .filter((lower) => lower.cpm < peak.cpm && miss(lower) <= DOUBLE_TOLERANCE)
    .filter((lower) => lower.density >= LEAST_SHARE_OF_DOUBLE * peak.density)
    .sort((a, b) => miss(a) - miss(b));
}

interface Complex {
  readonly re: number;
  readonly im: number;
}

/** sum w[i] x[from + i] e^(-2 pi i f t), t from the start of x. */
function lineOf(
  x: Float64Array,
  from: number,
  taper: Float64Array,
  frequencyHz: Hertz,
  rateHz: Hertz,
): Complex {
  const step = (2 * Math.PI * frequencyHz) / rateHz;
  let re = 0;
  let im = 0;
  for (let i = 0; i < taper.length; i++) {
    const angle = step * (from + i);
    const value = taper[i] * x[from + i];
    re += value * cos(angle);
    im -= value * sin(angle);
  }
  return { re, im };
}

/**
 * How steadily the line at twice a frequency keeps its phase to the line at it, 0 to 1: over
 * half-overlapping Hann windows of a fifth of the epoch, or two cycles where that is longer,
 * |sum X2 conj(X1)^2| / sum |X2| |X1|^2 (the biphase's consistency; after Kim & Powers 1979). An
 * unrelated line less than 0.1 cpm from the double cannot be told from a locked one in 4 min.
 * 0 where fewer than three windows fit.
 */
export function phaseLock(
  samples: Float64Array,
  rateHz: Hertz,
  lengthS: Seconds,
  lowerCpm: Cpm,
): number {
  const windowS = Math.max(lengthS / 5, 120 / lowerCpm);
  const taper = hannPeriodic(Math.round(windowS * rateHz));
  const step = Math.max(1, Math.floor(taper.length / 2));
  let count = 0;
  let re = 0;
  let im = 0;
  let size = 0;
  for (let from = 0; from + taper.length <= samples.length; from += step) {
    const one = lineOf(samples, from, taper, cpmToHz(lowerCpm), rateHz);
    const two = lineOf(samples, from, taper, cpmToHz(2 * lowerCpm), rateHz);
    const squareRe = one.re * one.re - one.im * one.im;
    const squareIm = 2 * one.re * one.im;
    re += two.re * squareRe + two.im * squareIm;
    im += two.im * squareRe - two.re * squareIm;
    size += Math.hypot(two.re, two.im) * Math.hypot(squareRe, squareIm);
    count += 1;
  }
  return count >= LEAST_WINDOWS && size > 0 ? Math.hypot(re, im) / size : 0;
}

/** True where the second harmonic of `lowerCpm` is locked to it in the epoch's samples. */
export function isLocked(
  samples: Float64Array,
  rateHz: Hertz,
  lengthS: Seconds,
  lowerCpm: Cpm,
): boolean {
  return phaseLock(samples, rateHz, lengthS, lowerCpm) >= LOCKED;
}
