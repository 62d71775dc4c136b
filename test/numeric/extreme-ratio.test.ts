import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type DecidedCell, extremeRatio } from '../../src/numeric/extreme-ratio';

/** Cells in order, each of which shares some of its decisions with the one before. */
const chain = fc
  .array(
    fc.record({
      shared: fc.integer({ min: 0, max: 2 }),
      own: fc.integer({ min: 0, max: 2 }),
      above: fc.array(fc.double({ min: 0, max: 10, noNaN: true }), {
        minLength: 16,
        maxLength: 16,
      }),
      below: fc.array(fc.integer({ min: 1, max: 5 }), { minLength: 16, maxLength: 16 }),
    }),
    { minLength: 1, maxLength: 4 },
  )
  .map((drawn) => {
    const cells: DecidedCell[] = [];
    let next = 0;
    for (const { shared, own, above, below } of drawn) {
      const kept = (cells.at(-1)?.decisions ?? []).slice(-shared || undefined).slice(0, shared);
      const decisions = [...kept, ...Array.from({ length: own }, () => next++)];
      const size = 2 ** decisions.length;
      cells.push({
        decisions,
        above: Float64Array.from(above.slice(0, size)),
        below: Float64Array.from(below.slice(0, size)),
      });
    }
    return { cells, decisions: next };
  });

/** The ratio of every way of deciding. */
function everyRatio(cells: readonly DecidedCell[], decisions: number, fixed: number): number[] {
  return Array.from({ length: 2 ** decisions }, (_, way) => {
    let [above, below] = [fixed, fixed];
    for (const cell of cells) {
      const mask = cell.decisions.reduce((sum, one, bit) => sum + (((way >> one) & 1) << bit), 0);
      above += cell.above[mask];
      below += cell.below[mask];
    }
    return above / below;
  });
}

describe('the extreme ratio over decisions', () => {
  it('is the greatest and least of every way of deciding', () => {
    fc.assert(
      fc.property(chain, fc.integer({ min: 0, max: 3 }), ({ cells, decisions }, fixed) => {
        const ratios = everyRatio(cells, decisions, fixed);
        const sums = { above: fixed, below: fixed };
        expect(extremeRatio(sums, cells, 1)).toBeCloseTo(Math.max(...ratios), 9);
        expect(extremeRatio(sums, cells, -1)).toBeCloseTo(Math.min(...ratios), 9);
      }),
      { numRuns: 300 },
    );
  });

  it('is the ratio itself where nothing is to be decided, and none of nothing', () => {
    expect(extremeRatio({ above: 3, below: 4 }, [], 1)).toBe(0.75);
    expect(extremeRatio({ above: 0, below: 0 }, [], 1)).toBeNaN();
  });
});
