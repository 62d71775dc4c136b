import { describe, expect, it } from 'vitest';
import { beatAreaUvS } from '../../src/heart/beat-area';
import { noise } from '../numeric/signals';

const RATE_HZ = 250;
/** R of 1 mV and 10 ms, T of 300 uV and 45 ms after 0.26 s: areas of Gaussians are height times width times root of 2 pi. */
const AREA = (1000 * 0.01 + 300 * 0.045) * Math.sqrt(2 * Math.PI);

function leadOf(times: Float64Array, sign: number): Float64Array {
  const lead = noise(RATE_HZ * 120, 3).map(
    (value, i) => 5 * value + 200 * Math.sin((2 * Math.PI * 0.05 * i) / RATE_HZ) + 700,
  );
  for (const time of times)
    for (let i = Math.round((time - 0.3) * RATE_HZ); i < (time + 0.5) * RATE_HZ; i += 1) {
      if (i < 0 || i >= lead.length) continue;
      const at = i / RATE_HZ - time;
      lead[i] += sign * 1000 * Math.exp(-0.5 * (at / 0.01) ** 2);
      lead[i] += sign * 300 * Math.exp(-0.5 * ((at - 0.26) / 0.045) ** 2);
    }
  return lead;
}

describe('area of the usual beat in a lead', () => {
  const times = Float64Array.from({ length: 130 }, (_, k) => 0.7 + 0.9 * k);

  it('is that of its waves, under a slow wave, noise and a level, with the sign of the lead', () => {
    for (const sign of [1, -1]) {
      const area = beatAreaUvS(leadOf(times, sign), RATE_HZ, 0, times);
      expect(Math.abs((area ?? 0) / (sign * AREA) - 1)).toBeLessThan(0.05);
    }
  });

  it('counts time from where the samples begin and leaves out beats beside gaps', () => {
    const lead = leadOf(times, 1);
    lead[Math.round(times[40] * RATE_HZ) + 3] = Number.NaN;
    const later = times.map((time) => time + 1000);
    const area = beatAreaUvS(lead, RATE_HZ, 1000, later);
    expect(Math.abs((area ?? 0) / AREA - 1)).toBeLessThan(0.05);
  });

  it('is not said from a few beats', () => {
    expect(beatAreaUvS(leadOf(times, 1), RATE_HZ, 0, times.slice(0, 19))).toBeNull();
    expect(beatAreaUvS(new Float64Array(0), RATE_HZ, 0, new Float64Array(0))).toBeNull();
  });
});
