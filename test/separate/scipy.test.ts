import { readFileSync } from 'node:fs';
import { describe, expect, test } from 'vitest';
import { DEFAULT_SETTINGS, type HeartRouteName } from '../../src/recording/settings';
import { createSeparation } from '../../src/separate/separation';
import { ALL_ROUTES } from './all-routes';
import { mixture } from './mixture';

interface Case {
  readonly rate_hz: number;
  readonly step: number;
  readonly band: { recorded: number[]; slow: number[]; heart: number[] };
  readonly fractional: {
    memory_s: number;
    slow: number[];
    heart: number[];
    gain_at_1_3_6_9_cpm: number[];
  };
}

const reference: {
  seconds: number;
  clean_s: [number, number];
  heart_stride: number;
  cases: Case[];
} = JSON.parse(readFileSync(new URL('../reference/separate-scipy.json', import.meta.url), 'utf8'));

function separated(one: Case, route: HeartRouteName, block: number) {
  const x = mixture(one.rate_hz, reference.seconds);
  const settings = {
    ...DEFAULT_SETTINGS,
    slowRoute: route,
    heartRoute: route,
    slowGain: 'even' as const,
    fractional: { ...DEFAULT_SETTINGS.fractional, memoryS: one.fractional.memory_s },
  };
  const separation = createSeparation({
    lead: '#1',
    rateHz: one.rate_hz,
    sampleCount: x.length,
    settings,
    routes: ALL_ROUTES,
    wants: { slow: true, heart: true },
  });
  for (let at = 0; at < x.length; at += block) separation.push(x.subarray(at, at + block));
  const { slow, heart } = separation.finish();
  if (!slow || !heart) throw new Error('both outputs were asked for');
  return { slow, heart };
}

/** Greatest difference over the greatest value, from the start of the clean stretch on. */
function misfit(ours: ArrayLike<number>, theirs: readonly number[], rateHz: number, stride = 1) {
  const first = reference.clean_s[0] * rateHz;
  const size = Math.max(...theirs.map(Math.abs));
  return Math.max(...theirs.map((value, i) => Math.abs(ours[first + i * stride] - value))) / size;
}

const SINGLE_PRECISION = 1e-7;

describe.each(reference.cases)('a mixture at $rate_hz Hz, parted by scipy step by step', (one) => {
  const stride = reference.heart_stride;

  test('route band gives the same 4 Hz lead, slow wave and heartbeat', () => {
    const { slow, heart } = separated(one, 'band', 10_007);
    expect(misfit(slow.recorded, one.band.recorded, 4)).toBeLessThan(1e-9);
    expect(misfit(slow.slowWave, one.band.slow, 4)).toBeLessThan(1e-9);
    expect(heart.rateHz).toBe(one.rate_hz / one.step);
    expect(misfit(heart.heartbeat, one.band.heart, heart.rateHz, stride)).toBeLessThan(
      SINGLE_PRECISION,
    );
  });

  test('route fractional gives the same slow wave and heartbeat from one pass', () => {
    const { slow, heart } = separated(one, 'fractional', 30_011);
    expect(misfit(slow.slowWave, one.fractional.slow, 4)).toBeLessThan(1e-9);
    expect(misfit(heart.heartbeat, one.fractional.heart, heart.rateHz, stride)).toBeLessThan(
      SINGLE_PRECISION,
    );
  });

  test('the power response that is divided out is that of derivative and smoothing', () => {
    const { slow } = separated(one, 'fractional', 100_000);
    const gains = one.fractional.gain_at_1_3_6_9_cpm;
    [1, 3, 6, 9].forEach((cpm, i) => {
      const power = slow.powerResponse?.(cpm / 60) ?? Number.NaN;
      expect(power).toBeCloseTo((gains[i] / gains[1]) ** 2, 9);
    });
  });
});
