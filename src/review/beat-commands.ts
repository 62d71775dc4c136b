import { BEAT_CLASSES, type BeatClass, beatAt, firstBeatAt } from '../recording/beat';
import type { SessionState } from '../session/document';
import { addBeat, classBeats, deleteBeats, moveBeat } from '../session/edits';
import { secondsToTicks, TICKS_PER_SAMPLE, ticksToSeconds } from '../units/ticks';
import { formatClock } from '../units/time';
import type { SignalAccess } from './analysis-store';
import { beatsAtTicks, beatsInView, heartRateHz, rrMsAt } from './beats-in-view';
import { asWork } from './idle';
import { insideStudy } from './navigate';
import { type PaneActs, tryEdit } from './pane-acts';
import type { PaneStores } from './row-view';
import { lookAtSeconds } from './view-store';

/** Acts on beats. */
export interface BeatCommands {
  /** Selects the beat after or before the selected one (or the middle of Seconds) and brings it in sight. */
  selectNextBeat(): void;
  selectPreviousBeat(): void;
  /** Selects one beat; with `extend` all from the one selected before up to it. */
  selectBeat(tick: number, extend: boolean): void;
  /** Selects every beat inside the Seconds window. */
  selectBeatsInView(): void;
  clearSelection(): void;
  /** Adds a beat where the R peak near a time stands; where none is visible, at the time itself, as placed. */
  addBeatNear(atS: number): void;
  addBeatAtCursor(): void;
  deleteSelectedBeats(): void;
  classSelected(beatClass: BeatClass): void;
  /** Moves the one selected beat by a time in ms. */
  moveSelected(byMs: number): void;
  /** Moves the one selected beat by whole samples of its lead. */
  moveSelectedBySamples(samples: number): void;
  moveBeatTo(fromTick: number, atS: number): void;
}

interface Open {
  readonly state: SessionState;
  readonly rateHz: number;
}

/** The open session with the clock of its beats; null without a study or a heart lead. */
export function openBeats({ session, analysis }: PaneStores): Open | null {
  const state = session.getState().session?.state;
  const { recording } = analysis.getState();
  const rateHz = state && recording ? heartRateHz(state.roles, recording) : null;
  return state && rateHz ? { state, rateHz } : null;
}

/** Ticks of the selected beats that are still there, ascending. */
export function selectedTicks(stores: PaneStores): readonly number[] {
  const { selection } = stores.view.getState();
  const open = openBeats(stores);
  if (selection.kind !== 'beats' || !open) return [];
  return beatsAtTicks(open.state.beats, selection.ticks).map((beat) => beat.tick);
}

/** A beat in words: class, time, the interval that ends at it. */
export function beatWords({ state, rateHz }: Open, index: number): string {
  const { tick, beatClass, origin } = beatAt(state.beats, index);
  const rrMs = rrMsAt(state.beats, index, rateHz);
  const interval = !Number.isNaN(rrMs) ? `, interval ${Math.round(rrMs)} ms` : '';
  const placed = origin === 'placed' ? ', placed' : '';
  return `beat ${beatClass} at ${formatClock(ticksToSeconds(tick, rateHz), 3)}${interval}${placed}`;
}

/** Makes the acts on beats. */
export function beatCommands(
  stores: PaneStores,
  signals: SignalAccess,
  act: PaneActs,
): BeatCommands {
  const { view } = stores;
  const select = (ticks: readonly number[]) =>
    view.setState({ selection: { kind: 'beats', ticks } });
  return {
    ...choosing(stores, act, select),
    ...placing(stores, signals, act, select),
    ...moving(stores, signals, act, select),
    deleteSelectedBeats: () => {
      const ticks = selectedTicks(stores);
      const open = openBeats(stores);
      if (ticks.length === 0 || !open) return;
      const { beats } = open.state;
      const after = firstBeatAt(beats, ticks[ticks.length - 1] + 1);
      tryEdit(stores, act, ({ state }) => deleteBeats(state, ticks, open.rateHz));
      const { seconds } = view.getState();
      const [, end] = beatsInView(beats, seconds, open.rateHz);
      if (after < end) select([beats.ticks[after]]);
      else view.setState({ selection: { kind: 'none' } });
    },
    classSelected: (beatClass) => {
      const ticks = selectedTicks(stores);
      const open = openBeats(stores);
      if (!open || ticks.length === 0 || !BEAT_CLASSES.includes(beatClass)) return;
      tryEdit(stores, act, ({ state }) => classBeats(state, ticks, beatClass, open.rateHz));
    },
  };
}

