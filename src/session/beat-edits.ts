import {
  type Beat,
  type BeatClass,
  type BeatList,
  type BeatOrigin,
  beatAt,
  firstBeatAt,
} from '../recording/beat';
import { Refusal } from '../recording/failure';
import type { Hertz } from '../units/rate';
import { ticksToSeconds } from '../units/ticks';
import { formatClock } from '../units/time';
import type { Edit, SessionState } from './document';
import { sameValue } from './same-value';

/**
 * A beat put at a tick. `rateHz` is the heart lead's own rate, for the time in the edit's name. Throws Refusal where a beat
 * stands there already.
 */
export function addBeat(
  state: SessionState,
  tick: number,
  beatClass: BeatClass,
  origin: BeatOrigin,
  rateHz: Hertz,
): Edit {
  wantFree(state.beats, tick, rateHz);
  return {
    name: `${origin === 'placed' ? 'place' : 'add'} beat at ${clockOf(tick, rateHz)}`,
    changes: [{ kind: 'beats', removed: [], added: [{ tick, beatClass, origin }] }],
  };
}

/** Beats taken away. Throws RangeError where no beat stands at one of the ticks. */
export function deleteBeats(state: SessionState, ticks: readonly number[], rateHz: Hertz): Edit {
  const removed = beatsAt(state.beats, ticks);
  return {
    name: `delete ${beatsPhrase(removed, rateHz)}`,
    changes: removed.length > 0 ? [{ kind: 'beats', removed, added: [] }] : [],
  };
}

/**
 * A beat moved. It becomes `moved`, or `placed` where no R peak is visible; one that was placed stays so unless `origin`
 * says otherwise. Throws RangeError where no beat stands at `fromTick`, Refusal where another stands at `toTick`.
 */
export function moveBeat(
  state: SessionState,
  fromTick: number,
  toTick: number,
  rateHz: Hertz,
  origin?: 'moved' | 'placed',
): Edit {
  const removed = beatsAt(state.beats, [fromTick]);
  const name = `move beat at ${clockOf(fromTick, rateHz)}`;
  if (fromTick === toTick) return { name, changes: [] };
  wantFree(state.beats, toTick, rateHz);
  const added = removed.map((beat) => ({
    ...beat,
    tick: toTick,
    origin: origin ?? (beat.origin === 'placed' ? 'placed' : 'moved'),
  }));
  return { name, changes: [{ kind: 'beats', removed, added }] };
}

/** Beats put in a class; those in it already are left alone. Throws RangeError where no beat stands at one of the ticks. */
export function classBeats(
  state: SessionState,
  ticks: readonly number[],
  beatClass: BeatClass,
  rateHz: Hertz,
): Edit {
  const all = beatsAt(state.beats, ticks);
  const removed = all.filter((beat) => beat.beatClass !== beatClass);
  const added = removed.map((beat) => ({ ...beat, beatClass }));
  return {
    name: `class ${beatsPhrase(removed.length > 0 ? removed : all, rateHz)} as ${beatClass}`,
    changes: removed.length > 0 ? [{ kind: 'beats', removed, added }] : [],
  };
}

/** All beats replaced at once, as detection does. */
export function replaceAllBeats(state: SessionState, beats: BeatList, name: string): Edit {
  if (sameValue(state.beats, beats)) return { name, changes: [] };
  return { name, changes: [{ kind: 'all-beats', before: state.beats, after: beats }] };
}

/**
 * The beats of [fromTick, toTick) replaced by those of `found` that lie in it, as detection within a range does; beats that
 * are the same before and after are no part of the change.
 */
export function replaceBeatsWithin(
  state: SessionState,
  fromTick: number,
  toTick: number,
  found: BeatList,
  name: string,
): Edit {
  const before = within(state.beats, fromTick, toTick);
  const after = within(found, fromTick, toTick);
  const differ = (rows: readonly Beat[], others: readonly Beat[]) => {
    const byTick = new Map(others.map((beat) => [beat.tick, beat]));
    return rows.filter((beat) => !sameValue(beat, byTick.get(beat.tick)));
  };
  const removed = differ(before, after);
  const added = differ(after, before);
  const changes = removed.length + added.length > 0;
  return { name, changes: changes ? [{ kind: 'beats', removed, added }] : [] };
}

const clockOf = (tick: number, rateHz: Hertz): string =>
  formatClock(ticksToSeconds(tick, rateHz), 1);

function beatsPhrase(beats: readonly Beat[], rateHz: Hertz): string {
  const ticks = beats.map((beat) => beat.tick);
  if (ticks.length === 0) return 'no beat';
  const low = ticks.reduce((least, tick) => Math.min(least, tick));
  const high = ticks.reduce((most, tick) => Math.max(most, tick));
  if (ticks.length === 1) return `beat at ${clockOf(low, rateHz)}`;
  return `${ticks.length} beats ${clockOf(low, rateHz)}-${clockOf(high, rateHz)}`;
}

function beatsAt(beats: BeatList, ticks: readonly number[]): readonly Beat[] {
  return [...new Set(ticks)].map((tick) => {
    const index = firstBeatAt(beats, tick);
    if (beats.ticks[index] !== tick) throw new RangeError(`no beat at tick ${tick}`);
    return beatAt(beats, index);
  });
}

function within(beats: BeatList, fromTick: number, toTick: number): readonly Beat[] {
  const rows: Beat[] = [];
  for (let i = firstBeatAt(beats, fromTick); i < firstBeatAt(beats, toTick); i += 1)
    rows.push(beatAt(beats, i));
  return rows;
}

function wantFree(beats: BeatList, tick: number, rateHz: Hertz): void {
  if (beats.ticks[firstBeatAt(beats, tick)] !== tick) return;
  const at = clockOf(tick, rateHz);
  throw new Refusal({
    kind: 'wrong-input',
    message: `A beat stands at ${at} already.`,
    place: at,
    remedy: 'Choose another place, or delete that beat first.',
  });
}
