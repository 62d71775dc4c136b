import { sin } from '../numeric/elementary';
import { firstAtOrAfter } from '../numeric/first-at-or-after';
import type { Random } from '../numeric/random';
import { median, standardDeviation } from '../numeric/statistics';
import { MATCH_WITHIN_S, matchBeats } from '../recording/match-beats';
import type { Seconds } from '../units/time';

/** Planted intervals swing with breathing at this rate by this share, and vary from beat to beat by that. */
const BREATHING_HZ = 0.25;
const SWING = 0.03;
const JITTER = 0.01;
/** Fewer matched beats tell no spread of times, fewer pairs of intervals no RMSSD. */
const FEWEST_TIMES = 10;
const FEWEST_PAIRS = 10;

/** Times of planted beats over [fromS, toS): a usual interval that swings with breathing and varies from beat to beat. */
export function plantedTimes(
  fromS: Seconds,
  toS: Seconds,
  usualRrS: Seconds,
  random: Random,
): readonly Seconds[] {
  const times: Seconds[] = [];
  let atS = fromS + usualRrS * random.uniform();
  while (atS < toS) {
    times.push(atS);
    const swing = SWING * sin(2 * Math.PI * BREATHING_HZ * (atS - fromS));
    atS += usualRrS * (1 + swing + JITTER * random.gaussian());
  }
  return times;
}

/** RMSSD in ms of beats at some times. */
export function rmssdOfTimes(timesS: readonly Seconds[]): number {
  let squares = 0;
  for (let k = 2; k < timesS.length; k += 1)
    squares += (1000 * (timesS[k] - 2 * timesS[k - 1] + timesS[k - 2])) ** 2;
  return Math.sqrt(squares / (timesS.length - 2));
}

/** What became of the planted beats of one stretch. */
export interface BeatScore {
  /** Planted beats away from the study's own. */
  readonly planted: number;
  readonly sensitivityPct: number | null;
  readonly predictivityPct: number | null;
  readonly timingMs: number | null;
  readonly rmssdErrorMs: number | null;
}

const rms = (values: readonly number[]) =>
  Math.sqrt(values.reduce((sum, one) => sum + one * one, 0) / values.length);

/** RMSSD found less RMSSD planted, over pairs of intervals whose three beats were all scored and found. */
function rmssdError(plantedS: readonly Seconds[], foundAt: ReadonlyMap<number, Seconds>) {
  const [found, planted]: [number[], number[]] = [[], []];
  for (let k = 2; k < plantedS.length; k += 1) {
    const [a, b, c] = [foundAt.get(k - 2), foundAt.get(k - 1), foundAt.get(k)];
    if (a === undefined || b === undefined || c === undefined) continue;
    found.push(1000 * (c - 2 * b + a));
    planted.push(1000 * (plantedS[k] - 2 * plantedS[k - 1] + plantedS[k - 2]));
  }
  return found.length < FEWEST_PAIRS ? null : rms(found) - rms(planted);
}

/**
 * Scores of beats found in a stretch against the planted ones (all times ascending, s): matched within 150 ms, one to one,
 * nearest first (ANSI/AAMI EC57). Planted and found beats within 150 ms of one of the study's own beats are left out. Timing is
 * the standard deviation of found less planted time, so that a constant delay does not count.
 */
export function beatScore(
  plantedS: readonly Seconds[],
  foundS: readonly Seconds[],
  ownS: readonly Seconds[],
): BeatScore {
  const atOwn = (timeS: Seconds) => {
    const next = firstAtOrAfter(ownS, timeS - MATCH_WITHIN_S);
    return next < ownS.length && ownS[next] <= timeS + MATCH_WITHIN_S;
  };
  const { pairs, onlyFirst, onlySecond } = matchBeats(plantedS, foundS);
  const scored = pairs.filter(([k]) => !atOwn(plantedS[k]));
  const missed = onlyFirst.filter((k) => !atOwn(plantedS[k])).length;
  const extra = onlySecond.filter((k) => !atOwn(foundS[k])).length;
  const apartMs = scored.map(([k, f]) => 1000 * (foundS[f] - plantedS[k]));
  const share = (right: number, all: number) => (all > 0 ? (100 * right) / all : null);
  return {
    planted: scored.length + missed,
    sensitivityPct: share(scored.length, scored.length + missed),
    predictivityPct: share(scored.length, scored.length + extra),
    timingMs: apartMs.length < FEWEST_TIMES ? null : standardDeviation(apartMs),
    rmssdErrorMs: rmssdError(plantedS, new Map(scored.map(([k, f]) => [k, foundS[f]]))),
  };
}

/** The usual interval of some beats: the middle one, held to 0.3 to 2 s. */
export function usualInterval(timesS: readonly Seconds[]): Seconds {
  const intervals = timesS.slice(1).map((one, k) => one - timesS[k]);
  return Math.max(0.3, Math.min(2, median(intervals)));
}
