import { describe, expect, it } from 'vitest';
import type { Epoch, Rhythm } from '../../src/recording/rhythm';
import { epochsOfPair } from '../../src/stomach/slow-wave-coupling';

const epoch = (minute: number, dfCpm: number | null, rhythm: Rhythm | null = 'normo'): Epoch => ({
  lead: '#1',
  phase: 'fasting',
  fromS: 60 * minute,
  toS: 60 * minute + 240,
  kept: rhythm !== null,
  spoiledFraction: 0,
  dfCpm,
  dpDb: 50,
  peakShare: 0.5,
  rhythm,
  flags: [],
});
const coupled = (a: readonly Epoch[], b: readonly Epoch[]) =>
  epochsOfPair(a, b).map((one) => one.coupled);

describe('epochs of two leads', () => {
  it('are coupled in 80 % of CV-21', () => {
    const a = [3.0, 3.1, 2.9, 3.5, 3.0].map((df, i) => epoch(i, df));
    const b = [3.1, 3.25, 3.15, 3.4, 2.9].map((df, i) => epoch(i, df));
    expect(coupled(a, b)).toEqual([true, true, false, true, true]);
  });

  it('are not coupled at exactly 0.2 cpm, whatever decimals make of it', () => {
    const a = [3.1, 3.3, 2.7].map((df, i) => epoch(i, df));
    const b = [3.3, 3.1, 2.9].map((df, i) => epoch(i, df));
    expect(coupled(a, b)).toEqual([false, false, false]);
  });

  it('are not coupled outside the normal band, though they share a DF there', () => {
    const pair = epochsOfPair([epoch(0, 5.1, 'tachy')], [epoch(0, 5.2, 'tachy')]);
    expect(pair).toMatchObject([{ coupled: false, sharedCpm: expect.closeTo(5.15, 9) }]);
    const undecided = epochsOfPair([epoch(0, 3, 'undecided')], [epoch(0, 3)]);
    expect(undecided).toMatchObject([{ coupled: false, sharedCpm: null }]);
  });

  it('count only where both are kept, and are matched by their time', () => {
    const a = [epoch(0, 3), epoch(1, null, null), epoch(2, 3)];
    const b = [epoch(1, 3), epoch(2, 3.1), epoch(3, 3)];
    expect(epochsOfPair(a, b).map(({ fromS }) => fromS)).toEqual([120]);
  });
});
