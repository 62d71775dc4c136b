import { describe, expect, it } from 'vitest';
import type { Interval } from '../../src/recording/span';
import { startJob } from '../../workers/job';
import { leftoverOfLead } from '../../workers/pipeline-leftover';
import { BACKGROUNDS, fieldWave } from '../stomach/field';
import { RATE_HZ, rhythmOfLead } from '../stomach/leads';

const MINUTES = 40;
const LENGTH = MINUTES * 60 * RATE_HZ;
const { job } = startJob(() => undefined);

/** Mean power density of a lead between two rates, by a plain sum of cosines over Hann windows: independent of the program's. */
function powerDb(x: Float64Array, fromCpm: number, toCpm: number): number {
  const n = 240 * RATE_HZ;
  let [sum, count] = [0, 0];
  for (let first = 0; first + n <= x.length; first += n)
    for (let cpm = fromCpm; cpm <= toCpm; cpm += 0.25) {
      let [re, im, squares] = [0, 0, 0];
      let mean = 0;
      for (let i = 0; i < n; i += 1) mean += x[first + i] / n;
      for (let i = 0; i < n; i += 1) {
        const taper = 0.5 - 0.5 * Math.cos((2 * Math.PI * i) / n);
        const angle = (2 * Math.PI * cpm * i) / (60 * RATE_HZ);
        const value = taper * (x[first + i] - mean);
        re += value * Math.cos(angle);
        im += value * Math.sin(angle);
        squares += taper * taper;
      }
      sum += (2 * (re * re + im * im)) / (RATE_HZ * squares);
      count += 1;
    }
  return 10 * Math.log10(sum / count);
}

async function leftover(lead: Float64Array, spoiled: readonly Interval[] = []) {
  const { rhythm } = rhythmOfLead(lead, { spoiled });
  const slow = { recorded: lead, rateHz: RATE_HZ };
  const found = await leftoverOfLead({ slow, spoiled, rhythm }, job);
  if (!found) throw new Error('there is a leftover');
  return found;
}

const plus = (a: Float64Array, b: Float64Array) => a.map((value, i) => value + b[i]);
const noise = BACKGROUNDS['1/f'](LENGTH, 5);
const wandering = fieldWave(LENGTH, {
  cpmAt: (t) => 2.6 + (0.8 * t) / (MINUTES * 60),
  uvAt: () => 200,
  wanderCpm: 0.08,
  wanderShare: 0.15,
  seed: 3,
});

describe('the leftover of a lead', () => {
  it('has the level of the lead’s own noise where a strong wandering wave was', async () => {
    const { lead, restDb } = await leftover(plus(noise, wandering.uv));
    expect(Math.abs(powerDb(lead, 2.25, 3.75) - powerDb(noise, 2.25, 3.75))).toBeLessThan(2);
    expect(Math.abs(restDb ?? Number.NaN)).toBeLessThan(1.5);
  });

  it('keeps the noise inside the band beside the wave as it was recorded', async () => {
    const recorded = plus(noise, wandering.uv);
    const { change } = await leftover(recorded);
    for (const [from, to] of [
      [1, 1.25],
      [5, 9],
    ] as const)
      expect(powerDb(change, from, to)).toBeLessThan(powerDb(noise, from, to) - 15);
  });

  it('keeps nothing of a wave that begins and ends', async () => {
    const bouts = fieldWave(LENGTH, {
      cpmAt: (t) => (t < 900 ? 2.8 : t < 1500 ? 1.5 : 5.2),
      uvAt: () => 150,
      seed: 4,
    });
    const { lead } = await leftover(plus(noise, bouts.uv));
    for (const [from, to] of [
      [1.25, 1.75],
      [2.5, 3],
      [5, 5.5],
    ] as const)
      expect(Math.abs(powerDb(lead, from, to) - powerDb(noise, from, to))).toBeLessThan(3);
  });

  it('is the lead itself where there is no rhythm', async () => {
    const quiet = BACKGROUNDS['1/f'](480 * RATE_HZ, 8);
    const { lead, tracks, restDb } = await leftover(quiet);
    expect(tracks).toEqual([]);
    expect(lead).toEqual(quiet);
    expect(restDb).toBeNull();
  });

  it('takes harmonics out that stand out, and leaves breathing', async () => {
    const saw = fieldWave(LENGTH, {
      cpmAt: () => 3,
      uvAt: () => 150,
      harmonics: [[0.4, 0.7]],
      seed: 2,
    });
    const breath = fieldWave(LENGTH, { cpmAt: () => 13, uvAt: () => 80, wanderCpm: 0.3, seed: 6 });
    const rest = plus(noise, breath.uv);
    const { lead } = await leftover(plus(rest, saw.uv));
    expect(Math.abs(powerDb(lead, 5.75, 6.25) - powerDb(rest, 5.75, 6.25))).toBeLessThan(2.5);
    expect(Math.abs(powerDb(lead, 11.5, 14.5) - powerDb(rest, 11.5, 14.5))).toBeLessThan(0.1);
  });

  it('leaves spoiled stretches spoiled, and nothing of the wave beside them', async () => {
    const spoiled = [{ fromS: 1000, toS: 1030 }];
    const recorded = plus(noise, wandering.uv).map((value, i) => {
      if (i >= 1500 * RATE_HZ && i < 1510 * RATE_HZ) return Number.NaN;
      return i >= 1000 * RATE_HZ && i < 1030 * RATE_HZ ? value + 4000 : value;
    });
    const { lead } = await leftover(recorded, spoiled);
    expect(lead[1015 * RATE_HZ]).toBeGreaterThan(3000);
    expect(lead[1505 * RATE_HZ]).toBeNaN();
    const beside = (x: Float64Array) => x.subarray(1040 * RATE_HZ, 1280 * RATE_HZ);
    expect(powerDb(beside(lead), 2, 4)).toBeLessThan(powerDb(beside(wandering.uv), 2, 4) - 20);
  });

  it('is the same each time', async () => {
    const recorded = plus(noise, wandering.uv);
    expect((await leftover(recorded)).lead).toEqual((await leftover(recorded)).lead);
  });

  it('is none where too little is there', async () => {
    const spoiled = [{ fromS: 0, toS: 100 }];
    const short = noise.slice(0, 120 * RATE_HZ);
    const slow = { recorded: short, rateHz: RATE_HZ };
    expect(await leftoverOfLead({ slow, spoiled, rhythm: { epochs: [] } }, job)).toBeNull();
  });
});
