import { describe, expect, it } from 'vitest';
import { detectBeats } from '../../src/heart/detect';
import { placeBeat } from '../../src/heart/place-beat';
import { heartbeatOf } from './record208';
import { addBeats, addNoise, NARROW, planBeats } from './simulated-heart';

const RATE = 250;
const beats = planBeats({ seed: 41, seconds: 120, meanRrS: 0.85 });
const raw = addBeats(new Float64Array(120 * RATE), RATE, beats, 100, NARROW);
for (let i = 60 * RATE; i < 64 * RATE; i += 1) raw[i] = 0;
for (let i = 0; i < 9; i += 1) raw[62 * RATE + i] = 60 * Math.sin((Math.PI * (i + 1)) / 10);
const heartbeat = heartbeatOf(addNoise(raw, RATE, { seed: 1, whiteUv: 1 }), RATE);
const {
  averages,
  sign,
  beats: found,
} = detectBeats({ heartbeat, rateHz: RATE, ticksPerSample: 64 });
const search = { heartbeat, rateHz: RATE, ticksPerSample: 64, averages, sign };
const ticksOf = (seconds: number) => seconds * 64 * RATE;

describe('a beat put by hand', () => {
  it('goes to the very tick of the beat it was put near', () => {
    for (const tick of found.ticks.slice(3, 40))
      for (const off of [-0.06, 0.05]) {
        const place = placeBeat(search, tick / ticksOf(1) + off);
        expect(place.visible).toBe(true);
        expect(Math.abs(place.tick - tick)).toBeLessThanOrEqual(1);
      }
  });

  it('goes to the crest of a complex unlike the averages', () => {
    const place = placeBeat({ ...search, averages: [] }, 62.05);
    expect(place.visible).toBe(true);
    expect(Math.abs(place.tick / ticksOf(1) - (62 + 4 / RATE))).toBeLessThan(0.004);
  });

  it('stays exactly where it was put when nothing is there, and says so', () => {
    expect(placeBeat(search, 61)).toEqual({ tick: ticksOf(61), visible: false });
  });

  it('stays where it was put in a gap and beyond the ends', () => {
    const gap = heartbeat.slice();
    gap.fill(Number.NaN, 30 * RATE, 35 * RATE);
    expect(placeBeat({ ...search, heartbeat: gap }, 32.5)).toEqual({
      tick: ticksOf(32.5),
      visible: false,
    });
    expect(placeBeat(search, 500).visible).toBe(false);
  });

  it('stands at the same tick on the lead turned over', () => {
    const turned = {
      ...search,
      heartbeat: heartbeat.map((value) => -value),
      averages: averages.map((one) => ({ ...one, samples: one.samples.map((value) => -value) })),
      sign: sign === 1 ? (-1 as const) : (1 as const),
    };
    for (const near of [10.2, 33.3, 62.05, 61])
      expect(placeBeat(turned, near)).toEqual(placeBeat(search, near));
  });
});
