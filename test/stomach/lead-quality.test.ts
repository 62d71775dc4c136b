import { describe, expect, test } from 'vitest';
import { leadQuality } from '../../src/stomach/lead-quality';
import { leadOf, noise, RATE_HZ, wave } from './leads';

const phase = { fromS: 0, toS: 1800 };
const quality = (signal: Float64Array, spoiled: { fromS: number; toS: number }[] = []) =>
  leadQuality(signal, RATE_HZ, spoiled, phase);
const unrest = noise(RATE_HZ * 1800, 0, 60, 2);

describe('quality of a slow-wave lead', () => {
  test('does not depend on the rhythm: brady, normo, tachy and none score alike', () => {
    const scores = [1.5, 3, 6].map((cpm) => quality(leadOf(30, (t) => wave(100, cpm, t))).score);
    scores.push(quality(new Float64Array(RATE_HZ * 1800)).score);
    expect(Math.max(...scores) - Math.min(...scores)).toBeLessThan(0.02);
  });

  test('falls with unrest above the stomach’s band, and says so', () => {
    const quiet = quality(leadOf(30, (t) => wave(100, 3, t)));
    const restless = quality(leadOf(30, (t) => wave(100, 3, t) + unrest[Math.round(t * RATE_HZ)]));
    expect(restless.score).toBeLessThan(0.75 * quiet.score);
    expect(restless.unrestUv).toBeGreaterThan(45);
    expect(restless.reason).toMatch(
      /^100 % kept, unrest \d\d\.\d µV above 12 cpm, drift .* no steps$/,
    );
  });

  test('falls with drift', () => {
    const drifting = quality(leadOf(30, (t) => wave(100, 3, t) + 3 * t));
    expect(drifting.driftUvPerMin).toBeGreaterThan(170);
    expect(drifting.driftUvPerMin).toBeLessThan(190);
    expect(drifting.score).toBeLessThan(0.5);
  });

  test('counts steps of the electrode', () => {
    const stepped = quality(
      leadOf(30, (t) => wave(100, 3, t) + (t > 600 ? 900 : 0) + (t > 1300 ? 700 : 0)),
    );
    expect(stepped.steps).toBe(2);
  });

  test('falls with what is spoiled, and does not look into it', () => {
    const burst = leadOf(
      30,
      (t) => wave(100, 3, t) + (t > 300 && t < 900 ? 5000 * Math.sin(9 * t) : 0),
    );
    const covered = quality(burst, [{ fromS: 295, toS: 905 }]);
    expect(covered.keptShare).toBeCloseTo(1 - 610 / 1800, 6);
    expect(covered.steps).toBe(0);
    expect(covered.unrestUv).toBeLessThan(5);
  });

  test('is 0 where nothing is kept', () => {
    expect(quality(new Float64Array(RATE_HZ * 1800).fill(Number.NaN))).toMatchObject({
      score: 0,
      reason: 'nothing of it is kept',
    });
  });
});
