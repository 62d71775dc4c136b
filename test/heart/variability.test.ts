import { describe, expect, it } from 'vitest';
import { rrSeries } from '../../src/heart/rr-series';
import { timeDomain, triangularIndex } from '../../src/heart/variability';
import { type BeatClass, beatsOf } from '../../src/recording/beat';
import { HEART_REFERENCE } from './reference';

const all = (rr: readonly number[]) => new Uint8Array(rr.length).fill(1);
const figures = (rr: readonly number[], mask: Uint8Array = all(rr)) =>
  timeDomain(Float64Array.from(rr), mask);

describe('time domain, check values of field-notes.md section 10', () => {
  it('CV-23: a list of six', () => {
    const time = figures([800, 810, 790, 860, 800, 805]);
    expect(time.meanMs).toBeCloseTo(810.833, 3);
    expect(time.heartRateBpm).toBeCloseTo(73.998, 3);
    expect(time.sdnnMs).toBeCloseTo(24.983, 3);
    expect(time.rmssdMs).toBeCloseTo(42.485, 3);
    expect(time.pnn50Pct).toBe(40);
    expect(time.sdsdMs).toBeCloseTo(47.487, 3);
  });

  it('CV-23b: SD1 of the same list is 30.0333 with the count, so sqrt(5/4) of it with n - 1', () => {
    const time = figures([800, 810, 790, 860, 800, 805]);
    expect(time.sd1Ms * Math.sqrt(4 / 5)).toBeCloseTo(30.0333, 3);
    expect(time.sd1Ms ** 2 + time.sd2Ms ** 2).toBeCloseTo(2 * time.sdnnMs ** 2, 9);
  });

  it('CV-24: a missed beat multiplies RMSSD by 56 unless its interval is not NN', () => {
    const rr = [800, 810, 1600, 800, 790];
    expect(figures(rr).rmssdMs).toBeCloseTo(562.205, 3);
    const mended = figures(rr, Uint8Array.of(1, 1, 0, 1, 1));
    expect(mended.rmssdMs).toBeCloseTo(10, 9);
    expect(mended.pairCount).toBe(2);
    expect(mended.sdnnMs).toBeCloseTo(8.165, 3);
  });

  it('CV-25: a difference of exactly 50 ms is not over 50 ms, even when made of 1/64 samples', () => {
    expect(figures([1000, 1050, 1000, 1050]).pnn50Pct).toBe(0);
    expect(figures([1000, 1050 + 1 / 16, 1000]).pnn50Pct).toBe(100);
    for (const rateHz of [200, 250, 360, 1000]) {
      const milliseconds = [0, 800, 1650, 2450, 3300, 4100];
      const rows = milliseconds.map((ms) => ({
        tick: Math.round(ms * 0.064 * rateHz),
        beatClass: 'N' as const,
        origin: 'detected' as const,
      }));
      const rr = rrSeries(beatsOf(rows), rateHz, []);
      expect(timeDomain(rr.rrMs, rr.nn).pnn50Pct).toBe(0);
    }
  });

  it('CV-26: what the 20 % rule leaves gives RMSSD 7.071 from two pairs', () => {
    const time = figures([800, 800, 500, 1100, 800, 810], Uint8Array.of(1, 1, 0, 0, 1, 1));
    expect(time.nnCount).toBe(4);
    expect(time.pairCount).toBe(2);
    expect(time.rmssdMs).toBeCloseTo(7.071, 3);
  });

  it('CV-27: the heart rate is of the mean interval', () => {
    expect(figures([600, 1000]).heartRateBpm).toBe(75);
  });

  it('CV-30: the fullest bin of 1/128 s holds 6 of 12', () => {
    const rr = [800, 801, 803, 805, 806, 812, 813, 820, 795, 799, 802, 804];
    expect(triangularIndex(Float64Array.from(rr), all(rr))).toBe(2);
  });

  it('has no number where there is too little for one', () => {
    expect(figures([]).meanMs).toBeNaN();
    expect(figures([800]).sdnnMs).toBeNaN();
    expect(figures([800]).rmssdMs).toBeNaN();
    expect(figures([800, 900]).sdsdMs).toBeNaN();
    expect(figures([800, 900]).rmssdMs).toBe(100);
    expect(triangularIndex(new Float64Array(0), new Uint8Array(0))).toBeNaN();
  });

  it('begins anew at the first interval of a part', () => {
    const rr = Float64Array.of(500, 800, 810, 700);
    expect(timeDomain(rr, Uint8Array.of(1, 1, 1, 1), 1, 3)).toMatchObject({
      nnCount: 2,
      pairCount: 1,
      rmssdMs: 10,
    });
  });
});

const classOf = (letter: string): BeatClass => (letter === 'V' ? 'V' : 'N');

describe('time domain against numpy, on lists with ectopic beats', () => {
  HEART_REFERENCE.lists.forEach(({ ticks, classes, expected }, index) => {
    it(`list ${index + 1}: ${ticks.length} beats, ${classes.split('V').length - 1} of class V`, () => {
      const rows = ticks.map((tick, i) => ({
        tick,
        beatClass: classOf(classes[i]),
        origin: 'detected' as const,
      }));
      const rr = rrSeries(beatsOf(rows), HEART_REFERENCE.rate_hz, []);
      const ours = {
        ...timeDomain(rr.rrMs, rr.nn),
        triangularIndex: triangularIndex(rr.rrMs, rr.nn),
      };
      for (const [key, value] of Object.entries(expected)) {
        const got = Object.entries(ours).find(([name]) => name === key)?.[1] ?? Number.NaN;
        expect(Math.abs(got - value), `${key}: ${got} for ${value}`).toBeLessThan(
          1e-9 * Math.max(1, Math.abs(value)),
        );
      }
    });
  });
});
