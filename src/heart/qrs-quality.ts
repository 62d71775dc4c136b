import { log10 } from '../numeric/elementary';
import { bandPassTaps, convolveSame } from '../numeric/fir';
import { median } from '../numeric/statistics';
import { detectBeats } from './detect';
import { LOWEST_RATE_HZ } from './qrs-bands';
import { readFilled, type Samples, usableRanges } from './usable-signal';

/** How well the heartbeat shows in a stretch of a lead. */
export interface QrsQuality {
  /** Median R height, uV; 0 where no heartbeat was found. */
  readonly heightUv: number;
  /** Standard deviation between beats, uV, in the heartbeat's band. */
  readonly noiseUv: number;
  /** R height over noise, dB; -Infinity where no heartbeat was found. */
  readonly snrDb: number;
  readonly beatsPerMinute: number;
  /** 0 to 1: steady beats, alike and clear of the noise. */
  readonly quality: number;
  readonly sign: 1 | -1;
}

const NONE: QrsQuality = {
  heightUv: 0,
  noiseUv: Number.NaN,
  snrDb: Number.NEGATIVE_INFINITY,
  beatsPerMinute: 0,
  quality: 0,
  sign: 1,
};

/** R height over noise at which the clearness of the beats counts a half. */
const HALF_CLEAR = 5;
/** Below this many beats nothing is said. */
const FEWEST_BEATS = 5;

/**
 * Measures the heartbeat in a stretch (10 s or more, unfiltered, uV; NaN in gaps) of a lead, to choose the heart lead by.
 * Quality is the product of three parts, each 0 to 1: R height over noise against 5 more, the share of the stretch that the
 * beats fill at the usual interval, and the share of beats that are of the main shapes (common practice, no source).
 */
export function measureQrs(samples: Samples, rateHz: number): QrsQuality {
  if (!(rateHz >= LOWEST_RATE_HZ)) return NONE;
  const ranges = usableRanges(samples, rateHz, []);
  const top = 0.49 * rateHz;
  const taps = bandPassTaps({
    rateHz,
    lowStopHz: 0.2,
    lowPassHz: 1.2,
    highPassHz: Math.min(36, 0.85 * top),
    highStopHz: Math.min(44, top),
    attenuationDb: 50,
  });
  const heartbeat = convolveSame(
    readFilled(samples, ranges, 0, samples.length),
    taps,
    'reflect-odd',
  );
  for (let i = 0; i < heartbeat.length; i += 1)
    if (Number.isNaN(samples[i])) heartbeat[i] = Number.NaN;
  const found = detectBeats({ heartbeat, rateHz, ticksPerSample: 64 });
  const { ticks } = found.beats;
  if (ticks.length < FEWEST_BEATS) return NONE;
  const rrS = Array.from(ticks.subarray(1), (tick, i) => (tick - ticks[i]) / (64 * rateHz));
  const usualS = median(rrS);
  const usable = ranges.reduce((sum, { from, to }) => sum + to - from, 0) / rateHz;
  const filled = Math.min(1, (ticks.length * usualS) / usable);
  const shaped = Math.min(
    1,
    found.averages.reduce((sum, { count }) => sum + count, 0) / ticks.length,
  );
  const ratio = found.heightUv / Math.max(found.noiseUv, 1e-9);
  return {
    heightUv: found.heightUv,
    noiseUv: found.noiseUv,
    snrDb: 20 * log10(ratio),
    beatsPerMinute: 60 / usualS,
    quality: filled * shaped * (ratio / (ratio + HALF_CLEAR)),
    sign: found.sign,
  };
}
