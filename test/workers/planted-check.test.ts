import { describe, expect, it } from 'vitest';
import type { PlantedWave } from '../../src/recording/evidence/planted';
import { DEFAULT_SETTINGS, type Settings } from '../../src/recording/settings';
import { bandRoute } from '../../src/separate/band';
import type { Route } from '../../src/separate/route';
import { createSeparation } from '../../src/separate/separation';
import { slowWaveRhythm } from '../../src/stomach/slow-wave-rhythm';
import { checkPlan } from '../../src/trust/stretches';
import { startJob } from '../../workers/job';
import { leftoverOfLead } from '../../workers/pipeline-leftover';
import type { SlowCheck } from '../../workers/pipeline-planted-judge';
import { routedLead } from '../../workers/pipeline-planted-route';
import { plantedSlow, plantedWaves } from '../../workers/pipeline-planted-slow';
import { ALL_ROUTES } from '../separate/all-routes';
import { BACKGROUNDS, fieldWave } from '../stomach/field';
import { RATE_HZ } from '../stomach/leads';

const { job } = startJob(() => undefined);
const MINUTES = 36;
const DURATION_S = 60 * MINUTES;
const LENGTH = DURATION_S * RATE_HZ;
const PHASES = [{ name: 'whole', fromS: 0, toS: DURATION_S }];
const plus = (a: Float64Array, b: Float64Array) => a.map((value, i) => value + b[i]);

/** A check of a lead at 4 Hz, made as the pipeline makes it. */
async function checkOf(recorded: Float64Array, settings: Settings): Promise<SlowCheck> {
  const separation = createSeparation({
    lead: '#1',
    rateHz: RATE_HZ,
    sampleCount: recorded.length,
    settings,
    routes: ALL_ROUTES,
    wants: { slow: true, heart: false },
  });
  separation.push(recorded);
  const { slow } = separation.finish();
  if (!slow) throw new Error('there is a slow wave');
  const { rhythm } = slowWaveRhythm({
    slow,
    spoiled: [],
    phases: PHASES,
    settings,
    breathing: null,
  });
  const leftover = await leftoverOfLead({ slow, spoiled: [], rhythm }, job);
  if (!leftover) throw new Error('there is a leftover');
  return {
    lead: await routedLead(slow, settings, { rateHz: RATE_HZ, sampleCount: recorded.length }, null),
    leftover,
    spoiled: [],
    breathing: null,
    epochs: rhythm.epochs,
    plan: checkPlan(PHASES, DURATION_S),
    drawing: { kept: new Uint8Array(recorded.length).fill(1), breathing: null },
  };
}

/** The same check with what is really left of the lead in place of what the program makes of it. */
function withTruth(check: SlowCheck, noise: Float64Array): SlowCheck {
  const change = noise.map((value, i) => value - check.lead.slow.recorded[i]);
  return { ...check, leftover: { lead: noise, change, restDb: null } };
}

const at = (waves: readonly PlantedWave[], cpm: number, k = 0) => {
  const found = waves.filter(({ rate }) => rate.kind === 'steady' && rate.cpm === cpm)[k];
  if (!found?.snrDb || !found.scale || !found.delayS) throw new Error(`no score at ${cpm} cpm`);
  return {
    snrDb: found.snrDb.median,
    scale: found.scale.median,
    delayS: found.delayS.median,
    rightPct: (100 * found.right) / found.epochs,
    dfErrorCpm: found.dfErrorCpm?.median ?? Number.NaN,
  };
};

/** Mean power between two rates, by Welch's method in its plainest form. */
function powerWithin(x: Float64Array, fromCpm: number, toCpm: number): number {
  const n = 240 * RATE_HZ;
  let [power, windows] = [0, 0];
  for (let first = 0; first + n <= x.length; first += n / 2) {
    for (let bin = Math.round(fromCpm * 4); bin <= toCpm * 4; bin += 1) {
      let [re, im] = [0, 0];
      for (let i = 0; i < n; i += 1) {
        const taper = 0.5 - 0.5 * Math.cos((2 * Math.PI * i) / n);
        re += taper * x[first + i] * Math.cos((2 * Math.PI * bin * i) / n);
        im += taper * x[first + i] * Math.sin((2 * Math.PI * bin * i) / n);
      }
      power += (2 * (re * re + im * im)) / (n * 0.375 * n);
    }
    windows += 1;
  }
  return power / windows;
}

const noise = BACKGROUNDS['1/f'](LENGTH, 17);
const own = fieldWave(LENGTH, {
  cpmAt: () => 3,
  uvAt: () => 100,
  wanderCpm: 0.06,
  wanderShare: 0.1,
  seed: 12,
});
const recorded = plus(noise, own.uv);

