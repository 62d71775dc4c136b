import { describe, expect, it } from 'vitest';
import { f1, matchBeats, overRecords, positivePredictivity, sensitivity } from './score';

describe('scoring by ANSI/AAMI EC57', () => {
  it('matches within 150 ms and no farther (CV-45)', () => {
    expect(matchBeats([1], [1.149])).toMatchObject({ truePositive: 1, falsePositive: 0 });
    expect(matchBeats([1], [1.151])).toMatchObject({
      truePositive: 0,
      falseNegative: 1,
      falsePositive: 1,
    });
  });

  it('matches one to one, the nearest first', () => {
    const matching = matchBeats([1, 1.2], [1.12, 1.19]);
    expect(matching.pairs).toEqual([
      [0, 0],
      [1, 1],
    ]);
    expect(matchBeats([1], [0.95, 1.02])).toMatchObject({ pairs: [[0, 1]], extra: [0] });
  });

  it('gives sensitivity, positive predictivity and F1 (CV-46)', () => {
    const counts = { truePositive: 98, falseNegative: 2, falsePositive: 1 };
    expect(sensitivity(counts)).toBeCloseTo(98, 10);
    expect(positivePredictivity(counts)).toBeCloseTo(98.99, 2);
    expect(f1(counts)).toBeCloseTo(98.49, 2);
  });

  it('pools beats for gross figures and records for averages (CV-47)', () => {
    const both = overRecords([
      { truePositive: 990, falseNegative: 10 },
      { truePositive: 45, falseNegative: 5 },
    ]);
    expect(both.gross).toBeCloseTo(98.571, 3);
    expect(both.average).toBeCloseTo(94.5, 10);
  });
});
