import { describe, expect, it } from 'vitest';
import { lineAt, powerLawLine } from '../../src/numeric/power-law-line';

const pointsOf = (exponent: number) =>
  [1, 2, 3, 5, 8, 13].map((f) => ({ x: Math.log(f), y: Math.log(40 * f ** -exponent) }));

describe('the line of a power law', () => {
  it('has the exponent and the level of the spectrum', () => {
    for (const exponent of [0, 1, 2.5, 3]) {
      const line = powerLawLine(pointsOf(exponent));
      expect(line.slope).toBeCloseTo(-exponent, 12);
      expect(Math.exp(lineAt(line, Math.log(4)))).toBeCloseTo(40 * 4 ** -exponent, 9);
    }
  });

  it('is believed between white noise and 1/f^3 only, through the middle of the points', () => {
    expect(powerLawLine(pointsOf(5)).slope).toBe(-3);
    const rising = powerLawLine(pointsOf(-1));
    expect(rising.slope).toBeCloseTo(0, 12);
    expect(lineAt(rising, 0)).toBeCloseTo(rising.meanY, 12);
  });
});
