import { describe, expect, it } from 'vitest';
import { rrSeries } from '../../src/heart/rr-series';
import { timeDomain } from '../../src/heart/variability';
import { beatsOf } from '../../src/recording/beat';

const RATE_HZ = 1000;
const seriesOf = (rrMs: readonly number[]) => {
  let at = 1000;
  const ticks = [at, ...rrMs.map((ms) => (at += ms))].map((ms) => ms * 64);
  const beats = beatsOf(ticks.map((tick) => ({ tick, beatClass: 'N', origin: 'detected' })));
  return rrSeries(beats, RATE_HZ, []);
};

describe('intervals that cannot be NN', () => {
  it('a hole of eleven seconds between two N beats is no NN, and joins nothing', () => {
    const rr = seriesOf([800, 810, 11180, 800, 790]);
    expect([...rr.nn]).toEqual([1, 1, 0, 1, 1]);
    expect(timeDomain(rr.rrMs, rr.nn).rmssdMs).toBeCloseTo(10, 9);
  });

  it('the limits themselves count', () => {
    expect([...seriesOf([300, 299, 2000, 2001]).nn]).toEqual([1, 0, 1, 0]);
  });
});
