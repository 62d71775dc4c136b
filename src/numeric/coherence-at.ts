import { coherenceLevel } from './coherence-level';
import { removeLine } from './detrend';
import { atan2, cos, sin } from './elementary';
import { effectiveAverages, effectiveLooks, hannPeriodic } from './windows';

export interface CoherenceOptions {
  readonly rateHz: number;
  readonly freqHz: number;
  /** Length of the Hann segments that are averaged, and time from one to the next, in seconds. */
  readonly segmentS: number;
  readonly stepS: number;
  readonly falseAlarm: number;
}

/** What two signals share at one frequency. */
export interface CoherenceAt {
  /** Magnitude-squared, 0 to 1; null where the whole segments are worth fewer than two independent ones. */
  readonly coherence: number | null;
  /** What unrelated noise stays under, but for the false-alarm rate. */
  readonly level: number;
  /** Whole segments, how many independent spectra they are worth, and how many looks at a steady wave. */
  readonly segments: number;
  readonly averages: number;
  readonly looks: number;
  /** Phase of the cross-spectrum in radians, above 0 where y is ahead of x; NaN without coherence. */
  readonly phaseRad: number;
}

const FEWEST_AVERAGES = 2;

/** The taper times cosine and sine of the frequency's angle. */
function tapered(length: number, turn: number): readonly [Float64Array, Float64Array] {
  const taper = hannPeriodic(length);
  return [taper.map((one, i) => one * cos(turn * i)), taper.map((one, i) => one * sin(turn * i))];
}

/** Fourier sum of a segment less its line at the frequency of the kernel; null where a sample is missing. */
function sumAt(
  segment: Float64Array,
  [cosine, sine]: readonly [Float64Array, Float64Array],
): readonly [re: number, im: number] | null {
  for (let i = 0; i < segment.length; i++) if (Number.isNaN(segment[i])) return null;
  const level = removeLine(segment);
  let [re, im] = [0, 0];
  for (let i = 0; i < level.length; i++) {
    re += level[i] * cosine[i];
    im -= level[i] * sine[i];
  }
  return [re, im];
}

/**
 * Coherence and phase of two signals of one rate and length at one frequency, over Hann segments less their line; segments
 * with a NaN in either are left out (Carter 1987). The same as crossSpectrum gives at a bin, without the other bins. The level
 * is that of the independent segments that the overlapping ones are worth (Welch 1967).
 */
export function coherenceAt(
  x: Float64Array,
  y: Float64Array,
  { rateHz, freqHz, segmentS, stepS, falseAlarm }: CoherenceOptions,
): CoherenceAt {
  const length = Math.max(2, Math.round(segmentS * rateHz));
  const step = Math.max(1, Math.round(stepS * rateHz));
  const kernel = tapered(length, (2 * Math.PI * freqHz) / rateHz);
  let [segments, re, im, ofX, ofY] = [0, 0, 0, 0, 0];
  for (let from = 0; from + length <= Math.min(x.length, y.length); from += step) {
    const a = sumAt(x.subarray(from, from + length), kernel);
    const b = a && sumAt(y.subarray(from, from + length), kernel);
    if (!a || !b) continue;
    re += a[0] * b[0] + a[1] * b[1];
    im += a[0] * b[1] - a[1] * b[0];
    ofX += a[0] * a[0] + a[1] * a[1];
    ofY += b[0] * b[0] + b[1] * b[1];
    segments += 1;
  }
  const taper = hannPeriodic(length);
  const averages = segments > 0 ? effectiveAverages(segments, taper, step) : 0;
  const looks = segments > 0 ? effectiveLooks(segments, taper, step) : 0;
  const level = coherenceLevel(averages, falseAlarm);
  if (averages < FEWEST_AVERAGES)
    return { coherence: null, level, segments, averages, looks, phaseRad: Number.NaN };
  const powers = ofX * ofY;
  const coherence = powers > 0 ? Math.min(1, (re * re + im * im) / powers) : 0;
  return { coherence, level, segments, averages, looks, phaseRad: atan2(im, re) };
}
