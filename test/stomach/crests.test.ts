import { describe, expect, test } from 'vitest';
import { crestTimes } from '../../src/stomach/crests';
import { leadOf, noise, RATE_HZ, wave } from './leads';

const options = { rateHz: RATE_HZ, highCpm: 9, unclean: [] };

describe('crests of the drawn slow wave', () => {
  test('stand every 20 s on a 3 cpm wave, between the samples', () => {
    const crests = crestTimes(
      leadOf(10, (t) => wave(100, 3, t - 7.37)),
      options,
    );
    expect(crests).toHaveLength(30);
    crests.forEach((time, i) => {
      expect(time).toBeCloseTo(7.37 + 20 * i, 2);
    });
  });

  test('count a weak stretch beside a strong one', () => {
    const signal = leadOf(30, (t) => wave(t < 900 ? 300 : 15, 3, t));
    const weak = crestTimes(signal, options).filter((time) => time > 1000);
    expect(weak.length).toBeGreaterThanOrEqual(39);
    expect(weak.length).toBeLessThanOrEqual(41);
  });

  test('are not made by small ripple', () => {
    const ripple = noise(RATE_HZ * 1200, 0, 5, 31);
    const signal = leadOf(20, (t) => wave(100, 3, t) + ripple[Math.round(t * RATE_HZ)]);
    const crests = crestTimes(signal, options);
    expect(crests.length).toBeGreaterThanOrEqual(59);
    expect(crests.length).toBeLessThanOrEqual(61);
  });

  test('are not looked for in gaps and unclean stretches', () => {
    const signal = leadOf(10, (t) => (t >= 100 && t < 160 ? Number.NaN : wave(100, 3, t)));
    const crests = crestTimes(signal, { ...options, unclean: [{ fromS: 300, toS: 360 }] });
    const within = (from: number, to: number) => crests.filter((t) => t >= from && t < to);
    expect(within(100, 160)).toHaveLength(0);
    expect(within(300, 360)).toHaveLength(0);
    expect(within(380, 600)).toHaveLength(11);
  });

  test('a flat lead has none', () => {
    expect(crestTimes(new Float64Array(2000), options)).toHaveLength(0);
  });
});
