import { describe, expect, it } from 'vitest';
import type { Epoch } from '../../src/recording/rhythm';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { plantedEpoch } from '../../src/trust/planted-epochs';
import { patternCpm, plantedWave } from '../../src/trust/planted-wave';
import { reachedAt, risingShares, smallestWave, twoDigits } from '../../src/trust/smallest-wave';
import { checkPlan, heartStretches } from '../../src/trust/stretches';
import { waveScore } from '../../src/trust/wave-score';

const RATE_HZ = 4;
const LENGTH = 600 * RATE_HZ;
const ALL = new Uint8Array(LENGTH).fill(1);
const whole = { counts: ALL, from: 0, to: LENGTH };
const sine = (cpm: number, uv: number, lateS = 0) =>
  Float64Array.from(
    { length: LENGTH },
    (_, i) => uv * Math.sin((2 * Math.PI * cpm * (i / RATE_HZ - lateS)) / 60),
  );
const sum = (a: Float64Array, b: Float64Array) => a.map((value, i) => value + b[i]);

describe('the score of a drawn wave', () => {
  it('is the power of what follows the planted wave over that of the rest', () => {
    const drawn = sum(sine(3, 80), sine(7.3, 20));
    const score = waveScore(drawn, sine(3, 100), whole, RATE_HZ);
    expect(score?.snrDb).toBeCloseTo(20 * Math.log10(4), 1);
    expect(score?.scale).toBeCloseTo(0.8, 2);
    expect(score?.delayS).toBeCloseTo(0, 2);
  });

  it('is not spoiled by a delay within 5 s, which it tells between samples', () => {
    const score = waveScore(sine(3, 50, 2.37), sine(3, 100), whole, RATE_HZ);
    expect(score?.snrDb).toBeGreaterThan(40);
    expect(score?.delayS).toBeCloseTo(2.37, 2);
    const early = waveScore(sine(1.5, 50, -2.5), sine(1.5, 100), whole, RATE_HZ);
    expect(early?.delayS).toBeCloseTo(-2.5, 2);
  });

  it('is low for a wave upside down further away than 5 s, and for another wave', () => {
    const upsideDown = sine(1.5, 100).map((value) => -value);
    expect(waveScore(upsideDown, sine(1.5, 100), whole, RATE_HZ)?.snrDb).toBeLessThan(-10);
    expect(waveScore(sine(5, 100), sine(3, 100), whole, RATE_HZ)?.snrDb).toBeLessThan(-15);
  });

  it('counts only what counts, and is none of less than a minute', () => {
    const drawn = sine(3, 100).map((value, i) => (i < 1200 ? 999 : value));
    const counts = ALL.slice().fill(0, 0, 1200);
    expect(
      waveScore(drawn, sine(3, 100), { counts, from: 0, to: LENGTH }, RATE_HZ)?.snrDb,
    ).toBeGreaterThan(50);
    expect(waveScore(drawn, sine(3, 100), { counts, from: 0, to: 1300 }, RATE_HZ)).toBeNull();
  });
});

describe('a planted wave', () => {
  it('drifts through all three rates and back, its crests where its rate says', () => {
    const at = (s: number) => patternCpm({ kind: 'drift' }, s, 7200);
    expect([0, 600, 1200, 2400, 3600, 4800].map(at)).toEqual([1.5, 2.25, 3, 5.5, 3, 1.5]);
    const wave = plantedWave({ kind: 'steady', cpm: 3 }, LENGTH, RATE_HZ, 0);
    expect(wave[20]).toBeCloseTo(1, 9);
    expect(wave[60]).toBeCloseTo(-1, 9);
  });

  it('is found where rhythm and DF are its own, and either rhythm counts where it passes a limit', () => {
    const bands = DEFAULT_SETTINGS.rhythmBands;
    const epoch = (rhythm: Epoch['rhythm'], dfCpm: number): Epoch => ({
      lead: '#1',
      phase: 'whole',
      fromS: 0,
      toS: 240,
      kept: true,
      spoiledFraction: 0,
      dfCpm,
      dpDb: 50,
      peakShare: 0.8,
      rhythm,
      flags: [],
    });
    const steady = () => 3;
    expect(plantedEpoch(epoch('normo', 3.02), steady, 49, bands)).toEqual({
      centreS: 120,
      right: true,
      dfErrorCpm: expect.closeTo(0.02, 9),
      dpErrorDb: 1,
    });
    expect(plantedEpoch(epoch('normo', 3.6), steady, 49, bands).right).toBe(false);
    expect(plantedEpoch(epoch('none', 3), steady, 49, bands).right).toBe(false);
    expect(plantedEpoch(epoch('undecided', 3), steady, 49, bands).right).toBe(false);
    const passing = (s: number) => 1.9 + (0.2 * s) / 240;
    for (const rhythm of ['brady', 'normo', 'mixed'] as const)
      expect(plantedEpoch(epoch(rhythm, 2), passing, 49, bands).right).toBe(true);
  });
});

