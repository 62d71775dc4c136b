import { log } from '../numeric/elementary';
import { medianInPlace } from '../numeric/statistics';
import { BEAT_ORIGINS, type Beat, type BeatClass, type BeatList, beatAt } from '../recording/beat';
import type { DoubtKind, Mend } from '../recording/doubt';
import type { Interval } from '../recording/span';
import type { Hertz } from '../units/rate';
import { type BeatLook, createBeatLooks, likenessTo } from './beat-looks';
import type { Detection } from './detect';
import { type Foretelling, foretellings } from './rhythm-foretold';
import { beatTimes, blockedIntervals } from './rr-series';
import type { Samples } from './usable-signal';

/** What the doubts of beats are read from. */
export interface BeatDoubtsInput {
  readonly beats: BeatList;
  /** Rate the beats' ticks count in. */
  readonly rateHz: Hertz;
  /** Heartbeat signal in uV at `heartbeatHz`, from the recording's first sample on; NaN in gaps. */
  readonly heartbeat: Samples;
  readonly heartbeatHz: Hertz;
  readonly ticksPerSample: number;
  /** Spoiled spans for the heart and gaps. */
  readonly blocked: readonly Interval[];
  readonly detection: Detection;
}

/** One reason to doubt the beat at an index, or what lies before it. */
export interface Reason {
  readonly beat: number;
  readonly kind: DoubtKind;
  /** About how likely something is wrong, 0 to 1: the strongest reason names the doubt. */
  readonly strength: number;
  readonly why: string;
  readonly mend: Mend | null;
}

/** The beats with all that reasons are found from, one value a beat unless said otherwise. */
export interface DoubtView extends BeatDoubtsInput {
  readonly count: number;
  readonly timesS: Float64Array;
  /** RR in ms that ends at each beat; NaN where something blocked lies between. */
  readonly rrMs: Float64Array;
  /** Its logarithm in s, one value an interval: interval i ends at beat i + 1. */
  readonly logRr: Float64Array;
  readonly ways: readonly Foretelling[];
  readonly classOf: (beat: number) => BeatClass;
  /** Whether the detector put it there: beats that a person put or moved are theirs. */
  readonly isOwn: (beat: number) => boolean;
  readonly look: (beat: number) => BeatLook;
  readonly lookAtTick: (tick: number) => BeatLook;
  /** Likeness to the averages of classes, NaN where there are none. */
  readonly likeness: (beat: number, classes: readonly BeatClass[]) => number;
  /** Usual likeness to the best average, and usual size, of the beats about one. */
  readonly usualLikeness: (beat: number) => number;
  readonly usualSize: (beat: number) => number;
}

const USUAL_OF = 10;

/** Beats of classes that have the shape of normal ones. */
export const NARROW = ['N', 'S'] as const;
export const WIDE = ['V', 'F'] as const;

export function doubtView(
  input: BeatDoubtsInput,
  lookAtTick: (tick: number) => BeatLook = createBeatLooks({
    ...input,
    averages: input.detection.averages,
  }),
): DoubtView {
  const { beats, rateHz, blocked, detection } = input;
  const timesS = beatTimes(beats, rateHz);
  const broken = blockedIntervals(timesS, blocked);
  const logRr = Float64Array.from(broken, (isBroken, i) =>
    isBroken === 1 ? Number.NaN : log(timesS[i + 1] - timesS[i]),
  );
  const rrMs = timesS.map((timeS, i) =>
    i === 0 || broken[i - 1] === 1 ? Number.NaN : 1000 * (timeS - timesS[i - 1]),
  );
  const look = (beat: number) => lookAtTick(beats.ticks[beat]);
  const detected = [BEAT_ORIGINS.indexOf('detected'), BEAT_ORIGINS.indexOf('imported')];
  const few = new Float64Array(2 * USUAL_OF + 1);
  const medianAbout = (beat: number, value: (i: number) => number) => {
    let n = 0;
    const last = Math.min(timesS.length - 1, beat + USUAL_OF);
    for (let i = Math.max(0, beat - USUAL_OF); i <= last; i += 1) {
      const one = value(i);
      if (!Number.isNaN(one)) few[n++] = one;
    }
    return medianInPlace(few, n);
  };
  return {
    ...input,
    count: timesS.length,
    timesS,
    rrMs,
    logRr,
    ways: foretellings(logRr),
    classOf: (beat) => beatAt(beats, beat).beatClass,
    isOwn: (beat) => detected.includes(beats.origins[beat]),
    look,
    lookAtTick,
    likeness: (beat, classes) => likenessTo(look(beat), detection.averages, classes),
    usualLikeness: (beat) => medianAbout(beat, (i) => bestLikeness(look(i))),
    usualSize: (beat) => medianAbout(beat, (i) => look(i).size),
  };
}

export const bestLikeness = ({ best, likeness }: BeatLook): number =>
  best < 0 ? Number.NaN : likeness[best];

/** The change that puts a beat in a class. */
export const classMend = ({ beats }: DoubtView, beat: number, beatClass: BeatClass): Mend => ({
  kind: 'beats',
  words: `class beat ${beatClass}`,
  removed: [beatAt(beats, beat)],
  added: [{ ...beatAt(beats, beat), beatClass }],
});

/** The change that takes a beat away. */
export const removal = ({ beats }: DoubtView, beat: number): Mend => ({
  kind: 'beats',
  words: 'remove beat',
  removed: [beatAt(beats, beat)],
  added: [],
});

/** The change that puts beats in; null where each place is taken. */
export function insertion({ beats }: DoubtView, wanted: readonly Beat[]): Mend | null {
  const taken = new Set(beats.ticks);
  const added = wanted.filter(({ tick }) => {
    if (taken.has(tick)) return false;
    taken.add(tick);
    return true;
  });
  if (added.length === 0) return null;
  const verb = added.every(({ origin }) => origin === 'placed') ? 'place' : 'insert';
  const words = added.length === 1 ? `${verb} beat` : `${verb} ${added.length} beats`;
  return { kind: 'beats', words, removed: [], added };
}
