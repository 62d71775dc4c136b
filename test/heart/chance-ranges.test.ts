import { describe, expect, it } from 'vitest';
import { NO_BREATHING } from '../../src/heart/breathing';
import { breathingChanceRange, heartChanceRanges } from '../../src/heart/chance-ranges';
import { heartFigures } from '../../src/heart/heart-figures';
import { rrSeries } from '../../src/heart/rr-series';
import { atOnce } from '../../src/numeric/in-steps';
import { numberOf } from '../../src/recording/figure';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { beatsAfter, RATE_HZ, steadyBreathing } from './beats';
import { randomIntervals, randomOf, sinusIntervals } from './rhythms';

const sinus = (lengthS: number, breathingSwing = 0.06, noise = 0.01) =>
  sinusIntervals(
    { lengthS, rateBpm: 66, breathingSwing, breathsPerMinute: 15, noise },
    randomOf(1),
  );

function rangesOf(rrMs: ArrayLike<number>, toS: number) {
  const beats = beatsAfter(rrMs);
  const input = {
    rr: rrSeries(beats, RATE_HZ, []),
    beats,
    rateHz: RATE_HZ,
    part: { name: 'fed', fromS: 0, toS },
    blocked: [],
    settings: DEFAULT_SETTINGS,
    timingSdMs: 1,
    breathing: NO_BREATHING,
  };
  const { figures } = heartFigures(input);
  return { figures, ranges: atOnce(heartChanceRanges({ ...input, figures })) };
}

describe('ranges by chance of the heart’s figures', () => {
  const { figures, ranges } = rangesOf(sinus(1810), 1800);

  it('hold the figure printed, of every figure that scatters', () => {
    const wanted = ['heart_rate_bpm', 'nn_mean_ms', 'rmssd_ms', 'sdsd_ms', 'sd1_ms', 'sd2_ms'];
    wanted.push('sdnn_ms', 'sdnn_whole_ms', 'pnn50_pct', 'lf_ms2', 'hf_ms2', 'lf_hf_ratio');
    wanted.push('lf_nu_pct', 'hf_nu_pct', 'lf_welch_ms2', 'hf_welch_ms2');
    expect(Object.keys(ranges).sort()).toEqual(wanted.sort());
    for (const key of wanted) {
      expect(ranges[key].low, key).toBeLessThan(numberOf(figures[key]));
      expect(ranges[key].high, key).toBeGreaterThan(numberOf(figures[key]));
    }
  });

  it('of SD1 is that of SDSD over the square root of two, of normalised units that of LF/HF', () => {
    expect(ranges.sd1_ms.high).toBeCloseTo(ranges.sdsd_ms.high / Math.SQRT2, 9);
    const { low } = ranges.lf_hf_ratio;
    expect(ranges.lf_nu_pct.low).toBeCloseTo((100 * low) / (1 + low), 6);
    expect(ranges.hf_nu_pct.high).toBeCloseTo(100 - ranges.lf_nu_pct.low, 6);
  });

  it('of a power of fewer than five segments is that of its degrees of freedom (Bendat and Piersol 1971)', () => {
    const short = rangesOf(sinus(610), 600);
    const lf = numberOf(short.figures.lf_ms2);
    // Relative standard error 1 / sqrt(bandwidth x length), on the scale of the logarithm.
    const half = 1.959964 / Math.sqrt(0.11 * 600);
    expect(short.ranges.lf_ms2.high / lf).toBeCloseTo(Math.exp(half), 6);
    expect(short.ranges.lf_ms2.low / lf).toBeCloseTo(Math.exp(-half), 6);
  });

  it('of pNN50 where no step is over 50 ms ends at 0, and is wide', () => {
    const calm = rangesOf(sinus(1810, 0.01, 0.004), 1800);
    expect(numberOf(calm.figures.pnn50_pct)).toBe(0);
    expect(calm.ranges.pnn50_pct.low).toBe(0);
    expect(calm.ranges.pnn50_pct.high).toBeGreaterThan(5);
  });

  it('are told of nothing withheld, and of no two minutes', () => {
    const wild = rangesOf(
      randomIntervals({ lengthS: 1810, rateBpm: 90, spread: 0.2 }, randomOf(4)),
      1800,
    );
    expect(Object.keys(wild.ranges).sort()).toEqual(['heart_rate_bpm', 'nn_mean_ms']);
    expect(Object.keys(rangesOf(sinus(130), 120).ranges)).not.toContain('rmssd_ms');
    expect(rangesOf([], 120).ranges).toEqual({});
  });
});

describe('the range by chance of breathing', () => {
  const part = { name: 'fed', fromS: 0, toS: 1800 };

  it('is told of windows that differ, and not of a rate that never does', () => {
    const steady = steadyBreathing(15, 1800);
    expect(breathingChanceRange(steady, part, 15)).toBeNull();
    const random = randomOf(3);
    const swaying = {
      ...steady,
      perMinute: steady.perMinute.map((rate) => rate + random.gaussian()),
    };
    const range = breathingChanceRange(swaying, part, 15);
    expect(range?.low).toBeLessThan(15);
    expect(range?.high).toBeGreaterThan(15);
    expect(breathingChanceRange(swaying, { ...part, toS: 200 }, 15)).toBeNull();
  });
});
