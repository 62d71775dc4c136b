import { describe, expect, it } from 'vitest';
import { measureQrs } from '../../src/heart/qrs-quality';
import { abdomenUv, RATE_HZ } from './record208';
import { addBeats, addNoise, NARROW, planBeats } from './simulated-heart';

const RATE = 500;

function lead(heightUv: number, whiteUv: number) {
  const beats = planBeats({ seed: 51, seconds: 60, meanRrS: 0.8, breathRr: 0 });
  const raw = addBeats(new Float64Array(60 * RATE), RATE, beats, heightUv, NARROW);
  return addNoise(raw, RATE, { seed: 2, whiteUv, slowUv: 200, breathUv: 60, humUv: 10 });
}

describe('the QRS quality of a raw stretch', () => {
  it('measures height, rate and sign under a slow wave and hum', () => {
    const quality = measureQrs(lead(120, 3), RATE);
    expect(quality.heightUv).toBeGreaterThan(105);
    expect(quality.heightUv).toBeLessThan(130);
    expect(quality.beatsPerMinute).toBeCloseTo(75, 0);
    expect(quality.sign).toBe(1);
  });

  it('is the same for the lead turned over, but for the sign', () => {
    const raw = lead(120, 3);
    const turned = measureQrs(
      raw.map((value) => -value),
      RATE,
    );
    expect(turned).toEqual({ ...measureQrs(raw, RATE), sign: -1 });
  });

  it('measures the noise in the band of the heartbeat', () => {
    // White noise of 4 uV at 500 Hz has 4 * sqrt(40 / 250) uV below 40 Hz.
    const { noiseUv } = measureQrs(lead(150, 4), RATE);
    expect(noiseUv).toBeGreaterThan(0.85 * 4 * Math.sqrt(40 / 250));
    expect(noiseUv).toBeLessThan(1.2 * 4 * Math.sqrt(40 / 250));
  });

  it('puts the leads of the real mixture in order of their R height', () => {
    const stretch = (channel: number) =>
      measureQrs(abdomenUv(channel).subarray(220 * RATE_HZ, 250 * RATE_HZ), RATE_HZ);
    const [e1, e2, e3] = [0, 1, 2].map(stretch);
    expect(e1.quality).toBeGreaterThan(e2.quality);
    expect(e2.quality).toBeGreaterThan(e3.quality);
    expect([e1.sign, e2.sign, e3.sign]).toEqual([1, -1, 1]);
    expect(e1.snrDb).toBeGreaterThan(e2.snrDb);
  });

  it('is nothing where there is no heartbeat, or a rate that cannot carry one', () => {
    const noise = addNoise(new Float64Array(30 * RATE), RATE, { seed: 3, whiteUv: 5, slowUv: 200 });
    expect(measureQrs(noise, RATE).quality).toBe(0);
    expect(measureQrs(new Float64Array(1000), 4).quality).toBe(0);
    expect(measureQrs(new Float64Array(30 * RATE).fill(Number.NaN), RATE).quality).toBe(0);
  });
});
