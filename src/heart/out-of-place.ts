import { exp, log } from '../numeric/elementary';
import { BEAT_CLASSES, type BeatList } from '../recording/beat';
import type { HeartSignal } from './energy-pass';
import { type Foretelling, foretellings } from './rhythm-foretold';
import type { SampleRange } from './usable-signal';

/** Fewer intervals than this tell no spread. */
const FEWEST = 16;
/** Off by more spreads than the first an interval is out of place, if mended it is off by less than the second. */
const OUT = 3.5;
const MENDED = 3;
/** An interval this much shorter, with usual ones about it, ends in a beat that came early. */
const EARLY = 6;
/** It is believed last: the interval after a late beat looks so too. */
const EARLY_COUNTS = 0.1;
/** As many beats may be missing from one interval: longer ones than 2 s are no NN anyway. */
const MOST_MISSED = 3;
/** Beats looked at between two rests. */
const BEATS_A_STEP = 1000;

/** Spreads by which interval i is about twice or three times what is expected: beats are missing in it. 0 where it is not. */
function missing(i: number, logRr: Float64Array, { expected, spread }: Foretelling): number {
  const off = logRr[i] - expected(i, i);
  if (!(off > OUT * spread[i])) return 0;
  for (let parts = 2; parts <= MOST_MISSED; parts += 1)
    if (Math.abs(off - log(parts)) < MENDED * spread[i]) return off / spread[i];
  return 0;
}

/**
 * Spreads by which the beat between intervals i and i + 1 is one too many (the two make one of the expected length), stands
 * out of place (one is too long by what the other is too short), or came early by far though the rhythm goes on from it.
 * 0 where it does neither.
 */
function misplaced(i: number, logRr: Float64Array, { expected, spread }: Foretelling): number {
  const usual = expected(i, i + 1);
  const [before, after] = [logRr[i] - usual, logRr[i + 1] - usual];
  const sum = log(exp(before) + exp(after));
  const limit = OUT * spread[i];
  const fits = (off: number) => Math.abs(off) < MENDED * spread[i];
  const isExtra = fits(sum) && Math.min(before, after) < -limit && Math.max(before, after) < 0;
  const least = Math.min(Math.abs(before), Math.abs(after));
  const isMoved = fits(sum - log(2)) && Math.abs(before - after) > 2 * limit && least > limit / 2;
  const isEarly = before < -EARLY * spread[i] && after > -MENDED * spread[i];
  const most = Math.max(Math.abs(before), Math.abs(after));
  if (isExtra || isMoved) return most / spread[i];
  return isEarly ? (EARLY_COUNTS * most) / spread[i] : 0;
}

/** How much a beat contradicts, and whether it is by what lies before it alone. */
interface Misfit {
  readonly beat: number;
  readonly spreads: number;
  readonly missing: boolean;
}

function misfitOf(
  beat: number,
  judged: ArrayLike<number>,
  logRr: Float64Array,
  ways: readonly Foretelling[],
): Misfit {
  const gap = Math.max(
    ...ways.map((way) => (judged[beat - 1] === 1 ? missing(beat - 1, logRr, way) : 0)),
  );
  const place = Math.max(
    ...ways.map((way) => (beat < logRr.length ? misplaced(beat - 1, logRr, way) : 0)),
  );
  return { beat, spreads: Math.max(gap, place), missing: gap >= place };
}

/**
 * Flags (1) beats that contradict the rhythm about them, so that no NN interval should stand on them: a beat too many, one
 * out of place or early, one that ends an interval in which beats are missing. What contradicts is learned from the rhythm
 * itself: how far its intervals are off what those about them foretell (median absolute deviation of 41), so that respiratory
 * arrhythmia and rhythms that nothing foretells are left as they are; there is no fixed percentage. The plainest misfit is
 * taken out first and its neighbours judged without it. Only beats whose `judged` is 1 are flagged, and intervals whose
 * `broken` is 1 (something unusable lies between) tell nothing. `timesS` ascend; `broken` has one value less. Takes a rest
 * now and then.
 */
