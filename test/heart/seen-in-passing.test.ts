import { describe, expect, it } from 'vitest';
import { rrSeries } from '../../src/heart/rr-series';
import { seenInPassing } from '../../src/heart/seen-in-passing';
import type { HeartSegment } from '../../src/recording/heart-series';
import type { Interval } from '../../src/recording/span';
import { beatsAfter, RATE_HZ } from './beats';

const ADVICE = ': seen in the recording; have it looked at under local protocol';

function seen(
  rrMs: readonly number[],
  letters = '',
  blocked: readonly Interval[] = [],
  segments: readonly HeartSegment[] = [],
) {
  const beats = beatsAfter(rrMs, 0, letters);
  return seenInPassing({
    rr: rrSeries(beats, RATE_HZ, blocked),
    beats,
    rateHz: RATE_HZ,
    blocked,
    segments,
  }).map(({ fromS, toS, text }) => [fromS, toS, text.replace(ADVICE, '')]);
}

const many = (count: number, ms: number): number[] => new Array(count).fill(ms);

describe('seen in passing', () => {
  it('says nothing of a steady rhythm', () => {
    expect(seen(many(600, 800))).toEqual([]);
    expect(seen([])).toEqual([]);
  });

  it('sees a pause over 3 s, not one of 3 s, and none that a blocked stretch or an unusable beat explains', () => {
    const rr = [...many(5, 1000), 3200, ...many(5, 1000)];
    expect(seen(rr)).toEqual([[5, 8.2, 'no beat for 3.2 s']]);
    expect(seen([...many(5, 1000), 3000, ...many(5, 1000)])).toEqual([]);
    expect(seen(rr, '', [{ fromS: 6, toS: 7 }])).toEqual([]);
    expect(seen(rr, 'NNNNNQ')).toEqual([]);
  });

  it('sees a rate under 40 or over 130 that holds for a minute, and no shorter one', () => {
    expect(seen([...many(60, 800), ...many(45, 1600), ...many(60, 800)])).toEqual([
      [
        expect.closeTo(44.8, 6),
        expect.closeTo(123.2, 6),
        'heart rate under 40 a minute for a minute or longer',
      ],
    ]);
    expect(seen([...many(60, 800), ...many(30, 1600), ...many(60, 800)])).toEqual([]);
    expect(seen([...many(60, 800), ...many(150, 450), ...many(60, 800)])).toHaveLength(1);
    expect(seen(many(300, 461))[0][2]).toBe('heart rate over 130 a minute for a minute or longer');
    expect(seen(many(300, 462))).toEqual([]);
    expect(seen(many(100, 450))).toEqual([]);
  });

  it('sees no rate across a blocked stretch', () => {
    const fast = many(200, 450);
    expect(seen(fast, '', [{ fromS: 44, toS: 46 }])).toEqual([]);
  });

  it('sees three or more V beats in a row, counted, but not two, nor across a blocked stretch', () => {
    expect(seen(many(12, 600), 'NNVVNNVVVVNN')).toEqual([
      [expect.closeTo(3.6, 6), expect.closeTo(5.4, 6), '4 beats of class V in a row'],
    ]);
    expect(seen(many(4, 600), 'NNVVV')).toHaveLength(1);
    expect(seen(many(4, 600), 'VVVNN')).toHaveLength(1);
    expect(seen(many(6, 600), 'NVVVN', [{ fromS: 0.7, toS: 0.8 }])).toEqual([]);
  });

  it('joins irregular segments that meet or come twice, and names no disease', () => {
    const segment = (fromS: number, state: HeartSegment['state']): HeartSegment => ({
      phase: 'fed',
      fromS,
      toS: fromS + 300,
      nnShare: 1,
      state,
      sdnnMs: null,
      lfMs2: null,
      hfMs2: null,
    });
    const segments = [
      segment(0, 'used'),
      segment(300, 'irregular'),
      segment(600, 'irregular'),
      segment(300, 'irregular'),
    ];
    expect(seen(many(10, 800), '', [], segments)).toEqual([
      [300, 900, 'irregular rhythm in 10 min'],
    ]);
  });
});
