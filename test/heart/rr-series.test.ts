import { describe, expect, it } from 'vitest';
import { intervalsWithin, rhythmFlags, rrSeries } from '../../src/heart/rr-series';
import { beatsOf, NO_BEATS } from '../../src/recording/beat';
import { beatsAfter, RATE_HZ } from './beats';

const even = (count: number) => new Float64Array(count).fill(1000);

describe('RR series', () => {
  it('has one interval fewer than beats, at the time of the beat that ends it', () => {
    const rr = rrSeries(beatsAfter([800, 810.5, 790], 2), RATE_HZ, []);
    expect([...rr.rrMs]).toEqual([800, 810.5, 790]);
    expect(rr.timesS[0]).toBeCloseTo(2.8, 9);
    expect([...rr.nn]).toEqual([1, 1, 1]);
    expect(rrSeries(NO_BEATS, RATE_HZ, []).rrMs.length).toBe(0);
    expect(rrSeries(beatsAfter([]), RATE_HZ, []).rrMs.length).toBe(0);
  });

  it('takes both intervals about an ectopic or unusable beat out and never joins across it', () => {
    for (const letter of ['S', 'V', 'F', 'Q']) {
      const rr = rrSeries(beatsAfter(even(5), 0, `NN${letter}NNN`), RATE_HZ, []);
      expect([...rr.nn], letter).toEqual([1, 0, 0, 1, 1]);
      expect(rr.rrMs.length).toBe(5);
    }
  });

  it('takes out what a placed beat touches, though it is N', () => {
    const beats = beatsOf(
      [0, 1, 2, 3, 4].map((second) => ({
        tick: second * 64 * RATE_HZ,
        beatClass: 'N',
        origin: second === 2 ? 'placed' : 'detected',
      })),
    );
    expect([...rrSeries(beats, RATE_HZ, []).nn]).toEqual([1, 0, 0, 1]);
  });

  it('lets no interval be NN that a spoiled span or gap reaches into, however the spans lie', () => {
    const beats = beatsAfter(even(8));
    const nn = (blocked: { fromS: number; toS: number }[]) =>
      [...rrSeries(beats, RATE_HZ, blocked).nn].join('');
    expect(nn([{ fromS: 2.4, toS: 2.5 }])).toBe('11011111');
    expect(nn([{ fromS: 2.9, toS: 4.1 }])).toBe('11000111');
    expect(nn([{ fromS: 2, toS: 3 }])).toBe('11011111');
    expect(
      nn([
        { fromS: 6.5, toS: 6.6 },
        { fromS: 0.1, toS: 0.2 },
        { fromS: 6.55, toS: 7.2 },
      ]),
    ).toBe('01111100');
    expect(nn([{ fromS: -5, toS: 100 }])).toBe('00000000');
  });

  it('does not let a mark by hand inside a spoiled span make an interval NN', () => {
    const rows = [0, 1, 2, 3, 4].map((second) => ({
      tick: second * 64 * RATE_HZ,
      beatClass: 'N' as const,
      origin: second === 2 ? ('added' as const) : ('detected' as const),
    }));
    const rr = rrSeries(beatsOf(rows), RATE_HZ, [{ fromS: 1.5, toS: 2.5 }]);
    expect([...rr.nn]).toEqual([1, 0, 0, 1]);
  });

  it('judges the rhythm by S beats too, but not by V or spoiled ones', () => {
    const beats = beatsAfter(even(6), 0, 'NSNVNNN');
    const { tells, ectopic } = rhythmFlags(beats, RATE_HZ, [{ fromS: 5.2, toS: 5.3 }]);
    expect([...tells]).toEqual([1, 1, 0, 0, 1, 0]);
    expect([...ectopic]).toEqual([1, 0, 1, 0, 0, 0]);
  });

  it('gives a part only the intervals that lie wholly in it', () => {
    const rr = rrSeries(beatsAfter(even(10), 0.5), RATE_HZ, []);
    const { first, end } = intervalsWithin(rr, 2, 6);
    expect([...rr.timesS.subarray(first, end)]).toEqual([3.5, 4.5, 5.5]);
    expect(intervalsWithin(rr, 2.6, 3.4)).toEqual({ first: 2, end: 2 });
  });
});