describe('the planted check of a slow wave', () => {
  it('scores as the same waves would be scored in the lead’s true noise', async () => {
    const check = await checkOf(recorded, DEFAULT_SETTINGS);
    const found = await plantedWaves(check, [100, 40], job);
    const true_ = await plantedWaves(withTruth(check, noise), [100, 40], job);
    const apartDb: number[] = [];
    for (const cpm of [1.5, 3, 5.5])
      for (const k of [0, 1]) {
        const [a, b] = [at(found, cpm, k), at(true_, cpm, k)];
        apartDb.push(a.snrDb - b.snrDb);
        expect(Math.abs(a.rightPct - b.rightPct)).toBeLessThan(5);
        expect(Math.abs(a.dfErrorCpm - b.dfErrorCpm)).toBeLessThan(0.02);
      }
    // Two draws of the same noise differ by 1.6 dB (one sigma) in the median of eight stretches, so the rates are taken together.
    expect(Math.abs(apartDb.reduce((sum, one) => sum + one, 0) / apartDb.length)).toBeLessThan(2);
    expect(Math.max(...apartDb.map(Math.abs))).toBeLessThan(4);
  });

  it('reads the study’s own height and says how small a wave it could show', async () => {
    const found = await plantedSlow(await checkOf(recorded, DEFAULT_SETTINGS), job);
    if (found.kind !== 'planted') throw new Error(found.reason);
    expect(found.ownFrom).toBe('rhythm');
    expect(found.ownUv).toBeGreaterThan(90);
    expect(found.ownUv).toBeLessThan(110);
    expect(found.stretches).toBeGreaterThanOrEqual(8);
    // Twice the smallest wave is found in the true noise, a quarter of it is not.
    for (const { cpm, uv } of found.smallest) {
      if (uv === null) throw new Error('every rate is reached');
      const true_ = withTruth(await checkOf(recorded, DEFAULT_SETTINGS), noise);
      const waves = await plantedWaves(true_, [2 * uv, uv / 4], job);
      expect(at(waves, cpm, 0).rightPct).toBeGreaterThan(95);
      expect(
        waves.filter(({ rate }) => rate.kind === 'steady' && rate.cpm === cpm)[1].right,
      ).toBeLessThan(0.8 * found.epochs);
    }
  });

  it('gives a wave as strong as the noise that passes with it less than 3 dB where there is no slow wave', async () => {
    // The plain band passes 0.8 to 10 cpm; the fitted gain about the 0.25 cpm to each side that windows of 240 s resolve.
    const bands = { even: [0.8, 10], fitted: null } as const;
    for (const slowGain of ['even', 'fitted'] as const) {
      const check = await checkOf(noise, { ...DEFAULT_SETTINGS, slowGain });
      for (const cpm of [1.5, 3, 5.5]) {
        const [low, high] = bands[slowGain] ?? [cpm - 0.25, cpm + 0.25];
        const uv = Math.sqrt(2 * powerWithin(noise, low, high));
        expect(at(await plantedWaves(check, [uv], job), cpm).snrDb).toBeLessThan(3);
        expect(at(await plantedWaves(check, [10 * uv], job), cpm).snrDb).toBeGreaterThan(12);
      }
    }
  });

  it('exposes a wrong band', async () => {
    const wrong: Settings = { ...DEFAULT_SETTINGS, slowBandCpm: [4.5, 10] };
    const [good, bad] = [
      await plantedWaves(await checkOf(recorded, DEFAULT_SETTINGS), [100], job),
      await plantedWaves(await checkOf(recorded, wrong), [100], job),
    ];
    expect(at(bad, 3).snrDb).toBeLessThan(at(good, 3).snrDb - 10);
    expect(at(bad, 3).scale).toBeLessThan(0.3);
    expect(at(bad, 5.5).snrDb).toBeGreaterThan(at(good, 5.5).snrDb - 3);
  });

  it('exposes a wrong window of the fractional route', async () => {
    const route = (slowWindowMs: number): Settings => ({
      ...DEFAULT_SETTINGS,
      slowRoute: 'fractional',
      fractional: { ...DEFAULT_SETTINGS.fractional, slowWindowMs, order: 0.3 },
    });
    const [good, bad] = [
      await plantedWaves(await checkOf(recorded, route(1000)), [100], job),
      await plantedWaves(await checkOf(recorded, route(40_000)), [100], job),
    ];
    expect(at(good, 3).scale).toBeGreaterThan(0.8);
    expect(at(bad, 3).scale).toBeLessThan(0.5);
    expect(at(bad, 5.5).snrDb).toBeLessThan(at(good, 5.5).snrDb - 10);
  });

  it('exposes a route that draws the wave late, or draws something else', async () => {
    const broken = (draw: (drawn: Float64Array) => Float64Array): Route => ({
      ...bandRoute,
      *redraw(...args) {
        const drawn = yield* bandRoute.redraw(...args);
        return { ...drawn, slowWave: draw(drawn.slowWave) };
      },
    });
    const check = await checkOf(recorded, DEFAULT_SETTINGS);
    const by = (route: Route) =>
      plantedWaves(
        { ...check, lead: { ...check.lead, routes: new Map([['band', route] as const]) } },
        [100],
        job,
      );
    const late = at(await by(broken((x) => x.map((_, i) => x[Math.max(0, i - 12)]))), 3);
    expect(Math.abs(late.delayS - 3)).toBeLessThan(0.15);
    const half = at(await by(broken((x) => x.map((value) => value / 2))), 3);
    expect(half.scale).toBeCloseTo(0.5, 1);
    const other = at(await by(broken((x) => x.map((_, i) => noise[i]))), 3);
    expect(other.snrDb).toBeLessThan(-3);
  });

  it('takes the route at the recording’s rate as the study was taken', async () => {
    const settings: Settings = { ...DEFAULT_SETTINGS, slowRoute: 'fractional' };
    const check = await checkOf(recorded, settings);
    const found = at(await plantedWaves(check, [100], job), 3);
    // Order 0.5 leads by an eighth of a cycle: 2.5 s at 3 cpm, arithmetic.
    expect(Math.abs(found.delayS + 2.5)).toBeLessThan(0.2);
    expect(found.scale).toBeCloseTo(1, 1);
  });
});