export function* beatsOutOfPlace(
  timesS: ArrayLike<number>,
  judged: ArrayLike<number>,
  broken: ArrayLike<number>,
): Generator<void, Uint8Array> {
  const flags = new Uint8Array(timesS.length);
  if (timesS.length <= FEWEST) return flags;
  const logRr = Float64Array.from({ length: timesS.length - 1 }, (_, i) =>
    broken[i] === 1 ? Number.NaN : log(timesS[i + 1] - timesS[i]),
  );
  yield;
  const ways = foretellings(logRr);
  yield;
  const misfits: Misfit[] = [];
  for (let beat = 1; beat < timesS.length; beat += 1) {
    const misfit = judged[beat] === 1 ? misfitOf(beat, judged, logRr, ways) : null;
    if (misfit && misfit.spreads > 0) misfits.push(misfit);
    if (beat % BEATS_A_STEP === 0) yield;
  }
  misfits.sort((a, b) => b.spreads - a.spreads || a.beat - b.beat);
  for (let k = 0; k < misfits.length; k += 1) {
    if (k % BEATS_A_STEP === BEATS_A_STEP - 1) yield;
    const { beat } = misfits[k];
    const now = misfitOf(beat, judged, logRr, ways);
    if (!(now.spreads > 0)) continue;
    flags[beat] = 1;
    logRr[beat - 1] = Number.NaN;
    if (!now.missing) logRr[beat] = Number.NaN;
  }
  return flags;
}

const NORMAL = BEAT_CLASSES.indexOf('N');
const UNUSABLE = BEAT_CLASSES.indexOf('Q');

/** One flag for each interval between ascending times: 1 where its ends do not lie in the same range. */
function brokenIntervals(times: Float64Array, ranges: readonly SampleRange[]): Uint8Array {
  let range = 0;
  const places = times.map((time) => {
    while (range < ranges.length - 1 && ranges[range + 1].from <= time) range += 1;
    return range;
  });
  return Uint8Array.from({ length: Math.max(0, times.length - 1) }, (_, i) =>
    places[i] === places[i + 1] ? 0 : 1,
  );
}

/** Beside a beat so much of what lies about it belongs to the beat itself. */
const BESIDE_S = 0.1;

/**
 * The beats with those of class N that contradict the rhythm about them put in class Q, as far as they are in doubt: a pause
 * in which nothing lies that might be a beat is one, and so is an early beat that is plain to see. `isDoubtful` says whether
 * a beat too many or missed is to be feared between two times (s); `usable` in samples. Takes a rest now and then.
 */
export function* withMisfitsUnusable(
  beats: BeatList,
  { usable, rateHz }: Pick<HeartSignal, 'usable' | 'rateHz'>,
  ticksPerSample: number,
  isDoubtful: (fromS: number, toS: number) => boolean,
): Generator<void, BeatList> {
  const samples = beats.ticks.map((tick) => tick / ticksPerSample);
  const timesS = samples.map((sample) => sample / rateHz);
  const judged = new Uint8Array(timesS.length);
  for (let i = 0; i < judged.length; i += 1) {
    if (i % BEATS_A_STEP === BEATS_A_STEP - 1) yield;
    const fromS = (timesS[i - 1] ?? 0) + BESIDE_S;
    const toS = (timesS[i + 1] ?? timesS[i] + 1) - BESIDE_S;
    judged[i] = beats.classes[i] === NORMAL && isDoubtful(fromS, toS) ? 1 : 0;
  }
  const flags = yield* beatsOutOfPlace(timesS, judged, brokenIntervals(samples, usable));
  const classes = beats.classes.map((one, i) =>
    flags[i] === 1 || (judged[i] === 1 && isAmidMisfits(flags, i)) ? UNUSABLE : one,
  );
  return { ...beats, classes };
}

/** Where so many of the six beats about a doubtful one contradict the rhythm, that it does not is chance. */
const MISFITS_ABOUT = 2;
const ABOUT = 3;

function isAmidMisfits(flags: Uint8Array, beat: number): boolean {
  let misfits = 0;
  for (let i = Math.max(0, beat - ABOUT); i <= beat + ABOUT; i += 1) misfits += flags[i] ?? 0;
  return misfits >= MISFITS_ABOUT;
}
