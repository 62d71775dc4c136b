import { describe, expect, it } from 'vitest';
import { addAverage, leadAverage, withoutOwnBeats } from '../../src/heart/heart-leftover';
import { beatScore, plantedTimes, rmssdOfTimes } from '../../src/heart/planted-beats';
import { atOnce } from '../../src/numeric/in-steps';
import { createRandom } from '../../src/numeric/random';

const RATE_HZ = 250;

/** A beat like the field's: a narrow QRS and a wide T wave, in uV, by seconds from R. */
const beatUv = (s: number) =>
  200 * Math.exp(-((s / 0.012) ** 2)) -
  50 * Math.exp(-(((s - 0.03) / 0.012) ** 2)) +
  40 * Math.exp(-(((s - 0.26) / 0.05) ** 2));

function inventedLead(timesS: readonly number[], sizes: readonly number[], seconds: number) {
  const random = createRandom(4);
  return Float64Array.from({ length: seconds * RATE_HZ }, (_, i) => {
    const s = i / RATE_HZ;
    let uv = 2 * random.gaussian() + 30 * Math.sin(2 * Math.PI * 0.05 * s);
    timesS.forEach((timeS, k) => {
      if (Math.abs(s - timeS) < 1) uv += sizes[k] * beatUv(s - timeS);
    });
    return uv;
  });
}

const random = createRandom(9);
const timesS = Array.from({ length: 100 }, (_, k) => 2 + 0.9 * k + 0.05 * random.uniform());
const sizes = timesS.map(() => 1 + 0.1 * random.gaussian());
const lead = inventedLead(timesS, sizes, 95);
const stretch = {
  samples: lead,
  places: timesS.map((s) => s * RATE_HZ),
  classes: timesS.map(() => 0),
};

describe('the leftover of a heart lead', () => {
  const average = atOnce(leadAverage([stretch], 0, RATE_HZ, 0.9));
  if (!average) throw new Error('there is an average');
  const left = atOnce(withoutOwnBeats(stretch, new Map([[0, average]]), RATE_HZ));
  const rmsNear = (x: Float64Array, halfS: number) => {
    let [squares, count] = [0, 0];
    for (const timeS of timesS)
      for (let i = Math.ceil((timeS - halfS) * RATE_HZ); i < (timeS + halfS) * RATE_HZ; i += 1) {
        squares += (x[i] - 30 * Math.sin(2 * Math.PI * 0.05 * (i / RATE_HZ))) ** 2;
        count += 1;
      }
    return Math.sqrt(squares / count);
  };

  it('holds the lead’s noise at the places of beats of several sizes, and little else', () => {
    expect(rmsNear(lead, 0.03)).toBeGreaterThan(80);
    expect(rmsNear(left, 0.03)).toBeLessThan(8);
  });

  it('takes a beat out whole that another of another shape follows closely', () => {
    const wideUv = (s: number) => 400 * Math.exp(-((s / 0.05) ** 2));
    const place = timesS[50];
    const after = place + 0.45;
    const close = {
      ...stretch,
      samples: lead.map((value, i) => value + wideUv(i / RATE_HZ - after)),
    };
    const out = atOnce(withoutOwnBeats(close, new Map([[0, average]]), RATE_HZ));
    expect(Math.abs(out[Math.round(place * RATE_HZ)])).toBeLessThan(60);
  });

  it('has an average of the beats’ own height', () => {
    expect(average.samples[average.centre]).toBeGreaterThan(190);
    expect(average.samples[average.centre]).toBeLessThan(205);
  });

  it('takes planted averages between samples', () => {
    const out = new Float64Array(1000);
    addAverage(out, average, 500.5, 1);
    expect(out[500]).toBeCloseTo(out[501], -1);
    expect(Math.max(...out)).toBeLessThan(average.samples[average.centre]);
  });
});

describe('the scores of planted beats', () => {
  it('have the RMSSD of their times', () => {
    // RR 800, 850, 790 ms: differences 50 and -60, RMSSD sqrt((2500 + 3600) / 2), by hand.
    expect(rmssdOfTimes([0, 0.8, 1.65, 2.44])).toBeCloseTo(Math.sqrt(3050), 6);
    const times = plantedTimes(10, 70, 0.85, createRandom(3));
    expect(times[0]).toBeGreaterThanOrEqual(10);
    expect(times.length).toBeGreaterThan(65);
    expect(times.length).toBeLessThan(75);
  });

  it('are sensitivity and predictivity within 150 ms, what lies at own beats left out', () => {
    const planted = [1, 2, 3, 4, 5];
    const found = [1.01, 2.2, 2.99, 4.5, 5.01];
    // Own beats at 5 s: planted 5 and found 5.01 are left out. 1 and 3 are found, 2 and 4 missed, 2.2 and 4.5 are too many.
    expect(beatScore(planted, found, [5])).toMatchObject({
      planted: 4,
      sensitivityPct: 50,
      predictivityPct: 50,
    });
  });

  it('tell the spread of times without a constant delay, and the error of RMSSD', () => {
    const planted = Array.from({ length: 60 }, (_, k) => k + 0.02 * Math.sin(k));
    const late = planted.map((s, k) => s + 0.03 + (k % 2 === 0 ? 0.002 : -0.002));
    const score = beatScore(planted, late, []);
    expect(score.timingMs).toBeCloseTo(2, 1);
    const rmssd = (s: readonly number[]) => rmssdOfTimes(s);
    expect(score.rmssdErrorMs).toBeCloseTo(rmssd(late) - rmssd(planted), 6);
    expect(beatScore([1, 2], [1, 2], []).timingMs).toBeNull();
    expect(beatScore([], [], [])).toMatchObject({ sensitivityPct: null, predictivityPct: null });
  });
});
