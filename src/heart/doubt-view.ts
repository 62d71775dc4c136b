import { log } from '../numeric/elementary';
import { runningMedian } from '../numeric/running-quantile';
import {
  BEAT_ORIGINS,
  type Beat,
  type BeatClass,
  type BeatList,
  type BeatOrigin,
  beatAt,
  firstBeatAt,
} from '../recording/beat';
import type { DoubtKind, Mend } from '../recording/doubt';
import type { Interval } from '../recording/span';
import type { Hertz } from '../units/rate';
import { type BeatLook, likenessTo } from './beat-looks';
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
  /** Likeness to the averages of classes, NaN where there are none. */
  readonly likeness: (beat: number, classes: readonly BeatClass[]) => number;
  /** Usual likeness to the best average, and usual size, of the beats about one. */
  readonly usualLikeness: (beat: number) => number;
  readonly usualSize: (beat: number) => number;
}

/** Beats that tell what is usual about one. */
const USUAL_OF = 21;

/** Beats of classes that have the shape of normal ones. */
export const NARROW = ['N', 'S'] as const;
export const WIDE = ['V', 'F'] as const;

/** Beats that nobody has put or moved by hand. */
const OWN: readonly BeatOrigin[] = ['detected', 'imported'];

/** The view of beats; `looks` is how each of them looks. */
export function doubtView(input: BeatDoubtsInput, looks: readonly BeatLook[]): DoubtView {
  const { beats, rateHz, blocked, detection } = input;
  const timesS = beatTimes(beats, rateHz);
  const broken = blockedIntervals(timesS, blocked);
  const logRr = Float64Array.from(broken, (isBroken, i) =>
    isBroken === 1 ? Number.NaN : log(timesS[i + 1] - timesS[i]),
  );
  const rrMs = timesS.map((timeS, i) =>
    i === 0 || broken[i - 1] === 1 ? Number.NaN : 1000 * (timeS - timesS[i - 1]),
  );
  const usual = (value: (look: BeatLook) => number) =>
    runningMedian(Float64Array.from(looks, value), USUAL_OF);
  const [likenesses, sizes] = [usual(bestLikeness), usual(({ size }) => size)];
  return {
    ...input,
    count: timesS.length,
    timesS,
    rrMs,
    logRr,
    ways: foretellings(logRr),
    classOf: (beat) => beatAt(beats, beat).beatClass,
    isOwn: (beat) => OWN.includes(BEAT_ORIGINS[beats.origins[beat]]),
    look: (beat) => looks[beat],
    likeness: (beat, classes) => likenessTo(looks[beat], detection.averages, classes),
    usualLikeness: (beat) => likenesses[beat],
    usualSize: (beat) => sizes[beat],
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
  const added = wanted.filter(
    ({ tick }, i) =>
      beats.ticks[firstBeatAt(beats, tick)] !== tick &&
      wanted.findIndex((other) => other.tick === tick) === i,
  );
  if (added.length === 0) return null;
  const verb = added.every(({ origin }) => origin === 'placed') ? 'place' : 'insert';
  const words = added.length === 1 ? `${verb} beat` : `${verb} ${added.length} beats`;
  return { kind: 'beats', words, removed: [], added };
}

/** A share in the words of a doubt: "96 %". */
export const percent = (share: number): string => `${Math.round(100 * share)} %`;