type Choosing =
  | 'selectNextBeat'
  | 'selectPreviousBeat'
  | 'selectBeat'
  | 'selectBeatsInView'
  | 'clearSelection';

function choosing(
  stores: PaneStores,
  act: PaneActs,
  select: (ticks: readonly number[]) => void,
): Pick<BeatCommands, Choosing> {
  const { view } = stores;
  return {
    selectNextBeat: () => stepBeat(stores, act, select, 1),
    selectPreviousBeat: () => stepBeat(stores, act, select, -1),
    selectBeat: (tick, extend) => {
      const chosen = selectedTicks(stores);
      const open = openBeats(stores);
      if (!extend || chosen.length === 0 || !open) {
        select([tick]);
        return;
      }
      const from = firstBeatAt(open.state.beats, Math.min(chosen[0], tick));
      const last = Math.max(chosen[chosen.length - 1], tick);
      select(
        Array.from(open.state.beats.ticks.subarray(from, firstBeatAt(open.state.beats, last + 1))),
      );
    },
    selectBeatsInView: () => {
      const open = openBeats(stores);
      if (!open) return;
      const [from, to] = beatsInView(open.state.beats, view.getState().seconds, open.rateHz);
      select(Array.from(open.state.beats.ticks.subarray(from, to)));
      act.say(`${to - from} beats selected`);
    },
    clearSelection: () => view.setState({ selection: { kind: 'none' } }),
  };
}

/** Selects the beat one on from what is selected, brings it in sight and says it. */
function stepBeat(
  stores: PaneStores,
  act: PaneActs,
  select: (ticks: readonly number[]) => void,
  way: 1 | -1,
): void {
  const open = openBeats(stores);
  if (!open) return;
  const { beats } = open.state;
  const { seconds } = stores.view.getState();
  const chosen = selectedTicks(stores);
  const middle = secondsToTicks((seconds.fromS + seconds.toS) / 2, open.rateHz);
  const edge = way > 0 ? chosen[chosen.length - 1] : chosen[0];
  const next =
    way > 0
      ? firstBeatAt(beats, edge === undefined ? middle : edge + 1)
      : firstBeatAt(beats, edge ?? middle) - 1;
  if (next < 0 || next >= beats.ticks.length) {
    act.say(way > 0 ? 'No beat after this' : 'No beat before this');
    return;
  }
  select([beats.ticks[next]]);
  bringInSight(stores, ticksToSeconds(beats.ticks[next], open.rateHz));
  act.say(beatWords(open, next));
}

function placing(
  stores: PaneStores,
  signals: SignalAccess,
  act: PaneActs,
  select: (ticks: readonly number[]) => void,
): Pick<BeatCommands, 'addBeatNear' | 'addBeatAtCursor'> {
  const { view } = stores;
  const add = async (nearS: number) => {
    const rateHz = openBeats(stores)?.rateHz;
    if (!rateHz) return;
    const found = await signals.placeBeat(insideStudy(view.getState(), nearS));
    if (!found) {
      act.reportError('No beat could be added: the recording was not read here. Try again.');
      return;
    }
    const there = beatWithin(stores, found.tick, CROWDED_S);
    if (there !== null) {
      select([there]);
      const place = formatClock(ticksToSeconds(there, rateHz), 3);
      act.reportError(`A beat stands at ${place} already. Move or delete it instead.`);
      return;
    }
    const origin = found.visible ? 'added' : 'placed';
    const made = tryEdit(stores, act, ({ state }) =>
      addBeat(state, found.tick, 'N', origin, rateHz),
    );
    if (!made) return;
    select([found.tick]);
    if (!found.visible)
      act.say('No R peak is visible here: the beat is placed, its intervals are not NN');
  };
  const addBeatNear = (atS: number) => void asWork(add(atS));
  return {
    addBeatNear,
    addBeatAtCursor: () => {
      const { cursorS, seconds } = view.getState();
      const inView = cursorS !== null && cursorS >= seconds.fromS && cursorS <= seconds.toS;
      addBeatNear(inView ? cursorS : (seconds.fromS + seconds.toS) / 2);
    },
  };
}

