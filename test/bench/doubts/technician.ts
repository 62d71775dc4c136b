import { beatDoubts } from '../../../src/heart/beat-doubts';
import { stillOpen } from '../../../src/heart/open-doubts';
import {
  type Beat,
  type BeatClass,
  type BeatList,
  beatAt,
  beatsOf,
  changeBeats,
  firstBeatAt,
} from '../../../src/recording/beat';
import type { Doubt, SettledDoubt } from '../../../src/recording/doubt';
import { secondsToTicks } from '../../../src/units/ticks';
import type { DoubtCase } from './cases';
import { errorsOf } from './errors';

/** What is looked at about a doubt. */
const ABOUT_S = 0.16;
/** Keys to put one beat right by hand where no mend is offered that does: choose the place, do it. */
const BY_HAND = 2;
const MOST_PASSES = 6;

export interface Work {
  readonly strokes: number;
  readonly settled: number;
  /** Doubts put right by hand. */
  readonly byHand: number;
  readonly beats: BeatList;
}

/**
 * One who knows the truth and goes through the list: one key to its first doubt; at each the mend where it makes fewer errors,
 * else keep, one key that goes on to the next by itself; by hand what is wrong there and not put right by the mend.
 */
export function workThrough(one: DoubtCase, start: BeatList): Work {
  let beats = start;
  let strokes = 0;
  let byHand = 0;
  const settled: SettledDoubt[] = [];
  for (let pass = 0; pass < MOST_PASSES; pass += 1) {
    const all = beatDoubts({ ...one.input, beats });
    const open = stillOpen(all, settled, beats, one.input.rateHz);
    if (open.length === 0) break;
    if (pass === 0) strokes += 1;
    for (const doubt of open) {
      const { id, tick } = doubt;
      const after = isStale(beats, doubt) ? null : betterBy(one, beats, doubt);
      beats = after ?? beats;
      strokes += 1;
      settled.push({ id, tick, ending: after ? 'mended' : 'kept' });
      const [fromS, toS] = [doubt.fromS - ABOUT_S, doubt.toS + ABOUT_S];
      if (errorsOf(one, beats, fromS, toS).length === 0) continue;
      beats = putRight(one, beats, fromS, toS);
      strokes += BY_HAND;
      byHand += 1;
    }
  }
  return { strokes, settled: settled.length, byHand, beats };
}

/** A mend that an earlier one has overtaken. */
function isStale(beats: BeatList, { mend }: Doubt): boolean {
  if (mend?.kind !== 'beats') return false;
  const at = (tick: number) => {
    const i = firstBeatAt(beats, tick);
    return beats.ticks[i] === tick ? beatAt(beats, i) : null;
  };
  const removed = new Set(mend.removed.map(({ tick }) => tick));
  return (
    mend.removed.some(({ tick, beatClass }) => at(tick)?.beatClass !== beatClass) ||
    mend.added.some(({ tick }) => at(tick) !== null && !removed.has(tick))
  );
}

function betterBy(one: DoubtCase, beats: BeatList, doubt: Doubt): BeatList | null {
  if (doubt.mend?.kind !== 'beats') return null;
  const after = changeBeats(beats, doubt.mend.removed, doubt.mend.added);
  const count = (list: BeatList) =>
    errorsOf(one, list, doubt.fromS - ABOUT_S, doubt.toS + ABOUT_S).length;
  return count(after) < count(beats) ? after : null;
}

/** The beats with the known ones in place of those of a stretch; what nobody classes is N. */
function putRight(one: DoubtCase, beats: BeatList, fromS: number, toS: number): BeatList {
  const { rateHz } = one.input;
  const [from, to] = [secondsToTicks(fromS, rateHz), secondsToTicks(toS, rateHz)];
  const kept = Array.from(beats.ticks, (_, i) => beatAt(beats, i)).filter(
    ({ tick }) => tick < from || tick >= to,
  );
  const known = one.known
    .filter(({ timeS }) => timeS >= fromS && timeS < toS)
    .map(
      ({ timeS, beatClass }): Beat => ({
        tick: secondsToTicks(timeS, rateHz),
        beatClass: beatClass ?? ('N' satisfies BeatClass),
        origin: 'added',
      }),
    );
  return beatsOf([...kept, ...known]);
}
