import { describe, expect, it } from 'vitest';
import { likeSideWave, sideWaves } from '../../src/heart/side-waves';

const RATE = 250;
const CENTRE = 150;
const HALF = 30;

/** A row of Gaussian waves: place in s from the centre, width in s, size. */
function row(waves: readonly (readonly [number, number, number])[]): Float64Array {
  return Float64Array.from({ length: 2 * CENTRE + 1 }, (_, i) =>
    waves.reduce((sum, [atS, sdS, size]) => {
      const u = ((i - CENTRE) / RATE - atS) / sdS;
      return sum + size * Math.exp(-0.5 * u * u);
    }, 0),
  );
}

const P = [-0.2, 0.018, 20] as const;
const T = [0.28, 0.04, 40] as const;
const sum = row([P, [0, 0.011, 100], T]).map((uv) => 50 * uv);
const waves = sideWaves({ sum, count: 50, strict: false }, CENTRE, HALF, RATE);

describe('the side waves of a beat', () => {
  it('are its P and its T wave', () => {
    expect(waves.length).toBe(2);
  });

  it('are known where they stand alone, and not where there is another wave or one of another size', () => {
    const alone = (atS: number, sdS: number, size: number) =>
      likeSideWave(row([[atS, sdS, size]]), CENTRE, 10, waves);
    expect(alone(0, 0.018, 20)).toBeGreaterThan(0.95);
    expect(alone(0, 0.04, 40)).toBeGreaterThan(0.95);
    expect(alone(0, 0.018, -20)).toBeLessThan(0.8);
    expect(alone(0, 0.018, 300)).toBeLessThan(0.5);
    expect(alone(0, 0.011, 100)).toBeLessThan(0.8);
  });

  it('are none where the beat has none', () => {
    const bare = row([[0, 0.011, 100]]);
    expect(sideWaves({ sum: bare, count: 1, strict: false }, CENTRE, HALF, RATE)).toEqual([]);
  });
});
