import { createRandom } from '../../../src/numeric/random';
import {
  type Beat,
  type BeatClass,
  type BeatList,
  beatAt,
  beatsOf,
} from '../../../src/recording/beat';
import { TICKS_PER_SAMPLE, ticksToSeconds } from '../../../src/units/ticks';
import type { DoubtCase } from './cases';
import { type BeatError, isScored } from './errors';

/** Errors planted are so many beats apart, so that each is one. */
const APART = 4;
/** A false beat lies farther than this from its neighbours, else it would count as one of them. */
const FALSE_FROM_S = 0.16;

export interface Planted {
  readonly beats: BeatList;
  readonly errors: readonly BeatError[];
}

/** Beats with so many taken away, put in where none is, and put in another class, at places that only the seed decides. */
export function plantErrors(one: DoubtCase, each: number, seed: number): Planted {
  const { beats, rateHz } = one.input;
  const random = createRandom(seed);
  const rows: Beat[] = Array.from(beats.ticks, (_, i) => beatAt(beats, i));
  const timeOf = ({ tick }: Beat) => ticksToSeconds(tick, rateHz);
  const used = new Set<number>();
  const isFree = (i: number) => {
    for (let k = i - APART; k <= i + APART; k += 1) if (used.has(k)) return false;
    return i > APART && i < rows.length - APART - 1 && isScored(one, timeOf(rows[i]));
  };
  const pick = (): number => {
    for (;;) {
      const i = random.below(rows.length);
      if (!isFree(i)) continue;
      used.add(i);
      return i;
    }
  };
  const errors: BeatError[] = [];
  const changed = new Map<number, readonly Beat[]>();
  const margin = FALSE_FROM_S * TICKS_PER_SAMPLE * rateHz;
  for (let k = 0; k < each; k += 1) {
    const gone = pick();
    changed.set(gone, []);
    errors.push({ kind: 'missed', timeS: timeOf(rows[gone]) });
    const before = pick();
    const room = rows[before + 1].tick - rows[before].tick - 2 * margin;
    const tick = Math.round(rows[before].tick + margin + random.uniform() * room);
    changed.set(before, [rows[before], { tick, beatClass: 'N', origin: 'detected' }]);
    errors.push({ kind: 'too many', timeS: ticksToSeconds(tick, rateHz) });
    const swapped = pick();
    const beatClass = otherClass(rows[swapped].beatClass, k);
    changed.set(swapped, [{ ...rows[swapped], beatClass }]);
    errors.push({ kind: 'wrong class', timeS: timeOf(rows[swapped]) });
  }
  return { beats: beatsOf(rows.flatMap((row, i) => changed.get(i) ?? [row])), errors };
}

const otherClass = (beatClass: BeatClass, k: number): BeatClass =>
  beatClass === 'N' ? (k % 2 === 0 ? 'V' : 'S') : 'N';
