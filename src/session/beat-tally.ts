import { BEAT_CLASSES, type Beat, type BeatList, type BeatOrigin, beatAt } from '../recording/beat';
import type { Hertz } from '../units/rate';
import { ticksToSeconds } from '../units/ticks';
import type { Edit, Session } from './document';

/** A moved beat is taken for the nearest of the program's own that is gone within this time of it. */
const MOVED_WITHIN_S = 1;

/** What became of the beats that the program found, by comparing them with those that stand. */
export interface BeatTally {
  /** Beats the program found when it looked for all of them last. */
  readonly found: number;
  /** Of these: gone, moved, and given another class. */
  readonly removed: number;
  readonly moved: number;
  readonly classed: readonly ClassChange[];
  /** Beats put in: at a visible R peak, where none is visible, and by the program when it looked again within a range. */
  readonly added: number;
  readonly placed: number;
  readonly foundAgain: number;
}

/** How many beats of one class were given another. */
export interface ClassChange {
  readonly from: string;
  readonly to: string;
  readonly count: number;
}

/** The edits of a log that stand: what was taken back and not made again is left out. */
export function standingEdits({ log }: Pick<Session, 'log'>): readonly Edit[] {
  const taken = new Set<number>();
  for (const { act } of log) {
    if (act.kind === 'undo') taken.add(act.of);
    if (act.kind === 'redo') taken.delete(act.of);
  }
  return log.flatMap(({ n, act }) => (act.kind === 'edit' && !taken.has(n) ? [act.edit] : []));
}

/** The beats as the program found all of them last, before any person changed one. */
export function programsBeats(session: Session): BeatList {
  const all = standingEdits(session)
    .flatMap(({ changes }) => changes)
    .findLast(({ kind }) => kind === 'all-beats');
  return all?.kind === 'all-beats' ? all.after : session.start.beats;
}

const rowsOf = (beats: BeatList): readonly Beat[] =>
  Array.from(beats.ticks, (_, i) => beatAt(beats, i));

/**
 * What became of the program's own beats, from the two lists alone, so that what was taken back does not count. A beat at the
 * same tick is the same beat; a moved one is the nearest that is gone, one to one, within a second.
 */
export function beatTally(own: BeatList, now: BeatList, rateHz: Hertz): BeatTally {
  const stands = new Map(rowsOf(now).map((beat) => [beat.tick, beat]));
  const found = rowsOf(own);
  const fresh = new Set(stands.keys());
  const gone: Beat[] = [];
  const classes = new Map<string, number>();
  const classed = (from: Beat, to: Beat) => {
    const key = `${from.beatClass} ${to.beatClass}`;
    if (from.beatClass !== to.beatClass) classes.set(key, (classes.get(key) ?? 0) + 1);
  };
  for (const beat of found) {
    const same = stands.get(beat.tick);
    if (!same) gone.push(beat);
    else {
      fresh.delete(beat.tick);
      classed(beat, same);
    }
  }
  const put = [...fresh].flatMap((tick) => stands.get(tick) ?? []);
  const byOrigin = (origin: BeatOrigin) => put.filter((beat) => beat.origin === origin);
  const moves = nearestPairs(gone, byOrigin('moved'), rateHz);
  for (const [from, to] of moves) classed(from, to);
  return {
    found: found.length,
    removed: gone.length - moves.length,
    moved: byOrigin('moved').length,
    classed: classChanges(classes),
    added: byOrigin('added').length,
    placed: byOrigin('placed').length,
    foundAgain: byOrigin('detected').length + byOrigin('imported').length,
  };
}

/** Pairs of gone and moved beats, nearest first, one to one. */
function nearestPairs(
  gone: readonly Beat[],
  moved: readonly Beat[],
  rateHz: Hertz,
): readonly (readonly [Beat, Beat])[] {
  const near = moved
    .flatMap((to) => gone.map((from) => ({ from, to, apart: Math.abs(to.tick - from.tick) })))
    .filter(({ apart }) => ticksToSeconds(apart, rateHz) <= MOVED_WITHIN_S)
    .sort((a, b) => a.apart - b.apart || a.to.tick - b.to.tick);
  const taken = new Set<Beat>();
  return near.flatMap(({ from, to }): readonly (readonly [Beat, Beat])[] => {
    if (taken.has(from) || taken.has(to)) return [];
    taken.add(from).add(to);
    return [[from, to]];
  });
}

/** In the order of the classes. */
const classChanges = (counts: ReadonlyMap<string, number>): readonly ClassChange[] =>
  BEAT_CLASSES.flatMap((from) =>
    BEAT_CLASSES.flatMap((to) => {
      const count = counts.get(`${from} ${to}`);
      return count ? [{ from, to, count }] : [];
    }),
  );
