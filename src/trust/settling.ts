import { exp, log } from '../numeric/elementary';
import type { Seconds } from '../units/time';

/** Time constants tried, each half as long again as the one before. */
const SHORTEST_S: Seconds = 1;
const LONGEST_S: Seconds = 90;
const RATIO = 1.5;
/** The course that the shorter constants are told by, and that of the longer ones, which do not end in it. */
const SHORT_COURSE_S: Seconds = 60;
const LONG_COURSE_S: Seconds = 240;
const LONG_FROM_S: Seconds = 25;
/** A fall explains at least this part of the spread, or there is none; a slow wave may well be most of it. */
const LEAST_EXPLAINED = 0.15;
/** The same for a long fall, which drift could be. */
const LONG_EXPLAINED = 0.5;

interface Fall {
  readonly heightUv: number;
  readonly explained: number;
}

/** Height of an exponential fall to a level that fits a course best (least squares), and the part of the spread it explains. */
function fallOver(track: Float64Array, from: number, to: number, constant: number): Fall {
  let [count, sumE, sumX, sumEE, sumEX, sumXX] = [0, 0, 0, 0, 0, 0];
  const decay = exp(-1 / constant);
  let fall = 1;
  for (let i = from; i < to; i += 1, fall *= decay) {
    const value = track[i];
    if (Number.isNaN(value)) continue;
    count += 1;
    sumE += fall;
    sumX += value;
    sumEE += fall * fall;
    sumEX += fall * value;
    sumXX += value * value;
  }
  const spreadE = sumEE - (sumE * sumE) / count;
  const shared = sumEX - (sumE * sumX) / count;
  const spreadX = sumXX - (sumX * sumX) / count;
  const heightUv = spreadE > 0 ? shared / spreadE : 0;
  return { heightUv, explained: spreadX > 0 ? (heightUv * shared) / spreadX : 0 };
}

/** A fall slower than this is drift to a filter whose band begins at 0.8 cpm: 1 / (2 pi 0.8 / 60 Hz). */
const DRIFT_S: Seconds = 12;

interface Settling {
  readonly constantS: Seconds;
  readonly heightUv: number;
}

/** The fall that explains a course best; null where none explains the least that is asked. */
function bestFall(
  track: Float64Array,
  from: number,
  columnS: Seconds,
  courseS: Seconds,
  leastExplained: number,
): Settling | null {
  const to = Math.min(track.length, from + Math.round(courseS / columnS));
  let best: Settling | null = null;
  let most = leastExplained;
  for (let constantS = SHORTEST_S; to - from > 4 && constantS <= LONGEST_S; constantS *= RATIO) {
    const { heightUv, explained } = fallOver(track, from, to, constantS / columnS);
    if (explained <= most) continue;
    best = { constantS, heightUv };
    most = explained;
  }
  return best;
}

/**
 * Seconds after which what is left of a step that falls back exponentially (an electrode that settles, an amplifier that
 * recovers) is felt in the band of the slow wave by less than `leftUv`: by the time constant, 1 to 90 s, whose fall explains the next minute best, or the next four
 * where it is long. 0 where no fall explains enough of it: the lead has jumped and stays.
 */
export function settlingTimeS(
  track: Float64Array,
  from: number,
  columnS: Seconds,
  leftUv: number,
): Seconds {
  const short = bestFall(track, from, columnS, SHORT_COURSE_S, LEAST_EXPLAINED);
  const isLong = short !== null && short.constantS > LONG_FROM_S;
  const fall = isLong ? bestFall(track, from, columnS, LONG_COURSE_S, LONG_EXPLAINED) : short;
  if (fall === null) return 0;
  const felt = Math.abs(fall.heightUv) / (1 + (fall.constantS / DRIFT_S) ** 2);
  const times = felt / Math.max(leftUv, 1e-9);
  return times > 1 ? fall.constantS * log(times) : 0;
}
