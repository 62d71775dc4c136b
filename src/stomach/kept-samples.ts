import { nanRuns } from '../numeric/nan-runs';
import type { Interval } from '../recording/span';
import type { Hertz } from '../units/rate';

/** 1 for every sample that is there and lies in no spoiled interval [fromS, toS), 0 for the others. */
export function keptSamples(
  signal: Float64Array,
  rateHz: Hertz,
  spoiled: readonly Interval[],
): Uint8Array {
  const kept = new Uint8Array(signal.length);
  for (let i = 0; i < signal.length; i++) kept[i] = Number.isNaN(signal[i]) ? 0 : 1;
  for (const { fromS, toS } of spoiled) {
    const first = Math.max(0, Math.ceil(fromS * rateHz - 1e-9));
    const end = Math.min(signal.length, Math.ceil(toS * rateHz - 1e-9));
    if (end > first) kept.fill(0, first, end);
  }
  return kept;
}

/** Stretches of missing samples (NaN) in seconds. */
export function missingStretches(signal: Float64Array, rateHz: Hertz): readonly Interval[] {
  return nanRuns(signal).map(({ from, to }) => ({ fromS: from / rateHz, toS: to / rateHz }));
}
