import { exp } from '../numeric/elementary';
import { firstAtOrAfter } from '../numeric/first-at-or-after';
import { medianInPlace } from '../numeric/statistics';
import { type Interval, isWithin } from '../recording/span';
import { intervalFit, type RhythmAt } from './rhythm-path';

/** A place as it was weighed. */
export interface Judged {
  readonly sample: number;
  /** Log-odds of a beat without what the rhythm says. */
  readonly score: number;
  /** QRS energy there. */
  readonly energyUv: number;
  /** How much it is like a P wave and like a T wave of the usual beats, 0 to 1. */
  readonly likeP: number;
  readonly likeT: number;
}

/** What was decided of places, with the chance that it is wrong. */
export interface Decided {
  /** Of the places, in s, ascending. */
  readonly timesS: Float64Array;
  readonly wrong: Float64Array;
}

/** A place nearer to a beat than this is that beat: the window of ANSI/AAMI EC57. */
const SAME_BEAT_S = 0.15;
/** A beat may be hidden in what has this part of a usual beat's energy, whatever its shape. This and the next are choices. */
const LOUD_PART = 0.5;
/** Where no P or T wave of the beats about it is due, this part is enough: what is left of a beat that a lead hardly sees. */
const LONE_PART = 0.12;
/**
 * What is this much like a P wave of the usual beats, and of its size, is one wherever it lies: a blocked one hides no beat.
 * What is like their T wave is one where a T wave is due. In a doubted stretch neither is believed: noise is like anything now
 * and then.
 */
const IS_P_WAVE = 0.8;
const IS_T_WAVE = 0.9;
const P_WAVE_S = 0.26;
const T_WAVE_S = 0.45;
/** Places decided between two rests. */
const PLACES_A_STEP = 1000;
/** Log-odds beyond this are certain. */
const CERTAIN = 30;

const chance = (logOdds: number) => 1 / (1 + exp(-Math.min(CERTAIN, Math.max(-CERTAIN, logOdds))));

/**
 * The chance of each place of being decided wrongly, given the other beats: its odds are its own and what it changes in how
 * the intervals about it fit the rhythm; 0 for places that are part of a beat beside them. `beats` are those taken of
 * `places`, both ascending. Takes a rest now and then.
 */
export function* decidedPlaces(
  beats: readonly Judged[],
  places: readonly Judged[],
  rateHz: number,
  rhythmAt: (timeS: number) => RhythmAt,
): Generator<void, Decided> {
  const beatS = Float64Array.from(beats, ({ sample }) => sample / rateHz);
  const timesS = Float64Array.from(places, ({ sample }) => sample / rateHz);
  const isWrong = (timeS: number, j: number) => {
    const i = firstAtOrAfter(beatS, timeS - SAME_BEAT_S);
    const isNear = i < beatS.length && beatS[i] <= timeS + SAME_BEAT_S;
    const isBeat = isNear && beatS[i] === timeS;
    if (isNear && !isBeat) return 0;
    const rhythm = rhythmAt(timeS);
    const before = i > 0 ? beatS[i - 1] : timeS - rhythm.rrS;
    const after = beatS[isBeat ? i + 1 : i] ?? timeS + rhythm.rrS;
    const odds =
      places[j].score +
      intervalFit(timeS - before, rhythm) +
      intervalFit(after - timeS, rhythm) -
      intervalFit(after - before, rhythm);
    return chance(isBeat ? -odds : odds);
  };
  const wrong = new Float64Array(timesS.length);
  for (let j = 0; j < wrong.length; j += 1) {
    wrong[j] = isWrong(timesS[j], j);
    if (j % PLACES_A_STEP === PLACES_A_STEP - 1) yield;
  }
  return { timesS, wrong };
}

/** Sum of the chances within [fromS, toS): how many beats too many and missed are to be expected there. */
export function expectedWrong({ timesS, wrong }: Decided, fromS: number, toS: number): number {
  let sum = 0;
  const end = firstAtOrAfter(timesS, toS);
  for (let j = firstAtOrAfter(timesS, fromS); j < end; j += 1) sum += wrong[j];
  return sum;
}

/**
 * Whether anything lies within [fromS, toS) that was not taken for a beat, though a beat could be hidden in it; `doubted` are
 * stretches (s) that may be noise.
 */
export function loudPlaces(
  beats: readonly Judged[],
  places: readonly Judged[],
  { timesS }: Decided,
  rateHz: number,
  doubted: readonly Interval[],
): (fromS: number, toS: number) => boolean {
  const usualUv = medianInPlace(Float64Array.from(beats, ({ energyUv }) => energyUv));
  const beatS = Float64Array.from(beats, ({ sample }) => sample / rateHz);
  const leastUv = (timeS: number, { likeP, likeT }: Judged) => {
    const next = firstAtOrAfter(beatS, timeS);
    const [before, after] = [timeS - beatS[next - 1], beatS[next] - timeS];
    if (before <= SAME_BEAT_S || after <= SAME_BEAT_S) return Number.POSITIVE_INFINITY;
    const isClear = !isWithin(timeS, doubted);
    if (isClear && before < T_WAVE_S && likeT > IS_T_WAVE) return Number.POSITIVE_INFINITY;
    const isDue = before < T_WAVE_S || after < P_WAVE_S;
    return (isDue || (isClear && likeP > IS_P_WAVE) ? LOUD_PART : LONE_PART) * usualUv;
  };
  const loudS = timesS.filter((timeS, j) => places[j].energyUv > leastUv(timeS, places[j]));
  return (fromS, toS) => loudS[firstAtOrAfter(loudS, fromS)] < toS;
}