function moving(
  stores: PaneStores,
  signals: SignalAccess,
  act: PaneActs,
  select: (ticks: readonly number[]) => void,
): Pick<BeatCommands, 'moveSelected' | 'moveSelectedBySamples' | 'moveBeatTo'> {
  const moved = async (fromTick: number, wanted: number) => {
    const open = openBeats(stores);
    if (!open) return;
    const { rateHz } = open;
    const toTick = betweenNeighbours(stores, open, fromTick, wanted);
    const found = await signals.placeBeat(ticksToSeconds(toTick, rateHz));
    const onPeak =
      found?.visible === true && Math.abs(found.tick - toTick) <= secondsToTicks(ON_PEAK_S, rateHz);
    const origin = onPeak ? 'moved' : 'placed';
    const made = tryEdit(stores, act, ({ state }) =>
      moveBeat(state, fromTick, toTick, rateHz, origin),
    );
    if (!made) return;
    select([toTick]);
    if (!onPeak) act.say('No R peak is visible here: the beat is placed, its intervals are not NN');
  };
  const move = (fromTick: number, wanted: number) => void asWork(moved(fromTick, wanted));
  const moveBy = (ticksOf: (rateHz: number) => number) => {
    const open = openBeats(stores);
    const ticks = selectedTicks(stores);
    if (!open || ticks.length === 0) return;
    if (ticks.length > 1) act.say('Only one beat can be moved at a time');
    else move(ticks[0], ticks[0] + ticksOf(open.rateHz));
  };
  return {
    moveSelected: (byMs) => moveBy((rateHz) => secondsToTicks(byMs / 1000, rateHz)),
    moveSelectedBySamples: (samples) => moveBy(() => samples * TICKS_PER_SAMPLE),
    moveBeatTo: (fromTick, atS) => {
      const open = openBeats(stores);
      if (open) move(fromTick, secondsToTicks(atS, open.rateHz));
    },
  };
}

/** Two beats cannot stand this close. */
const CROWDED_S = 0.1;
/** A beat moved farther than this from the R peak near it stands on no R peak. */
const ON_PEAK_S = 0.06;

/** A place for a moved beat that passes none of its neighbours and stays in the study. */
function betweenNeighbours(
  { view }: PaneStores,
  { state, rateHz }: Open,
  fromTick: number,
  wanted: number,
): number {
  const { ticks } = state.beats;
  const index = firstBeatAt(state.beats, fromTick);
  const apart = secondsToTicks(CROWDED_S, rateHz);
  const low = index > 0 ? ticks[index - 1] + apart : 0;
  const end = secondsToTicks(view.getState().durationS, rateHz);
  const high = index + 1 < ticks.length ? ticks[index + 1] - apart : end;
  return Math.min(Math.max(Math.min(low, fromTick), wanted), Math.max(high, fromTick));
}

/** Tick of the beat nearest to one, where it is closer than a time; else null. */
function beatWithin(stores: PaneStores, tick: number, withinS: number): number | null {
  const open = openBeats(stores);
  if (!open) return null;
  const { ticks } = open.state.beats;
  const next = firstBeatAt(open.state.beats, tick);
  const near = [ticks[next - 1], ticks[next]]
    .filter((one) => Math.abs(one - tick) < secondsToTicks(withinS, open.rateHz))
    .sort((a, b) => Math.abs(a - tick) - Math.abs(b - tick));
  return near[0] ?? null;
}

/** Pans Seconds so that a time is clear of its ends. */
function bringInSight({ view }: PaneStores, atS: number): void {
  const { fromS, toS } = view.getState().seconds;
  const margin = (toS - fromS) / 10;
  if (atS < fromS + margin || atS > toS - margin) lookAtSeconds(view, atS);
}
