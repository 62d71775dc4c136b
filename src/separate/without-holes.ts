import { nanRuns } from '../numeric/nan-runs';

/** A signal whose NaN are filled by the straight line between what lies beside them; at the ends held. */
export function withoutHoles(signal: Float64Array): Float64Array {
  const filled = signal.slice();
  for (const { from, to } of nanRuns(signal)) {
    const after = to < signal.length ? signal[to] : from > 0 ? signal[from - 1] : 0;
    const before = from > 0 ? signal[from - 1] : after;
    for (let i = from; i < to; i++)
      filled[i] = before + ((after - before) * (i - from + 1)) / (to - from + 1);
  }
  return filled;
}
