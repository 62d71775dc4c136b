import type { BeatList } from '../recording/beat';
import type { Hertz } from '../units/rate';

/** Half of the stretch about R in which its height is measured. */
const HALF_WIDTH_S = 0.06;

/**
 * Height of each beat in uV: greatest less least value of the heartbeat within 60 ms of R, which holds for any polarity
 * and shape of QRS (after Moody 1985, who takes the QRS area). `ticksPerSample` counts the beats' ticks in one sample of
 * the heartbeat: 64 times its decimation. NaN where samples are missing or the beat lies outside.
 */
export function beatHeights(
  heartbeat: Float32Array | Float64Array,
  rateHz: Hertz,
  beats: BeatList,
  ticksPerSample: number,
): Float64Array {
  const half = Math.max(1, Math.round(HALF_WIDTH_S * rateHz));
  return beats.ticks.map((tick) => {
    const centre = Math.round(tick / ticksPerSample);
    const [from, to] = [centre - half, centre + half];
    if (from < 0 || to >= heartbeat.length) return Number.NaN;
    let [low, high] = [heartbeat[from], heartbeat[from]];
    for (let i = from; i <= to; i += 1) {
      const value = heartbeat[i];
      if (Number.isNaN(value)) return Number.NaN;
      if (value < low) low = value;
      if (value > high) high = value;
    }
    return high - low;
  });
}
