import { describe, expect, it } from 'vitest';
import { type Beat, type BeatClass, type BeatList, beatsOf } from '../../src/recording/beat';
import {
  changePhrase,
  type FoundWithinInputs,
  foundEdit,
  foundName,
  foundWithin,
} from '../../src/session/found-within';

const RATE_HZ = 250;
const tickAt = (atS: number) => Math.round(atS * RATE_HZ * 64);
const beats = (timesS: readonly number[], parts: Partial<Beat> = {}): BeatList =>
  beatsOf(
    timesS.map((atS) => ({
      tick: tickAt(atS),
      beatClass: 'N' as BeatClass,
      origin: 'detected' as const,
      ...parts,
    })),
  );
const seconds = (rows: readonly Beat[]) => rows.map(({ tick }) => tick / 64 / RATE_HZ);
const looked = (parts: Partial<FoundWithinInputs>) =>
  foundWithin({
    current: beats([1, 2, 3, 4, 5, 6]),
    found: beats([1, 2, 3, 4, 5, 6]),
    rateHz: RATE_HZ,
    within: { fromS: 1.5, toS: 5.5 },
    left: [],
    times: 'stay',
    ...parts,
  });

describe('beats found again in a stretch', () => {
  it('change nothing where the same are found, up to 150 ms off', () => {
    const change = looked({ found: beats([1.1, 2.149, 2.9, 4, 5.02, 6]) });
    expect(change).toEqual({ gained: [], lost: [], moved: [] });
    expect(foundEdit(change, 'find beats again').changes).toEqual([]);
    expect(changePhrase(change)).toBe('the same beats as now');
  });

  it('are gained and lost inside the stretch only', () => {
    const change = looked({ found: beats([0.5, 2, 2.5, 3, 3.5, 5, 6.5]) });
    expect(seconds(change.gained)).toEqual([2.5, 3.5]);
    expect(seconds(change.lost)).toEqual([4]);
    expect(changePhrase(change)).toBe('2 beats gained, 1 beat lost');
  });

  it('are none of its ends’: a beat found across the border is the same beat', () => {
    const change = looked({ within: { fromS: 2.05, toS: 4.95 }, found: beats([2.1, 3, 4, 4.9]) });
    expect(change).toEqual({ gained: [], lost: [], moved: [] });
  });

  it('keep class and origin of those that stay', () => {
    const current = beatsOf([{ tick: tickAt(2), beatClass: 'V', origin: 'placed' }]);
    expect(looked({ current, found: beats([2.01]), times: 'take' }).moved).toEqual([
      {
        from: { tick: tickAt(2), beatClass: 'V', origin: 'placed' },
        to: { tick: tickAt(2.01), beatClass: 'V', origin: 'detected' },
      },
    ]);
    expect(looked({ current, found: beats([2.01]) }).moved).toEqual([]);
  });

  it('stay where no beat was looked for', () => {
    const change = looked({ found: beats([]), left: [{ fromS: 2.5, toS: 4.5 }] });
    expect(seconds(change.lost)).toEqual([2, 5]);
  });

  it('of another lead are told by the heart lead’s R peaks, also those outside the stretch', () => {
    const late = [1, 2, 3, 3.6, 4, 5, 6].map((atS) => atS + 0.032);
    const change = looked({ found: beats(late), times: 'shift' });
    expect(seconds(change.gained)).toEqual([3.6]);
    expect(change.lost).toEqual([]);
  });

  it('are never put within 100 ms of a beat that stays', () => {
    expect(looked({ found: beats([1, 2, 2.16, 3, 3.05, 4, 5, 6]) }).gained).toEqual([
      { tick: tickAt(2.16), beatClass: 'N', origin: 'detected' },
    ]);
  });

  it('are one step with a name that says where, how, and what came of it', () => {
    const change = looked({ found: beats([2, 2.5, 3, 5]) });
    const name = foundName({ fromS: 1.5, toS: 5.5 }, ['in E2', 'more eagerly'], change);
    expect(name).toBe('find beats again 0:00:01.5-0:00:05.5 in E2, more eagerly, +1 -1');
    const [one] = foundEdit(change, name).changes;
    expect(one).toMatchObject({ kind: 'beats' });
    if (one.kind !== 'beats') throw new Error('beats expected');
    expect([seconds(one.removed), seconds(one.added)]).toEqual([[4], [2.5]]);
  });
});
