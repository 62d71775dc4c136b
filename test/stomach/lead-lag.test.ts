import { describe, expect, it } from 'vitest';
import { coherenceAt } from '../../src/numeric/coherence-at';
import { crossPhaseSd } from '../../src/numeric/coherence-level';
import { createRandom } from '../../src/numeric/random';
import { lagAtDf } from '../../src/stomach/lead-lag';
import { noise } from '../numeric/signals';
import reference from '../reference/stomach-lead-lag.json';

// Reference: scipy.signal.csd and coherence on two leads of known lag (test/reference/stomach-lead-lag.py).
const FIRST = Float64Array.from(reference.first);
const SECOND = Float64Array.from(reference.second);
const IN_PHASE = { rateHz: 4, dfCpm: 3, segmentS: 120, stepS: 30 };

describe('coherence and phase at DF', () => {
  it.each([0, 1, 2])(
    'are scipy’s, and the level follows from what the segments are worth (%i)',
    (i) => {
      const want = reference.pairs[i];
      const [x, y] = i === 2 ? [SECOND, FIRST] : [FIRST, SECOND];
      const { segmentS, stepS, freqHz } = want;
      const got = coherenceAt(x, y, { rateHz: 4, freqHz, segmentS, stepS, falseAlarm: 0.05 });
      expect(got.segments).toBe(want.segments);
      expect(got.averages).toBeCloseTo(want.averages, 9);
      expect(got.looks).toBeCloseTo(want.looks, 9);
      expect(got.level).toBeCloseTo(want.level, 9);
      expect(got.coherence).toBeCloseTo(want.coherence, 9);
      expect(got.phaseRad).toBeCloseTo(want.phaseRad, 9);
      expect(crossPhaseSd(want.coherence, want.looks)).toBeCloseTo(want.phaseSd, 12);
    },
  );

  it('stays under its level in about 95 of 100 pairs of unrelated noise', () => {
    let above = 0;
    for (let i = 0; i < 300; i += 1) {
      const { lag } = lagAtDf(noise(7200, 2 * i + 1), noise(7200, 2 * i + 2), IN_PHASE);
      if (lag) above += 1;
    }
    expect(above / 300).toBeGreaterThan(0.03);
    expect(above / 300).toBeLessThan(0.08);
  });
});

describe('the lag of the second lead behind the first', () => {
  it('is above 0 where the second shows the wave later, and turns its sign with the leads', () => {
    const { lag } = lagAtDf(FIRST, SECOND, IN_PHASE);
    const { lag: turned } = lagAtDf(SECOND, FIRST, IN_PHASE);
    if (!lag || !turned) throw new Error('the leads are not coherent');
    expect(Math.abs(lag.lagS - reference.lagS)).toBeLessThan(0.25);
    const { freqHz, lagS } = reference.pairs[0];
    const there = lagAtDf(FIRST, SECOND, { ...IN_PHASE, dfCpm: 60 * freqHz });
    expect(there.lag?.lagS).toBeCloseTo(lagS, 9);
    expect(lag.lowS).toBeLessThan(reference.lagS);
    expect(lag.highS).toBeGreaterThan(reference.lagS);
    expect(turned.lagS).toBeCloseTo(-lag.lagS, 9);
    expect(turned.lowS).toBeCloseTo(-lag.highS, 9);
  });

  it('is known up to half a cycle only', () => {
    const wave = (delayS: number, seed: number) => {
      const own = noise(7200, seed);
      return own.map((value, i) => value + 10 * Math.cos(2 * Math.PI * 0.05 * (i / 4 - delayS)));
    };
    const lagOf = (delayS: number) => lagAtDf(wave(0, 1), wave(delayS, 2), IN_PHASE).lag?.lagS;
    expect(lagOf(8)).toBeCloseTo(8, 0);
    expect(lagOf(12)).toBeCloseTo(-8, 0);
  });

  it('lies within its 95 % range in 92 to 98 of 100 invented pairs', () => {
    let inside = 0;
    for (let i = 0; i < 200; i += 1) {
      const random = createRandom(i + 1);
      let cycles = 0;
      let drift = 0;
      const shown = Float64Array.from({ length: 7206 }, () => {
        drift = 0.997 * drift + 0.077 * random.gaussian();
        cycles += (3 + 0.1 * drift) / 240;
        return Math.cos(2 * Math.PI * cycles);
      });
      const lead = (late: number) =>
        Float64Array.from({ length: 7200 }, (_, k) => shown[k + 6 - late] + 2 * random.gaussian());
      const { lag } = lagAtDf(lead(0), lead(6), IN_PHASE);
      if (lag && lag.lowS <= 1.5 && 1.5 <= lag.highS) inside += 1;
    }
    expect(inside / 200).toBeGreaterThanOrEqual(0.92);
    expect(inside / 200).toBeLessThanOrEqual(0.98);
  });

  it('is not said of unrelated leads, nor where fewer than two clean stretches are left', () => {
    expect(lagAtDf(noise(7200, 7), noise(7200, 8), IN_PHASE).lag).toBeNull();
    const torn = SECOND.map((value, i) => (i % 400 === 399 ? Number.NaN : value));
    expect(lagAtDf(FIRST, torn, IN_PHASE)).toMatchObject({
      coherence: null,
      segments: 0,
      lag: null,
    });
    expect(lagAtDf(new Float64Array(0), new Float64Array(0), IN_PHASE).lag).toBeNull();
  });

  it('comes from the clean stretches alone', () => {
    const torn = SECOND.slice();
    torn.fill(1e5, 1000, 1100);
    const there = torn.map((value, i) => (i >= 1000 && i < 1100 ? Number.NaN : value));
    const { lag, segments } = lagAtDf(FIRST, there, IN_PHASE);
    expect(segments).toBeLessThan(reference.pairs[0].segments);
    expect(Math.abs((lag?.lagS ?? 0) - reference.lagS)).toBeLessThan(0.4);
  });
});
