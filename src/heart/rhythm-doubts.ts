import { exp, log } from '../numeric/elementary';
import {
  bestLikeness,
  classMend,
  type DoubtView,
  NARROW,
  type Reason,
  removal,
  WIDE,
} from './doubt-view';

const OUT_SPREADS = 3.5;
/** Of two intervals that make one each is below this part of it. */
const SHORTER_PART = 0.92;
const FIT_SPREADS = 3;
/** An interval below this part of the usual one is early. */
const EARLY_PART = 0.87;
/** An S beat that comes no earlier than this part is in question. */
const ON_TIME_PART = 0.85;
/** Two beats nearer than this are two candidates for one (ventricles are refractory; common practice, no source). */
const ONE_BEAT_MS = 240;
/** So are two nearer than this of which one looks like no beat. */
const NEAR_MS = 300;
/** Where a T wave lies after its beat. */
const T_WAVE_MS = [180, 400] as const;
/** Less like the averages than usual by this much, a complex is odd. */
const ODD_BY = 0.2;
const WIDE_LIKE = 0.8;
const PLAIN_LIKE = 0.9;

/** How the intervals before and after a beat stand beside what is foretold, by one way to foretell. */
interface Standing {
  readonly usualMs: number;
  /** Logarithm of each interval over the foretold one. */
  readonly before: number;
  readonly after: number;
  readonly spread: number;
}

function standings({ logRr, ways }: DoubtView, beat: number): readonly Standing[] {
  const i = beat - 1;
  return ways.flatMap(({ expected, spread }) => {
    const usual = expected(i, i + 1);
    if (Number.isNaN(usual) || Number.isNaN(spread[i])) return [];
    const [before, after] = [logRr[i] - usual, (logRr[i + 1] ?? Number.NaN) - usual];
    return [{ usualMs: 1000 * exp(usual), before, after, spread: spread[i] }];
  });
}

/** The two intervals about a beat make one of the expected length, and each is shorter than that. */
const isExtra = ({ before, after, spread }: Standing) =>
  Math.abs(log(exp(before) + exp(after))) < FIT_SPREADS * spread &&
  Math.min(before, after) < -OUT_SPREADS * spread &&
  Math.max(before, after) < log(SHORTER_PART);

const isEarly = ({ before, spread }: Standing) =>
  before < -OUT_SPREADS * spread && before < log(EARLY_PART);

/** Why a beat may be too many, early, or on time where its class says otherwise; null where it is none of these. */
export function rhythmReason(view: DoubtView, beat: number): Reason | null {
  if (!view.isOwn(beat) || Number.isNaN(view.rrMs[beat])) return null;
  return nearReason(view, beat) ?? placeReason(view, beat);
}

/** Two beats so near that they are one. */
function nearReason(view: DoubtView, beat: number): Reason | null {
  const rr = view.rrMs[beat];
  if (!(rr < NEAR_MS)) return null;
  const own = bestLikeness(view.look(beat));
  const other = bestLikeness(view.look(beat - 1));
  if (rr >= ONE_BEAT_MS && Math.min(own, other) >= PLAIN_LIKE) return null;
  const worse = own > other && view.isOwn(beat - 1) ? beat - 1 : beat;
  return {
    beat,
    kind: 'two-candidates',
    strength: 0.9,
    why: `Only ${Math.round(rr)} ms lie between this beat and the one before: one of them is too many.`,
    mend: removal(view, worse),
  };
}

function placeReason(view: DoubtView, beat: number): Reason | null {
  const all = standings(view, beat);
  if (all.length === 0) return null;
  const beatClass = view.classOf(beat);
  const isWide = beatClass === 'V' || beatClass === 'F';
  if (isWide && view.likeness(beat, WIDE) >= WIDE_LIKE) return null;
  const [first] = all;
  const isPlainS = beatClass === 'S' && view.likeness(beat, NARROW) >= PLAIN_LIKE;
  if (isExtra(first) && !isPlainS) return extraReason(view, beat, first);
  if (beatClass === 'S') return onTimeReason(view, beat, first);
  if (beatClass === 'N' && all.every(isEarly)) return earlyReason(view, beat, first);
  return null;
}

function extraReason(view: DoubtView, beat: number, { usualMs }: Standing): Reason {
  const [before, after] = [view.rrMs[beat], view.rrMs[beat + 1]].map(Math.round);
  const isOdd = !(view.likeness(beat, NARROW) > view.usualLikeness(beat) - ODD_BY);
  const inWave = isOdd && before >= T_WAVE_MS[0] && before <= T_WAVE_MS[1];
  return {
    beat,
    kind: inWave ? 'tall-wave' : 'extra-beat',
    strength: isOdd ? 0.95 : 0.8,
    why: inWave
      ? `It follows a beat by ${before} ms, where a T wave lies, and the intervals about it make one of the usual ${Math.round(usualMs)} ms.`
      : `The intervals of ${before} and ${after} ms about it make one of the usual ${Math.round(usualMs)} ms.`,
    mend: removal(view, beat),
  };
}

function earlyReason(view: DoubtView, beat: number, { usualMs, after }: Standing): Reason {
  const wide = view.likeness(beat, WIDE);
  const isWide = wide > view.likeness(beat, NARROW);
  const pause = after > 0.1 ? ', and a pause follows' : '';
  return {
    beat,
    kind: 'early-beat',
    strength: 0.7,
    why: `It comes after ${Math.round(view.rrMs[beat])} ms where ${Math.round(usualMs)} ms are usual${pause}.`,
    mend: classMend(view, beat, isWide ? 'V' : 'S'),
  };
}

/** An S beat that does not come early; in a run only the first one need. */
function onTimeReason(view: DoubtView, beat: number, { usualMs, before }: Standing): Reason | null {
  if (before < log(ON_TIME_PART) || view.classOf(beat - 1) === 'S') return null;
  return {
    beat,
    kind: 'early-beat',
    strength: 0.6,
    why: `It is of class S but comes after ${Math.round(view.rrMs[beat])} ms, where ${Math.round(usualMs)} ms are usual: not early.`,
    mend: classMend(view, beat, 'N'),
  };
}
