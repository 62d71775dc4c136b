import { describe, expect, it } from 'vitest';
import { type Detection, detectBeats } from '../../src/heart/detect';
import { BEAT_CLASSES } from '../../src/recording/beat';
import {
  abdomenUv,
  ecgMv,
  heartbeatOf,
  isScored,
  RATE_HZ,
  reference,
  referenceTimesS,
} from './record208';
import { matchBeats, positivePredictivity, sensitivity } from './score';
import { addNoise } from './simulated-heart';

const detect = (rawUv: Float64Array) =>
  detectBeats({ heartbeat: heartbeatOf(rawUv, RATE_HZ), rateHz: RATE_HZ, ticksPerSample: 64 });
const timesOf = (found: Detection) =>
  Array.from(found.beats.ticks, (tick) => tick / (64 * RATE_HZ));

function score(found: Detection) {
  const matching = matchBeats(referenceTimesS.filter(isScored), timesOf(found).filter(isScored));
  return { se: sensitivity(matching), pp: positivePredictivity(matching) };
}

/** The record at a given usual R height (1.7 mV in lead MLII), under slow wave, breathing, hum and muscle bursts. */
const buried = (heightUv: number, whiteUv: number, burstUv: number) =>
  addNoise(
    ecgMv().map((mv) => (mv * heightUv) / 1.7),
    RATE_HZ,
    { seed: 5, whiteUv, burstUv, slowUv: 200, breathUv: 60, humUv: 20 },
  );

describe('beats of five real minutes with many ventricular beats (MIT-BIH record 208, reference made with scipy)', () => {
  const clean = detect(ecgMv().map((mv) => 90 * mv));

  it('are found in the ECG as recorded', () => {
    const { se, pp } = score(clean);
    expect(se).toBeGreaterThanOrEqual(99.7);
    expect(pp).toBeGreaterThanOrEqual(99.7);
  });

  it.each([
    ['upright on a slow wave of 150 uV', 0],
    ['inverted on a slow wave of 150 uV', 1],
    ['about 40 uV high on a slow wave of 150 uV', 2],
  ])('are found in an abdominal lead, %s', (_, channel) => {
    const { se, pp } = score(detect(abdomenUv(channel)));
    expect(se).toBeGreaterThanOrEqual(99.5);
    expect(pp).toBeGreaterThanOrEqual(99.7);
  });

  it('are found in the difference of two abdominal leads', () => {
    const plus = abdomenUv(0);
    const minus = abdomenUv(1);
    const { se, pp } = score(detect(plus.map((value, i) => value - minus[i])));
    expect(se).toBeGreaterThanOrEqual(99.7);
    expect(pp).toBeGreaterThanOrEqual(99.7);
  });

  it('are found at 50 uV under noise and muscle bursts', () => {
    const { se, pp } = score(detect(buried(50, 3, 10)));
    expect(se).toBeGreaterThanOrEqual(99.5);
    expect(pp).toBeGreaterThanOrEqual(99.6);
  });

  it.each([
    [2, 8],
    [3, 15],
  ])('are found at 25 uV under white noise of %d uV and bursts of %d uV', (white, burst) => {
    const { se, pp } = score(detect(buried(25, white, burst)));
    expect(se).toBeGreaterThanOrEqual(99);
    expect(pp).toBeGreaterThanOrEqual(99);
  });

  it('stand at the same ticks with the same classes when the lead is turned over (CV-60)', () => {
    const turned = detect(ecgMv().map((mv) => -90 * mv));
    expect(turned.beats.ticks).toEqual(clean.beats.ticks);
    expect(turned.beats.classes).toEqual(clean.beats.classes);
    expect(turned.sign).toBe(clean.sign === 1 ? -1 : 1);
    expect(turned.timingSdMs).toBe(clean.timingSdMs);
    expect(turned.heightUv).toBe(clean.heightUv);
  });

  it('stand within 1 ms of the crests that scipy found, in the usual case', () => {
    const times = timesOf(clean);
    const off = matchBeats(referenceTimesS, times)
      .pairs.filter(([r]) => reference.beats[r].class === 'N')
      .map(([r, d]) => Math.abs(times[d] - referenceTimesS[r]));
    off.sort((a, b) => a - b);
    expect(off[Math.floor(0.95 * off.length)]).toBeLessThan(0.001);
  });

  it('get the class that shape and timing give them by eye', () => {
    const counts = { NN: 0, NV: 0, VN: 0, VV: 0, other: 0 };
    for (const [r, d] of matchBeats(referenceTimesS, timesOf(clean)).pairs) {
      const own = reference.beats[r].class;
      if (own === null) continue;
      const pair = `${own}${BEAT_CLASSES[clean.beats.classes[d]]}`;
      if (pair === 'NN' || pair === 'NV' || pair === 'VN' || pair === 'VV') counts[pair] += 1;
      else counts.other += 1;
    }
    expect(counts.VV).toBeGreaterThanOrEqual(0.95 * 86);
    expect(counts.NN).toBeGreaterThanOrEqual(0.97 * 370);
  });
});
