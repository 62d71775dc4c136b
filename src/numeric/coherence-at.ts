import { coherenceLevel } from './coherence-level';
import { crossSpectrum } from './cross-spectrum';
import { atan2 } from './elementary';
import { effectiveAverages, hannPeriodic } from './windows';

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
  /** Whole segments, and how many independent ones they are worth. */
  readonly segments: number;
  readonly averages: number;
  /** Phase of the cross-spectrum in radians, above 0 where y is ahead of x; NaN without coherence. */
  readonly phaseRad: number;
}

const FEWEST_AVERAGES = 2;
/** The bin taken lies within half a step of the frequency; one bin serves both signals. */
const MOST_STEP_HZ = 0.0025;

function sizeOf(rateHz: number, length: number): number {
  let size = 64;
  while (size < length || rateHz / size > MOST_STEP_HZ) size *= 2;
  return size;
}

/** Segments, laid as crossSpectrum lays them, that hold no NaN of either signal. */
function wholeSegments(x: Float64Array, y: Float64Array, length: number, step: number): number {
  let count = 0;
  let lastTorn = -1;
  for (let i = 0; i < x.length; i += 1) {
    if (Number.isNaN(x[i]) || Number.isNaN(y[i])) lastTorn = i;
    const from = i + 1 - length;
    if (from >= 0 && from % step === 0 && lastTorn < from) count += 1;
  }
  return count;
}

/**
 * Coherence and phase of two signals of one rate and length at one frequency, over Hann segments less their line; segments
 * with a NaN in either are left out (Carter 1987). The level is that of the independent segments that the overlapping ones
 * are worth (Welch 1967).
 */
export function coherenceAt(
  x: Float64Array,
  y: Float64Array,
  { rateHz, freqHz, segmentS, stepS, falseAlarm }: CoherenceOptions,
): CoherenceAt {
  const length = Math.max(2, Math.round(segmentS * rateHz));
  const step = Math.max(1, Math.round(stepS * rateHz));
  const taper = hannPeriodic(length);
  const segments = wholeSegments(x, y, length, step);
  const averages = segments > 0 ? effectiveAverages(segments, taper, step) : 0;
  const level = coherenceLevel(averages, falseAlarm);
  if (averages < FEWEST_AVERAGES)
    return { coherence: null, level, segments, averages, phaseRad: Number.NaN };
  const size = sizeOf(rateHz, length);
  const { cross, coherence } = crossSpectrum(x, y, { rateHz, taper, step, size, detrend: 'line' });
  const bin = Math.round((freqHz * size) / rateHz);
  const phaseRad = atan2(cross[2 * bin + 1], cross[2 * bin]);
  return { coherence: coherence[bin], level, segments, averages, phaseRad };
}
