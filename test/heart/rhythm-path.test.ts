import { describe, expect, it } from 'vitest';
import { bestPath, intervalFit, rhythmOf } from '../../src/heart/rhythm-path';

const steady = rhythmOf(0.8, 0.06, 0.05);
function path(times: readonly number[], scores: readonly number[]): number[] {
  const steps = bestPath(times, scores, () => steady);
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
  }
}

describe('the path of beats through candidates', () => {
  it('takes a doubtful candidate in rhythm and leaves one out of rhythm', () => {
    expect(path([0, 0.8, 1.6, 2.4], [6, 6, -2, 6])).toEqual([0, 1, 2, 3]);
    expect(path([0, 0.8, 1.25, 1.6, 2.4], [6, 6, -2, 6, 6])).toEqual([0, 1, 3, 4]);
  });

  it('takes a clear early beat with the pause that follows it', () => {
    expect(path([0, 0.8, 1.3, 2.4, 3.2], [7, 7, 7, 7, 7])).toEqual([0, 1, 2, 3, 4]);
  });

  it('never takes two beats nearer than the refractory period', () => {
    expect(path([0, 0.8, 0.95, 1.6], [7, 9, 9, 7])).toEqual([0, 1, 3]);
  });

  it('goes on after a break of any length', () => {
    expect(path([0, 0.8, 100, 100.8], [7, 7, 7, 7])).toEqual([0, 1, 2, 3]);
  });

  it('is empty where all evidence is against beats', () => {
    expect(path([0, 0.8, 1.6], [-9, -9, -9])).toEqual([]);
    expect(path([], [])).toEqual([]);
  });

  it('values the usual interval most, and a pause less than an early beat of the same ratio', () => {
    const at = (rrS: number) => intervalFit(rrS, steady);
    expect(at(0.8)).toBeGreaterThan(at(0.7));
    expect(at(0.7)).toBeGreaterThan(at(0.5));
    expect(at(0.5)).toBeGreaterThan(at(0.25));
    expect(at(0.9)).toBeGreaterThan(at(1.6));
  });

  it('takes a pause that makes up for an early beat as usual, and a run of early beats for likelier than single ones', () => {
    expect(intervalFit(1.12, steady, 0.48)).toBeCloseTo(intervalFit(0.8, steady), 10);
    expect(intervalFit(1.12, steady, 0.8)).toBeLessThan(intervalFit(1.12, steady, 0.48));
    expect(intervalFit(0.4, steady, 0.4)).toBeGreaterThan(intervalFit(0.4, steady, 0.8));
  });
});
