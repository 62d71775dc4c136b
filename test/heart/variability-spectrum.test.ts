import { describe, expect, it } from 'vitest';
import { bandPower } from '../../src/heart/band-power';
import { bandFloorMs2, rmssdFloorMs } from '../../src/heart/timing-floor';
import {
  lombBandPowers,
  resampledTachogram,
  welchBandPowers,
} from '../../src/heart/variability-spectrum';
import { lombScargle } from '../../src/numeric/lomb-scargle';
import { HEART_REFERENCE } from './reference';
import { randomOf, sinusIntervals } from './rhythms';

const LF = [0.04, 0.15] as const;
const HF = [0.15, 0.4] as const;
const within = (got: number, wanted: number, share: number) =>
  expect(Math.abs(got / wanted - 1), `${got} for ${wanted}`).toBeLessThan(share);

describe('LF and HF', () => {
  /** CV-28: 20 ms at 0.10 Hz and 10 ms at 0.25 Hz for 300 s at 4 Hz; intervals of 250 ms, so that spacing is the value. */
  const timesS = Float64Array.from({ length: 1200 }, (_, i) => i / 4);
  const values = timesS.map(
    (t) => 250 + 20 * Math.sin(2 * Math.PI * 0.1 * t) + 10 * Math.sin(2 * Math.PI * 0.25 * t),
  );

  it('CV-28: 200 and 50 ms2, ratio 4, by Lomb-Scargle', () => {
    const [lf, hf] = lombBandPowers(timesS, values, [LF, HF]);
    within(lf, 200, 0.005);
    within(hf, 50, 0.005);
    within(lf / hf, 4, 0.005);
    within((100 * lf) / (lf + hf), 80, 0.005);
  });

  it('CV-28: the same by Welch', () => {
    const [lf, hf] = welchBandPowers(timesS, values, [LF, HF]);
    within(lf, 200, 0.005);
    within(hf, 50, 0.005);
  });

  it('CV-31: the peak of ten uneven samples of 0.25 Hz lies at 0.2501 Hz', () => {
    const t = Float64Array.of(0, 0.8, 1.7, 2.5, 3.6, 4.4, 5.1, 6.3, 7.0, 8.2);
    const y = t.map((at) => Math.sin(2 * Math.PI * 0.25 * at));
    const freqs = Float64Array.from({ length: 4001 }, (_, k) => 0.05 + k * 1e-4);
    const density = lombScargle(t, y, freqs);
    expect(freqs[density.indexOf(Math.max(...density))]).toBeCloseTo(0.2501, 2);
  });

  HEART_REFERENCE.spectra.forEach(({ timesS: times, rrMs, lomb, welch }, index) => {
    it(`equal scipy's on series ${index + 1} (${times.length} intervals)`, () => {
      const [t, y] = [Float64Array.from(times), Float64Array.from(rrMs)];
      const [lf, hf] = lombBandPowers(t, y, [LF, HF]);
      within(lf, lomb.lf, 1e-9);
      within(hf, lomb.hf, 1e-9);
      if (welch === null) return;
      const second = welchBandPowers(t, y, [LF, HF]);
      within(second[0], welch.lf, 1e-9);
      within(second[1], welch.hf, 1e-9);
    });
  });

  it('do not change their mean when one interval in twelve is taken out', () => {
    const random = randomOf(31);
    const ratios = { lf: 0, hf: 0 };
    for (let run = 0; run < 40; run += 1) {
      const rr = sinusIntervals(
        { lengthS: 300, rateBpm: 70, breathingSwing: 0.05, breathsPerMinute: 15, noise: 0.01 },
        random,
      );
      let timeS = 0;
      const times = rr.map((one) => {
        timeS += one / 1000;
        return timeS;
      });
      const kept = rr.map(() => (random.uniform() < 1 / 12 ? 0 : 1));
      const whole = lombBandPowers(times, rr, [LF, HF]);
      const part = lombBandPowers(
        times.filter((_, i) => kept[i] === 1),
        rr.filter((_, i) => kept[i] === 1),
        [LF, HF],
      );
      ratios.lf += part[0] / whole[0] / 40;
      ratios.hf += part[1] / whole[1] / 40;
    }
    expect(ratios.lf).toBeGreaterThan(0.95);
    expect(ratios.lf).toBeLessThan(1.05);
    expect(ratios.hf).toBeGreaterThan(0.9);
    expect(ratios.hf).toBeLessThan(1.05);
  });

  it('count nothing above half the heart rate', () => {
    const slow = Float64Array.from({ length: 150 }, (_, i) => 2000 + (i % 2) * 100);
    let timeS = 0;
    const times = slow.map((one) => {
      timeS += one / 1000;
      return timeS;
    });
    const [, hf] = lombBandPowers(times, slow, [LF, HF]);
    expect(hf).toBeLessThan(2600);
  });

  it('have no number for fewer than three intervals, nor Welch where no window of 64 s fits', () => {
    const few = Float64Array.of(1, 2);
    expect(lombBandPowers(few, few, [LF, HF])).toEqual([Number.NaN, Number.NaN]);
    const t = Float64Array.from({ length: 50 }, (_, i) => i + 1);
    expect(welchBandPowers(t, t, [LF])).toEqual([Number.NaN]);
  });
});

describe('tachogram between removed intervals', () => {
  it('is a straight line, not a swing of the spline', () => {
    const times = Float64Array.of(1, 2, 3, 4, 14, 15, 16, 17);
    const rr = Float64Array.of(1000, 900, 1100, 900, 1100, 900, 1100, 1000);
    const even = resampledTachogram(times, rr);
    expect(Math.max(...even)).toBeLessThan(1200);
    expect(Math.min(...even)).toBeGreaterThan(800);
    expect(even[4 * 8]).toBeCloseTo(1000, 0);
  });
});

describe('band power', () => {
  it('shares the cell that a limit cuts between the two bands', () => {
    const flat = new Float64Array(101).fill(2);
    expect(bandPower(flat, 0, 0.01, [0.04, 0.15])).toBeCloseTo(0.22, 12);
    expect(bandPower(flat, 0, 0.01, [0.1533, 0.4])).toBeCloseTo(2 * (0.4 - 0.1533), 12);
  });
});

describe('timing floor', () => {
  it('CV-29: rounding to 8 ms gives an RMSSD of 5.657 ms', () => {
    expect(rmssdFloorMs(8 / Math.sqrt(12))).toBeCloseTo(5.657, 3);
  });

  it.each(HEART_REFERENCE.floors)('HF of errors of $sdMs ms at $meanMs ms', (one) => {
    within(bandFloorMs2(one.sdMs, one.meanMs, HF), one.hfMs2, 1e-7);
    within(bandFloorMs2(one.sdMs, one.meanMs, HF), one.hfDrawnMs2, 0.02);
    within(rmssdFloorMs(one.sdMs), one.rmssdDrawnMs, 0.005);
  });
});