describe('the smallest wave', () => {
  /** Share found of a detector whose threshold is `uv`: a logistic course in the logarithm. */
  const course = (uv: number) => (size: number) => 1 / (1 + (uv / size) ** 4);

  it('is where a smooth course reaches 95 %', async () => {
    for (const threshold of [2, 17, 130]) {
      const { uv } = await smallestWave(30, async (size) => course(threshold)(size));
      const true95 = threshold * (0.95 / 0.05) ** 0.25;
      expect((uv ?? Number.NaN) / true95).toBeGreaterThan(0.97);
      expect((uv ?? Number.NaN) / true95).toBeLessThan(1.03);
    }
  });

  it('is none where not even the largest is found, and says how often that was', async () => {
    expect(await smallestWave(30, async () => 0.9)).toEqual({ uv: null, mostShare: 0.9 });
    const { uv } = await smallestWave(30, async () => 1);
    expect(uv).toBeLessThan(1);
  });

  it('takes a course that falls between as level', () => {
    const tried = [
      { uv: 10, share: 0.5 },
      { uv: 20, share: 0.96 },
      { uv: 40, share: 0.9 },
      { uv: 80, share: 1 },
    ];
    expect(risingShares(tried).map(({ share }) => Math.round(100 * share))).toEqual([
      50, 93, 93, 100,
    ]);
    expect(reachedAt(tried)).toBeGreaterThan(40);
    expect(reachedAt(tried)).toBeLessThan(80);
  });

  it('is written with two digits', () => {
    expect([8.43, 23.7, 104, 0.512, 10].map(twoDigits)).toEqual([8.4, 24, 100, 0.51, 10]);
  });
});

describe('the stretches of a check', () => {
  const whole = (toS: number) => [{ name: 'whole', fromS: 0, toS }];

  it('are at least eight in a study of 40 minutes, four minutes or longer each', () => {
    const phases = [
      { name: 'fasting', fromS: 0, toS: 1080 },
      { name: 'meal', fromS: 1080, toS: 1260 },
      { name: 'fed', fromS: 1260, toS: 2400 },
    ];
    const { stretches } = checkPlan(phases, 2400);
    expect(stretches).toHaveLength(8);
    for (const { fromS, toS } of stretches) expect(toS - fromS).toBeGreaterThanOrEqual(240);
    expect(stretches.map(({ fromS }) => fromS)).toEqual([0, 270, 540, 810, 1260, 1545, 1830, 2115]);
    expect(stretches.at(-1)?.toS).toBe(2400);
    expect(checkPlan(phases, 2400).phases.map(({ name }) => name)).toEqual(['fasting', 'fed']);
  });

  it('are fewer in a short study and none where no epoch fits', () => {
    expect(checkPlan(whole(600), 600).stretches).toHaveLength(2);
    expect(checkPlan(whole(120), 120).stretches).toEqual([]);
    expect(heartStretches(whole(120), 120)).toHaveLength(2);
    expect(heartStretches(whole(50), 50)).toEqual([]);
  });

  it('are ten pieces of 20 minutes in a day, each inside one phase', () => {
    const phases = [
      { name: 'fasting', fromS: 0, toS: 36_000 },
      { name: 'fed', fromS: 36_000, toS: 86_400 },
    ];
    const { stretches } = checkPlan(phases, 86_400);
    expect(stretches).toHaveLength(10);
    for (const { fromS, toS } of stretches) {
      expect(toS - fromS).toBe(1200);
      expect(phases.some((phase) => fromS >= phase.fromS && toS <= phase.toS)).toBe(true);
    }
  });
});
