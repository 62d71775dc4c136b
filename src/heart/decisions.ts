import { type Beat, type BeatList, changeBeats, firstBeatAt } from '../recording/beat';
import type { Interval } from '../recording/span';
import type { Hertz } from '../units/rate';
import { secondsToTicks, ticksToSeconds } from '../units/ticks';
import type { Seconds } from '../units/time';

/** What mending one open doubt would do to the heart's figures. */
export interface Decision {
  readonly removed: readonly Beat[];
  readonly added: readonly Beat[];
  /** The stretch that would be excluded or taken back; null where beats are mended. */
  readonly span: Interval | null;
}

/** Beats with the decisions that are open about them. */
export interface Undecided {
  readonly beats: BeatList;
  /** Rate that the beats' ticks count in. */
  readonly rateHz: Hertz;
  readonly decisions: readonly Decision[];
  /** Stretches that carry no heartbeat, once just these decisions have been taken by mending. */
  readonly blockedWhen: (mended: readonly number[]) => readonly Interval[];
}

/** Beats after a decision that its figures can still feel: a pair of intervals has three beats. */
const FELT_BEATS = 3;

const touched = ({ removed, added }: Decision) => [...removed, ...added].map(({ tick }) => tick);

/**
 * From when to when what ends at a time can depend on each decision: from what it touches to the third beat after it that no
 * decision can take away; Infinity where so many do not follow.
 */
export function reaches({ beats, rateHz, decisions }: Undecided): readonly Interval[] {
  const doubted = new Set(decisions.flatMap(({ removed }) => removed.map(({ tick }) => tick)));
  return decisions.map((decision) => {
    const ticks = touched(decision);
    const times = ticks.map((tick) => ticksToSeconds(tick, rateHz));
    const { span } = decision;
    const fromS = span ? span.fromS : Math.min(...times);
    const lastS = span ? span.toS : Math.max(...times);
    let at = firstBeatAt(beats, secondsToTicks(lastS, rateHz) + 1);
    for (let fixed = 0; at < beats.ticks.length; at += 1) {
      if (doubted.has(beats.ticks[at])) continue;
      fixed += 1;
      if (fixed === FELT_BEATS) break;
    }
    const toS = at < beats.ticks.length ? ticksToSeconds(beats.ticks[at], rateHz) : Infinity;
    return { fromS, toS };
  });
}

/** Beats and blocked stretches about a stretch of time, once just these decisions have been taken by mending. */
export function decidedAbout(
  { beats, rateHz, decisions, blockedWhen }: Undecided,
  { fromS, toS }: Interval,
  about: readonly number[],
  mended: readonly number[],
): { readonly beats: BeatList; readonly blocked: readonly Interval[] } {
  const ticks = about.flatMap((k) => touched(decisions[k]));
  const beside = FELT_BEATS + 1 + ticks.length;
  const low = Math.min(ticksAt(fromS, rateHz), ...ticks);
  const high = Math.max(ticksAt(toS, rateHz), ...ticks);
  const first = Math.max(0, firstBeatAt(beats, low) - beside);
  const end = Math.min(beats.ticks.length, firstBeatAt(beats, high) + beside);
  const near = {
    ticks: beats.ticks.subarray(first, end),
    classes: beats.classes.subarray(first, end),
    origins: beats.origins.subarray(first, end),
  };
  const taken = withoutClashes(mended.map((k) => decisions[k]));
  const changed = changeBeats(
    near,
    taken.flatMap(({ removed }) => removed),
    taken.flatMap(({ added }) => added).sort((a, b) => a.tick - b.tick),
  );
  return { beats: changed, blocked: blockedWhen(mended.filter((k) => decisions[k].span)) };
}

/** Of two decisions that touch the same beat the first alone is taken. */
function withoutClashes(decisions: readonly Decision[]): readonly Decision[] {
  const seen = new Set<number>();
  return decisions.filter((decision) => {
    const ticks = touched(decision);
    if (ticks.some((tick) => seen.has(tick))) return false;
    for (const tick of ticks) seen.add(tick);
    return true;
  });
}

const ticksAt = (s: Seconds, rateHz: Hertz): number =>
  s === Infinity ? Number.MAX_SAFE_INTEGER : secondsToTicks(s, rateHz);

/** The decisions among these that a mask takes by mending. */
export const mendedBy = (mask: number, about: readonly number[]): readonly number[] =>
  about.filter((_, bit) => mask & (1 << bit));
