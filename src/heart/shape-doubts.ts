import { exp } from '../numeric/elementary';
import type { BeatClass } from '../recording/beat';
import {
  bestLikeness,
  classMend,
  type DoubtView,
  NARROW,
  percent,
  type Reason,
  WIDE,
} from './doubt-view';

/** More like the averages of the other kind by this much, a beat is of the wrong class. */
const CLEARER_BY = 0.05;
/** A wide beat on time is in question where it is not clearer than this. */
const NEARLY_BY = 0.06;
/** Less like its best average than the beats about it by this much, a beat is odd. */
const ODD_BY = 0.2;
const NEVER_ODD = 0.9;
/** As like the normal average as this, a wide class is in question even where no average of it is known. */
const PLAINLY_NARROW = 0.93;
/** Likeness upside down, and how much it must exceed that of the right way up. */
const TURNED = 0.8;
const TURNED_BY = 0.15;
const PLAINLY_TURNED = 0.9;
/** Smaller than this part of the beats about it and within so many standard deviations of the noise, a beat is low. */
const LOW_PART = 0.5;
const LOW_OVER_NOISE = 4;

/** An interval off by more than this (logarithm) is what a beat was set aside for. */
const FAR = 0.13;

/** Why a beat does not look as its class does; null where it does. */
export function shapeReason(view: DoubtView, beat: number): Reason | null {
  if (!view.isOwn(beat) || Number.isNaN(bestLikeness(view.look(beat)))) return null;
  return (
    turnedReason(view, beat) ??
    lowReason(view, beat) ??
    classReason(view, beat) ??
    oddReason(view, beat)
  );
}

/**
 * A beat upside down. Where many are, they have an average of their own: then it must come on time, since early ventricular
 * beats may look like normal ones turned over.
 */
function turnedReason(view: DoubtView, beat: number): Reason | null {
  const { turned, likeness } = view.look(beat);
  const main = likeness[0];
  if (!(turned >= TURNED && turned > main + TURNED_BY)) return null;
  const hasOwnAverage = turned <= Math.max(...likeness) + TURNED_BY;
  if (hasOwnAverage && !(turned >= PLAINLY_TURNED && Math.abs(offRhythm(view, beat)) < FAR))
    return null;
  return {
    beat,
    kind: 'sign-change',
    strength: 0.75,
    why: `It is like the average beat upside down (${percent(turned)}), and less so the right way up (${percent(Math.max(0, main))}).`,
    mend: null,
  };
}

/** Logarithm of the interval before a beat over the foretold one. */
const offRhythm = ({ ways, logRr }: DoubtView, beat: number): number =>
  logRr[beat - 1] - ways[0].expected(beat - 1, beat - 1);

/** A beat that looks like beats of another class, and any that the program could not class. */
function classReason(view: DoubtView, beat: number): Reason | null {
  const beatClass = view.classOf(beat);
  const narrow = view.likeness(beat, NARROW);
  const wide = view.likeness(beat, WIDE);
  if (beatClass === 'Q') return unclassed(view, beat, narrow, wide);
  const isWide = beatClass === 'V' || beatClass === 'F';
  const contradicts = isWide
    ? narrow > wide + CLEARER_BY || (Number.isNaN(wide) && narrow > PLAINLY_NARROW)
    : wide > narrow + CLEARER_BY;
  if (!contradicts) return isWide ? onTimeReason(view, beat, narrow, wide) : null;
  const [is, isNot] = isWide ? [narrow, wide] : [wide, narrow];
  const other: BeatClass = isWide ? 'N' : 'V';
  const beside = Number.isNaN(isNot)
    ? ''
    : `, more than those of its own class (${percent(isNot)})`;
  return {
    beat,
    kind: 'odd-shape',
    strength: 0.8,
    why: `It is of class ${beatClass} but like the average beat of class ${other} (${percent(is)})${beside}.`,
    mend: classMend(view, beat, other),
  };
}

/** A wide beat that comes when a normal one is due and looks nearly as much like those. */
function onTimeReason(view: DoubtView, beat: number, narrow: number, wide: number): Reason | null {
  if (!(narrow > wide - NEARLY_BY) || !(Math.abs(offRhythm(view, beat)) < FAR)) return null;
  return {
    beat,
    kind: 'odd-shape',
    strength: 0.3,
    why: `It is hardly more like the average beat of class ${view.classOf(beat)} (${percent(wide)}) than that of class N (${percent(narrow)}), and comes on time, ${Math.round(view.rrMs[beat])} ms after the one before.`,
    mend: classMend(view, beat, 'N'),
  };
}

function unclassed(view: DoubtView, beat: number, narrow: number, wide: number): Reason {
  const isWide = wide > narrow;
  const like: BeatClass = isWide ? 'V' : 'N';
  const most = isWide ? wide : narrow;
  const usual = view.usualLikeness(beat);
  if (most > usual - ODD_BY / 2) return misfit(view, beat, like, most);
  return {
    beat,
    kind: 'odd-shape',
    strength: 0.5,
    why: `The program could not class it: it is like the average beat of class ${like} by ${percent(most)}, where ${percent(usual)} is usual.`,
    mend: most > usual - ODD_BY ? classMend(view, beat, like) : null,
  };
}

/** A beat that looks as beats do and was set aside for its intervals. */
function misfit(view: DoubtView, beat: number, like: BeatClass, most: number): Reason {
  const { rrMs } = view;
  const off = offRhythm(view, beat);
  const usualMs = rrMs[beat] / exp(off);
  const kind = off > FAR ? 'missed-beat' : off < -FAR ? 'early-beat' : 'odd-shape';
  const interval = Number.isNaN(off)
    ? 'what is spoiled or missing before it leaves its interval open'
    : `its interval is ${Math.round(rrMs[beat])} ms beside its neighbours' ${Math.round(usualMs)} ms`;
  return {
    beat,
    kind,
    strength: 0.5,
    why: `It looks like class ${like} (${percent(most)}), but ${interval}, and the program left it out.`,
    mend: classMend(view, beat, like === 'N' && kind === 'early-beat' ? 'S' : like),
  };
}

function lowReason(view: DoubtView, beat: number): Reason | null {
  const { size, noiseUv } = view.look(beat);
  const heightUv = size * view.detection.heightUv;
  const isLow = size < LOW_PART * view.usualSize(beat) && heightUv < LOW_OVER_NOISE * noiseUv;
  if (!isLow) return null;
  return {
    beat,
    kind: 'low-beat',
    strength: 0.5,
    why: `It is ${Math.round(Math.max(0, heightUv))} uV high, where ${Math.round(view.usualSize(beat) * view.detection.heightUv)} uV are usual, over a noise of ${Math.round(noiseUv)} uV.`,
    mend: view.classOf(beat) === 'Q' ? null : classMend(view, beat, 'Q'),
  };
}

function oddReason(view: DoubtView, beat: number): Reason | null {
  const most = bestLikeness(view.look(beat));
  const usual = view.usualLikeness(beat);
  if (most >= NEVER_ODD || most > usual - ODD_BY) return null;
  return {
    beat,
    kind: 'odd-shape',
    strength: 0.4,
    why: `It is like the average beat by ${percent(Math.max(0, most))}, where ${percent(usual)} is usual here.`,
    mend: classMend(view, beat, 'Q'),
  };
}
