import { describe, expect, it } from 'vitest';
import { fittedGain, GAINS_UV, gainFor, middleUv, nextGain } from '../../src/review/gain';

describe('the gain of a trace row', () => {
  it('takes the least step that shows the whole wave', () => {
    expect(gainFor(160)).toBe(200);
    expect(gainFor(200)).toBe(200);
    expect(gainFor(0)).toBe(1);
    expect(gainFor(Number.NaN)).toBe(1);
    expect(gainFor(9e9)).toBe(700_000);
  });

  it('goes up and down by neighbouring steps and stops at the ends', () => {
    expect(nextGain(200, 'finer')).toBe(150);
    expect(nextGain(200, 'coarser')).toBe(300);
    expect(nextGain(1, 'finer')).toBe(1);
    expect(nextGain(700_000, 'coarser')).toBe(700_000);
    expect(GAINS_UV).toEqual([...GAINS_UV].sort((a, b) => a - b));
  });

  const steady = (count: number, uv: number) => Array.from({ length: count }, () => uv);

  it('fits a steady wave with a little to spare', () => {
    expect(fittedGain({ low: steady(100, -125), high: steady(100, 90) }, 10, false)).toBe(150);
  });

  it('is not made small by one spoiled stretch, nor by a short artefact in every window', () => {
    const stretch = steady(100, 80).map((v, i) => (i >= 40 && i < 50 ? 5000 : v));
    const often = steady(100, 80).map((v, i) => (i % 20 === 3 ? 5000 : v));
    for (const high of [stretch, often])
      for (const centred of [true, false])
        expect(fittedGain({ low: high.map((v) => -v), high }, 20, centred)).toBe(100);
  });

  it('shows R peaks that stand in one column of five', () => {
    const high = steady(300, 10).map((v, i) => (i % 5 === 0 ? 170 : v));
    expect(fittedGain({ low: steady(300, -10), high }, 60, false)).toBe(200);
  });

  it('does not count a standing offset of a recorded lead', () => {
    const low = Array.from({ length: 200 }, (_, i) => 20_000 + 80 * Math.sin(i) - 5);
    expect(fittedGain({ low, high: low.map((v) => v + 10) }, 40, true)).toBe(100);
  });

  it('leaves gaps out of account', () => {
    const low = [Number.NaN, -10, Number.NaN];
    expect(middleUv({ low, high: [Number.NaN, 30, Number.NaN] }, 0, 3)).toBe(10);
    expect(fittedGain({ low: [Number.NaN], high: [Number.NaN] }, 1, true)).toBeNull();
  });
});
