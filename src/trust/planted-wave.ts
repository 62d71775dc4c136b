import { sin } from '../numeric/elementary';
import { type Cpm, cpmToHz, type Hertz } from '../units/rate';
import type { Seconds } from '../units/time';

/** Rates that a wave is planted at. */
export const PLANTED_CPM = [1.5, 3, 5.5] as const;
/** A drift goes from one rate to the next in so long, and back again. */
const LEG_S: Seconds = 1200;

/** A planted wave: steady, or drifting through all rates there and back. */
export type WavePattern =
  | { readonly kind: 'steady'; readonly cpm: Cpm }
  | { readonly kind: 'drift' };

/** Rate of a planted wave at a time of the study; a drift takes 20 min a leg, all of a shorter study for both. */
export function patternCpm(pattern: WavePattern, atS: Seconds, durationS: Seconds): Cpm {
  if (pattern.kind === 'steady') return pattern.cpm;
  const legs = PLANTED_CPM.length - 1;
  const leg = atS / Math.min(LEG_S, durationS / legs);
  const turned = leg % (2 * legs);
  const at = turned <= legs ? turned : 2 * legs - turned;
  const from = Math.min(legs - 1, Math.floor(at));
  return PLANTED_CPM[from] + (at - from) * (PLANTED_CPM[from + 1] - PLANTED_CPM[from]);
}

/** A planted wave of 1 uV, `length` samples from the study's start; `cycles` is its phase there. */
export function plantedWave(
  pattern: WavePattern,
  length: number,
  rateHz: Hertz,
  cycles: number,
): Float64Array {
  let at = cycles;
  return Float64Array.from({ length }, (_, i) => {
    const value = sin(2 * Math.PI * (at - Math.floor(at)));
    at += cpmToHz(patternCpm(pattern, i / rateHz, length / rateHz)) / rateHz;
    return value;
  });
}
