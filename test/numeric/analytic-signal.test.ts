import { describe, expect, it } from 'vitest';
import { analyticSignal, hilbertPhase } from '../../src/numeric/analytic-signal';
import octave from '../reference/numeric-octave.json';
import reference from '../reference/numeric-pairs.json';
import { largestDifference } from './signals';

// Reference: scipy.signal.hilbert (test/reference/numeric-pairs.py) and hilbert of Octave
// (test/reference/numeric-octave.m). The waves are of 100 uV, so 1e-7 is 1e-9 of their size.

/** Distance of two angles, whole turns taken off. */
const apart = (a: number, b: number) => {
  const turns = (a - b) / (2 * Math.PI);
  return 2 * Math.PI * Math.abs(turns - Math.round(turns));
};

describe('the analytic signal', () => {
  it.each(reference.hilbert.map((one) => ({ ...one, count: one.x.length })))(
    'of $count samples and its phase are scipy’s',
    ({ x, analytic, phase }) => {
      expect(largestDifference(analyticSignal(Float64Array.from(x)), analytic)).toBeLessThan(1e-10);
      const got = hilbertPhase(Float64Array.from(x));
      phase.forEach((wanted, i) => {
        expect(apart(got[i], wanted)).toBeLessThan(1e-11);
      });
    },
  );

  it.each(octave.hilbert.map((one) => ({ ...one, count: one.x.length })))(
    'of $count samples is Octave’s',
    ({ x, re, im }) => {
      const got = analyticSignal(Float64Array.from(x));
      expect(
        largestDifference(
          got.filter((_, i) => i % 2 === 0),
          re,
        ),
      ).toBeLessThan(1e-10);
      expect(
        largestDifference(
          got.filter((_, i) => i % 2 === 1),
          im,
        ),
      ).toBeLessThan(1e-10);
    },
  );

  it('of a whole number of cosine periods turns by the frequency, 0 at the crests', () => {
    const x = Float64Array.from({ length: 400 }, (_, i) => Math.cos((2 * Math.PI * i) / 80));
    const phase = hilbertPhase(x);
    phase.forEach((value, i) => {
      expect(apart(value, (2 * Math.PI * i) / 80)).toBeLessThan(1e-12);
    });
    expect(phase[1]).toBeGreaterThan(0);
  });

  it('of nothing is nothing, of one sample the sample', () => {
    expect(analyticSignal(new Float64Array(0))).toHaveLength(0);
    expect([...analyticSignal(Float64Array.of(3))]).toEqual([3, 0]);
  });
});
