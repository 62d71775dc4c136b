import { BEAT_CLASSES, type BeatList } from '../../../src/recording/beat';
import type { Doubt } from '../../../src/recording/doubt';
import { ticksToSeconds } from '../../../src/units/ticks';
import { matchBeats } from '../../heart/score';
import type { DoubtCase } from './cases';

export type ErrorKind = 'missed' | 'too many' | 'wrong class';

export interface BeatError {
  readonly kind: ErrorKind;
  readonly timeS: number;
}

/** A place and a doubt belong together from this distance on, as a beat found and a known one do (ANSI/AAMI EC57). */
const SAME_S = 0.15;

export const isScored = ({ left }: DoubtCase, timeS: number): boolean =>
  !left.some(({ fromS, toS }) => timeS >= fromS && timeS < toS);

/** What is wrong with a list of beats, within [fromS, toS) where given. */
export function errorsOf(
  one: DoubtCase,
  beats: BeatList,
  fromS = Number.NEGATIVE_INFINITY,
  toS = Number.POSITIVE_INFINITY,
): readonly BeatError[] {
  const counts = (timeS: number) => timeS >= fromS && timeS < toS && isScored(one, timeS);
  const known = one.known.filter(({ timeS }) => counts(timeS));
  const found = Array.from(beats.ticks, (tick, i) => ({
    timeS: ticksToSeconds(tick, one.input.rateHz),
    beatClass: BEAT_CLASSES[beats.classes[i]],
  })).filter(({ timeS }) => counts(timeS));
  const { missed, extra, pairs } = matchBeats(
    known.map(({ timeS }) => timeS),
    found.map(({ timeS }) => timeS),
  );
  const wrong = pairs.filter(([k, f]) => {
    const { beatClass } = known[k];
    return beatClass !== null && beatClass !== found[f].beatClass;
  });
  return [
    ...missed.map((k) => ({ kind: 'missed' as const, timeS: known[k].timeS })),
    ...extra.map((f) => ({ kind: 'too many' as const, timeS: found[f].timeS })),
    ...wrong.map(([, f]) => ({ kind: 'wrong class' as const, timeS: found[f].timeS })),
  ];
}

/** Whether an error lies at the place of some doubt. */
export const isListed = (doubts: readonly Doubt[], { timeS }: Pick<BeatError, 'timeS'>): boolean =>
  doubts.some(({ fromS, toS }) => timeS > fromS - SAME_S && timeS < toS + SAME_S);
