import { cos, sin } from '../numeric/elementary';
import { hannPeriodic } from '../numeric/windows';
import { type Cpm, cpmToHz, type Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import type { SpectrumPeak } from './dominant-peak';
import { withoutLines } from './without-lines';

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

/** Samples of an epoch or a half of it. */
export interface SampledPart {
  /** Detrended, spoiled samples 0. */
  readonly samples: Float64Array;
  /** 1 where a sample is kept. */
  readonly kept: Uint8Array;
  readonly rateHz: Hertz;
  readonly lengthS: Seconds;
}

interface Complex {
  readonly re: number;
  readonly im: number;
}

/** One stretch of an epoch under its taper; weights are the taper where a sample is kept, else 0. */
interface Stretch {
  readonly samples: Float64Array;
  readonly weights: Float64Array;
  readonly spoiled: boolean;
  readonly rateHz: Hertz;
}

/**
 * sum w[i] x[i] e^(-2 pi i f t), t from the start of the stretch. Where samples are missing, the
 * line beside it is fitted and taken off first: the holes would let it through.
 */
function lineOf(stretch: Stretch, cpm: Cpm, besideCpm: Cpm): Complex {
  const { weights, spoiled, rateHz } = stretch;
  const x = spoiled
    ? withoutLines(stretch.samples, weights, [0, besideCpm], rateHz)
    : stretch.samples;
  const step = (2 * Math.PI * cpmToHz(cpm)) / rateHz;
  let re = 0;
  let im = 0;
  for (let i = 0; i < x.length; i++) {
    const value = weights[i] * x[i];
    re += value * cos(step * i);
    im -= value * sin(step * i);
  }
  return { re, im };
}

/** The stretches of half-overlapping Hann windows. */
function stretches({ samples, kept, rateHz }: SampledPart, windowS: Seconds): Stretch[] {
  const taper = hannPeriodic(Math.round(windowS * rateHz));
  const step = Math.max(1, Math.floor(taper.length / 2));
  const found: Stretch[] = [];
  for (let from = 0; from + taper.length <= samples.length; from += step) {
    const there = kept.subarray(from, from + taper.length);
    found.push({
      samples: samples.subarray(from, from + taper.length),
      weights: taper.map((weight, i) => (there[i] === 0 ? 0 : weight)),
      spoiled: there.includes(0),
      rateHz,
    });
  }
  return found;
}

/**
 * How steadily the line at twice a frequency keeps its phase to the line at it, 0 to 1: over
 * half-overlapping Hann windows of a fifth of the epoch, or two cycles where that is longer,
 * |sum X2 conj(X1)^2| / sum |X2| |X1|^2 (the biphase's consistency; after Kim & Powers 1979). An
 * unrelated line less than 0.1 cpm from the double cannot be told from a locked one in 4 min.
 * 0 where fewer than three windows fit.
 */
export function phaseLock(part: SampledPart, lowerCpm: Cpm): number {
  const all = stretches(part, Math.max(part.lengthS / 5, 120 / lowerCpm));
  let re = 0;
  let im = 0;
  let size = 0;
  for (const stretch of all) {
    // Each stretch counts time from its own start: the square of one turns as the other does.
    const one = lineOf(stretch, lowerCpm, 2 * lowerCpm);
    const two = lineOf(stretch, 2 * lowerCpm, lowerCpm);
    const squareRe = one.re * one.re - one.im * one.im;
    const squareIm = 2 * one.re * one.im;
    re += two.re * squareRe + two.im * squareIm;
    im += two.im * squareRe - two.re * squareIm;
    size += Math.hypot(two.re, two.im) * Math.hypot(squareRe, squareIm);
  }
  return all.length >= LEAST_WINDOWS && size > 0 ? Math.hypot(re, im) / size : 0;
}

/** True where the second harmonic of `lowerCpm` is locked to it in the samples. */
export function isLocked(part: SampledPart, lowerCpm: Cpm): boolean {
  return phaseLock(part, lowerCpm) >= LOCKED;
}
