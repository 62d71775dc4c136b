import { BEAT_CLASSES, type BeatClass, firstBeatAt } from '../recording/beat';
import { addBeat, classBeats, deleteBeats, moveBeat } from '../session/edits';
import { secondsToTicks, TICKS_PER_SAMPLE, ticksToSeconds } from '../units/ticks';
import { formatClock } from '../units/time';
import type { SignalAccess } from './analysis-store';
import { type BeatChoosing, beatChoosing } from './beat-choosing';
import { beatsInView } from './beats-in-view';
import { asWork } from './idle';
import { insideStudy } from './navigate';
import { type OpenBeats, openBeats, selectedTicks } from './open-beats';
import { type PaneActs, tryEdit } from './pane-acts';
import type { PaneStores } from './row-view';

export { beatWords, openBeats, selectedTicks } from './open-beats';

/** Acts on beats. */
export interface BeatCommands extends BeatChoosing {
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
    ...beatChoosing(stores, act),
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
  { state, rateHz }: OpenBeats,
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
