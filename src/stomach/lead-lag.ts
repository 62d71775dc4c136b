import { coherenceAt } from '../numeric/coherence-at';
import { crossPhaseSd } from '../numeric/coherence-level';
import { type Cpm, cpmToHz, type Hertz } from '../units/rate';
import type { Seconds } from '../units/time';

/** False-alarm rate of the level that coherence has to be above. */
const FALSE_ALARM = 0.05;
/** Two-sided 95 % point of the normal distribution. */
const Z95 = 1.959963984540054;

export interface LagOptions {
  readonly rateHz: Hertz;
  readonly dfCpm: Cpm;
  /** Length of the segments that are averaged, and time from one to the next. */
  readonly segmentS: Seconds;
  readonly stepS: Seconds;
}

/** What two leads say of each other at DF. */
export interface LagAtDf {
  /** Magnitude-squared, 0 to 1; null where fewer than two independent segments are whole. */
  readonly coherence: number | null;
  /** What unrelated noise stays under in 95 of 100 cases. */
  readonly level: number;
  readonly segments: number;
  /** Null where coherence does not stand above the level. */
  readonly lag: LagWithRange | null;
}

/** How much later the second lead is than the first, from minus to plus half a cycle, with its 95 % range by chance. */
export interface LagWithRange {
  readonly lagS: Seconds;
  readonly lowS: Seconds;
  readonly highS: Seconds;
}

/**
 * Coherence of two leads at DF and, where it stands above the level of unrelated noise, how much later the second is: minus
 * the phase of the cross-spectrum over 2 pi DF (Carter 1987), with the range that the coherence leaves it (Bendat & Piersol
 * 1980, for as many independent looks at a steady wave as the overlapping segments are worth). x and y are the leads at one rate and of one length, NaN where they are spoiled or missing. A lag is known up to
 * whole cycles only.
 */
export function lagAtDf(x: Float64Array, y: Float64Array, options: LagOptions): LagAtDf {
  const freqHz = cpmToHz(options.dfCpm);
  const found = coherenceAt(x, y, { ...options, freqHz, falseAlarm: FALSE_ALARM });
  const { coherence, level, segments, looks, phaseRad } = found;
  if (coherence === null || !(coherence > level)) return { coherence, level, segments, lag: null };
  const perRadian = 1 / (2 * Math.PI * freqHz);
  const lagS = phaseRad === 0 ? 0 : -phaseRad * perRadian;
  const half = Z95 * crossPhaseSd(coherence, looks) * perRadian;
  return { coherence, level, segments, lag: { lagS, lowS: lagS - half, highS: lagS + half } };
}
