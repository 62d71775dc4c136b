import { describe, expect, it } from 'vitest';
import { beatsOf } from '../../src/recording/beat';
import { type Span, withoutIntervals } from '../../src/recording/span';
import type { SessionState } from '../../src/session/document';
import { freedForHeart } from '../../src/session/freed-spans';

const RATE_HZ = 100;
const span = (id: number, fromS: number, toS: number, target: Span['target']): Span => ({
  id,
  fromS,
  toS,
  lead: null,
  target,
  cause: 'move',
  origin: 'drawn',
  note: '',
});
const state = (spans: readonly Span[], beatsS: readonly number[] = []): SessionState =>
  ({
    spans,
    roles: { heart: { kind: 'channel', channel: 0 } },
    beats: beatsOf(
      beatsS.map((s) => ({ tick: s * 64 * RATE_HZ, beatClass: 'N', origin: 'detected' })),
    ),
  }) as unknown as SessionState;

describe('stretches that count for the heart again', () => {
  it('are those of a span taken away, as far as no other span covers them', () => {
    const before = state([span(1, 10, 40, 'both'), span(2, 30, 60, 'heart')]);
    const after = state([span(2, 30, 60, 'heart')]);
    expect(freedForHeart(before, after, RATE_HZ)).toEqual([{ fromS: 10, toS: 30 }]);
  });

  it('are none where the span was for the stomach alone, or where beats stand already', () => {
    expect(freedForHeart(state([span(1, 10, 40, 'stomach')]), state([]), RATE_HZ)).toEqual([]);
    expect(freedForHeart(state([span(1, 10, 40, 'both')]), state([], [20]), RATE_HZ)).toEqual([]);
  });

  it('are also those of a span that is now for the stomach only', () => {
    const before = state([span(1, 10, 40, 'both')]);
    expect(freedForHeart(before, state([span(1, 10, 40, 'stomach')]), RATE_HZ)).toEqual([
      { fromS: 10, toS: 40 },
    ]);
  });
});

it('intervals without others keep their pieces', () => {
  expect(
    withoutIntervals(
      [{ fromS: 0, toS: 10 }],
      [
        { fromS: 2, toS: 3 },
        { fromS: 9, toS: 20 },
      ],
    ),
  ).toEqual([
    { fromS: 0, toS: 2 },
    { fromS: 3, toS: 9 },
  ]);
});
