import { log } from '../numeric/elementary';

/** No two heartbeats are nearer than this (physiological refractory period; common practice, no source). */
const REFRACTORY_S = 0.2;
/** Below this an interval is doubtful in itself. */
const DOUBTFUL_S = 0.3;
/** What the rhythm weighs beside each beat's own evidence: more, and it would make beats and lose irregular ones. */
const WEIGHT = 0.6;
/** What a beat costs for being earlier still than three quarters of the usual interval, for each whole interval. */
const EARLINESS = 3;
/** An early beat that follows an early one at the same interval is a run: it costs this part of what the first did. */
const RUN_PART = 0.5;
const RUN_SPREAD = 0.15;
/** Earlier than this part of the usual interval, a beat is followed by a pause. */
const EARLY = 0.87;
/** What a break of the rhythm costs at most, the start of the study included. */
const BREAK_COST = 5;

/** What is known of the rhythm near a time: the usual RR interval, and the spread of the logarithm of RR about it. */
export interface RhythmAt {
  readonly rrS: number;
  readonly spread: number;
  /** What a usual interval is worth: more in a regular rhythm. */
  readonly sure: number;
  /** What an interval beyond that spread is worth: the logarithm of the share of such intervals. */
  readonly rare: number;
}

/** Rhythm from its usual interval, the spread about it, and the share of intervals beyond that spread. */
export function rhythmOf(rrS: number, spread: number, unusual: number): RhythmAt {
  return { rrS, spread, sure: 1.5 + 0.8 * log(0.06 / spread), rare: log(unusual) };
}

/** Logarithm of a ratio of like values, within 4 % from a half to the double: a logarithm is slow. */
export const logRatio = (a: number, b: number) => (2 * (a - b)) / (a + b);

/**
 * How well an interval fits the rhythm: about 1 for the usual one, down to -8; a log-probability up to a constant.
 * Near the usual interval it falls as a normal density of log RR; beyond, early beats and pauses stay possible at a price,
 * but a pause that makes up for an early beat (`beforeS` is the interval before) is as usual as any,
 * and early beats come in runs.
 */
export function intervalFit(rrS: number, rhythm: RhythmAt, beforeS = rhythm.rrS): number {
  const { rrS: usualS, spread, sure, rare } = rhythm;
  const ratio = rrS / usualS;
  const off = Math.abs(logRatio(rrS, usualS));
  const early = beforeS < EARLY * usualS;
  const made = early ? Math.abs(logRatio(rrS + beforeS, 2 * usualS)) : off;
  const usual = sure - 0.5 * (Math.min(off, made) / spread) ** 2;
  const side =
    ratio < 1
      ? rare - EARLINESS * Math.max(0, 0.75 - ratio)
      : rare - 1.8 * Math.min(1, Math.max(0, ratio - 1.3) * 2) - 0.5 * Math.max(0, ratio - 2);
  const again = RUN_PART * rare - 0.5 * (logRatio(rrS, beforeS) / RUN_SPREAD) ** 2;
  const fit = WEIGHT * Math.max(usual, side, early ? again : side, -BREAK_COST - 3);
  return rrS < DOUBTFUL_S ? fit - 40 * (DOUBTFUL_S - rrS) : fit;
}

/** Candidates between two rests. */
const A_STEP = 500;

/**
 * The beats among candidates: the sequence with the greatest sum of each beat's own evidence and of how each interval
 * fits the rhythm, found by dynamic programming (Bellman 1957). Times in s, ascending; scores positive for and negative
 * against a beat. Returns indexes into the candidates, ascending. Linear in their number; takes a rest now and then.
 */
export function* bestPath(
  timesS: ArrayLike<number>,
  scores: ArrayLike<number>,
  rhythmAt: (timeS: number) => RhythmAt,
): Generator<void, number[]> {
  const count = timesS.length;
  const total = new Float64Array(count);
  const previous = new Int32Array(count).fill(-1);
  let oldBest = 0;
  let oldIndex = -1;
  let old = 0;
  for (let j = 0; j < count; j += 1) {
    const rhythm = rhythmAt(timesS[j]);
    const horizon = timesS[j] - 3 * rhythm.rrS;
    for (; old < j && timesS[old] < horizon; old += 1) {
      if (total[old] <= oldBest) continue;
      oldBest = total[old];
      oldIndex = old;
    }
    let best = oldBest - BREAK_COST;
    let from = oldIndex;
    for (let i = j - 1; i >= old; i -= 1) {
      const rrS = timesS[j] - timesS[i];
      if (rrS < REFRACTORY_S) continue;
      const before = previous[i];
      const beforeS = before < 0 ? rhythm.rrS : timesS[i] - timesS[before];
      const sum = total[i] + intervalFit(rrS, rhythm, beforeS);
      if (sum > best) {
        best = sum;
        from = i;
      }
    }
    total[j] = best + scores[j];
    previous[j] = from;
    if (j % A_STEP === A_STEP - 1) yield;
  }
  let end = -1;
  for (let j = 0; j < count; j += 1) if (total[j] > (end < 0 ? 0 : total[end])) end = j;
  const path: number[] = [];
  for (let j = end; j >= 0; j = previous[j]) path.push(j);
  return path.reverse();
}
