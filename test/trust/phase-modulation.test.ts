import { describe, expect, it } from 'vitest';
import { atOnce } from '../../src/numeric/in-steps';
import { beatPulses } from '../../src/trust/beat-course';
import { leakVerdict } from '../../src/trust/leak';
import { LEAST_SHIFT_S, PHASE_BINS, phaseModulation } from '../../src/trust/phase-modulation';
import { type BothSpec, bothRhythms, modulationIn, RATE_HZ } from './both-rhythms';

/** Modulations of so many invented studies. */
const studies = (count: number, spec: Omit<BothSpec, 'seed'>) =>
  Array.from({ length: count }, (_, i) =>
    modulationIn(bothRhythms({ ...spec, seed: 7919 * (i + 1) })),
  );

const shareUnder = (found: readonly { readonly p: number }[], p: number) =>
  found.filter((one) => one.p < p).length / found.length;

describe('RR by the phase of the slow wave', () => {
  it('is called more than chance in 3 to 8 % of studies without any tie, and no p is favoured', () => {
    const found = studies(300, { minutes: 20 });
    expect(shareUnder(found, 0.05)).toBeGreaterThanOrEqual(0.03);
    expect(shareUnder(found, 0.05)).toBeLessThanOrEqual(0.08);
    expect(shareUnder(found, 0.5)).toBeGreaterThan(0.4);
    expect(shareUnder(found, 0.5)).toBeLessThan(0.6);
  }, 180_000);

  it('is found where it is 1 %, with its depth and its phase', () => {
    const found = studies(20, { minutes: 30, depthPct: 1, longestRad: 1 });
    expect(shareUnder(found, 0.05)).toBe(1);
    const depths = found.map(({ depth }) => depth / 9);
    expect(Math.min(...depths)).toBeGreaterThan(0.8);
    expect(Math.max(...depths)).toBeLessThan(1.2);
    for (const { peakRad } of found) expect(Math.abs(peakRad - 1)).toBeLessThan(0.3);
  });

  it('is the same whenever it is computed, and is not moved by a level or a slow trend of RR', () => {
    const both = bothRhythms({ seed: 3, minutes: 12, depthPct: 0.4 });
    const once = modulationIn(both);
    expect(modulationIn(both)).toEqual(once);
    const rrMs = both.rrMs.map((rr, i) => rr + 100 + (20 * i) / both.rrMs.length);
    expect(modulationIn({ ...both, rrMs }).depth).toBeCloseTo(once.depth, 0);
  });

  it('is told from chance by shifts of 60 s or more alone', () => {
    const length = 20 * 60 * RATE_HZ;
    const phase = Float64Array.from(
      { length },
      (_, i) => 2 * Math.PI * (((i / RATE_HZ / 20) % 1) - 0.5),
    );
    /** RR follows the phase in one stretch of 50 s only: no shift of 60 s or more brings both together again. */
    const inside = (i: number) => i >= 2000 && i < 2000 + 50 * RATE_HZ;
    const usable = Uint8Array.from(phase, (_, i) => (inside(i) ? 1 : 0));
    const course = phase.map((angle, i) => (inside(i) ? Math.cos(angle) : 0));
    const found = atOnce(phaseModulation({ phase, usable, course, rateHz: RATE_HZ }));
    if (!found) throw new Error('no modulation');
    expect(found.depth).toBeGreaterThan(0.9);
    expect(found.chanceDepth).toBe(0);
    expect(found.pOfSurrogates).toBe(1 / 1000);
    expect(found.p).toBeGreaterThanOrEqual(found.pOfSurrogates);
    expect(LEAST_SHIFT_S).toBe(60);
    expect(found.counts).toHaveLength(PHASE_BINS);
  });

  it('is not computed where no such shift fits, or a phase is never seen', () => {
    const still = (samples: number) => ({
      phase: new Float64Array(samples),
      usable: new Uint8Array(samples).fill(1),
      course: new Float64Array(samples),
      rateHz: RATE_HZ,
    });
    expect(atOnce(phaseModulation(still(400)))).toBeNull();
    expect(atOnce(phaseModulation(still(4000)))).toBeNull();
  });

  it('is known to tell little where the rhythm never wanders', () => {
    const [steady] = studies(1, { minutes: 12, wanderCpm: 0, noiseUv: 5 });
    const [wandering] = studies(1, { minutes: 60, wanderCpm: 0.4 });
    expect(steady.steadiness).toBeGreaterThan(0.9);
    expect(wandering.steadiness).toBeLessThan(0.3);
  });
});

describe('leakage of the heartbeat into the slow-wave lead', () => {
  const AREA = 200;
  /** A lead whose 3 cpm is made by the beats: RR has waves of its own there, and every beat adds its area. */
  const leaky = bothRhythms({
    seed: 5,
    minutes: 20,
    slowUv: 1,
    noiseUv: 1,
    beatAreaUvS: AREA,
    wavesMs: 30,
    wavesHz: 0.05,
  });

  it('makes RR seem to follow the slow wave, which goes once the beats’ share is taken out', () => {
    const { beatTimesS } = leaky;
    const pulses = beatPulses(
      beatTimesS,
      beatTimesS.map(() => 1),
      AREA,
      {
        firstS: 0,
        rateHz: RATE_HZ,
        length: leaky.lead.length,
      },
    );
    const rest = { ...leaky, lead: leaky.lead.map((value, i) => value - pulses[i]) };
    const [found, without] = [modulationIn(leaky), modulationIn(rest)];
    expect(found.p).toBeLessThan(0.05);
    expect(without.depth).toBeLessThan(found.depth / 2);
    expect(
      leakVerdict({
        leakUv: 3,
        slowUv: 4,
        depth: found.depth,
        p: found.p,
        withoutDepth: without.depth,
        withoutP: without.p,
        heightP: null,
      }),
    ).toBe('seen');
  });

  const clean = {
    leakUv: 0.3,
    slowUv: 110,
    depth: 9,
    p: 0.004,
    withoutDepth: 8.9,
    withoutP: 0.005,
    heightP: 0.6,
  };

  it('is seen by any one of its three signs, and by none of them it is not', () => {
    expect(leakVerdict(clean)).toBe('not-seen');
    expect(leakVerdict({ ...clean, leakUv: 11 })).toBe('seen');
    expect(leakVerdict({ ...clean, withoutP: 0.2 })).toBe('seen');
    expect(leakVerdict({ ...clean, withoutDepth: 4 })).toBe('seen');
    expect(leakVerdict({ ...clean, heightP: 0.01 })).toBe('seen');
  });

  it('is not tested where the beats’ share is not known', () => {
    const unknown = { ...clean, leakUv: null, withoutDepth: null, withoutP: null };
    expect(leakVerdict(unknown)).toBe('not-tested');
    expect(leakVerdict({ ...unknown, heightP: null })).toBe('not-tested');
    expect(leakVerdict({ ...unknown, heightP: 0.01 })).toBe('seen');
  });
});
