import { describe, expect, it } from 'vitest';
import type { Span } from '../../src/recording/span';
import { slowSpanDoubts } from '../../src/stomach/span-doubts';

const RATE_HZ = 4;
const SECONDS = 1200;

/** 3 cpm of 100 uV, with a movement of a size in uV at 600 to 606 s. */
const lead = (moveUv: number) =>
  Float64Array.from({ length: SECONDS * RATE_HZ }, (_, i) => {
    const t = i / RATE_HZ;
    const move = t >= 600 && t < 606 ? moveUv * Math.sin(Math.PI * (t - 600)) : 0;
    return 100 * Math.sin(2 * Math.PI * 0.05 * t) + move;
  });
const span = (parts: Partial<Span> = {}): Span => ({
  id: 7,
  fromS: 598,
  toS: 608,
  lead: '#1',
  target: 'stomach',
  cause: 'move',
  origin: 'proposed',
  note: '',
  ...parts,
});
const doubtsOf = (moveUv: number, spans: readonly Span[]) =>
  slowSpanDoubts({ lead: '#1', recorded: lead(moveUv), rateHz: RATE_HZ, spans, gaps: [] });

describe('what may be spoiled for the stomach', () => {
  it('is a swing far beyond the usual that no span excludes; the mend excludes it', () => {
    const [doubt, ...others] = doubtsOf(600, []);
    expect(others).toEqual([]);
    expect(doubt).toMatchObject({ kind: 'span', lead: '#1', mend: { kind: 'exclude' } });
    expect(doubt.fromS).toBeGreaterThan(590);
    expect(doubt.fromS).toBeLessThanOrEqual(600);
    expect(doubt.toS).toBeGreaterThanOrEqual(606);
    expect(doubt.toS).toBeLessThan(616);
  });

  it('raises no doubt where a span excludes it, nor does an ordinary slow wave', () => {
    expect(doubtsOf(600, [span()])).toEqual([]);
    expect(doubtsOf(0, [])).toEqual([]);
  });

  it('was excluded by the program and looks clean: the mend includes it', () => {
    expect(doubtsOf(0, [span()])).toMatchObject([{ mend: { kind: 'include', spanId: 7 } }]);
    expect(doubtsOf(0, [span({ origin: 'drawn' })])).toEqual([]);
    expect(doubtsOf(0, [span({ cause: 'flat' })])).toEqual([]);
  });
});
