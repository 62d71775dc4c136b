import { describe, expect, it } from 'vitest';
import { adequacy, adequacyReason, coverageOf, keptPercent } from '../../src/recording/adequacy';

describe('adequacy of a phase', () => {
  it('is limited only when more than 30 % is lost, not reportable only when more than half is', () => {
    expect(adequacy(1800, 1800)).toBe('enough');
    expect(adequacy(1260, 1800)).toBe('enough');
    expect(adequacy(1259, 1800)).toBe('limited');
    expect(adequacy(900, 1800)).toBe('limited');
    expect(adequacy(899, 1800)).toBe('not-reportable');
  });

  it('calls a stretch without length not reportable', () => {
    expect(adequacy(0, 0)).toBe('not-reportable');
  });

  it('does not turn exactly 30 % into more by rounding', () => {
    expect(adequacy(0.7 * 0.1, 0.1)).toBe('enough');
    expect(adequacy(3 * 0.7, 3)).toBe('enough');
  });
});

describe('percent kept', () => {
  it('never reads as the limit that a phase has passed', () => {
    expect(adequacy(0.696 * 600, 600)).toBe('limited');
    expect(keptPercent(0.696 * 600, 600)).toBe(69);
    expect(adequacyReason('limited', 0.696 * 600, 600)).toBe('69 % kept');
    expect(keptPercent(0.7 * 0.1, 0.1)).toBe(70);
    expect(keptPercent(5, 0)).toBe(0);
  });
});

describe('coverage of a stretch', () => {
  it('counts overlapping spoiled spans once and only where they lie inside', () => {
    const lost = [
      { fromS: 50, toS: 120 },
      { fromS: 110, toS: 130 },
      { fromS: 380, toS: 500 },
      { fromS: 600, toS: 700 },
    ];
    expect(coverageOf(lost, 100, 400)).toEqual({
      keptS: 250,
      lengthS: 300,
      share: 250 / 300,
      adequacy: 'enough',
    });
  });

  it('has nothing to keep in a stretch that ends before it begins', () => {
    expect(coverageOf([], 10, 5)).toEqual({
      keptS: 0,
      lengthS: 0,
      share: 0,
      adequacy: 'not-reportable',
    });
  });
});
