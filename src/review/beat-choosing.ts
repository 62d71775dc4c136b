import { type BeatList, firstBeatAt } from '../recording/beat';
import { secondsToTicks, ticksToSeconds } from '../units/ticks';
import { beatsInView } from './beats-in-view';
import {
  beatsWords,
  beatWords,
  bringInSight,
  type OpenBeats,
  openBeats,
  selectedTicks,
} from './open-beats';
import type { PaneActs } from './pane-acts';
import type { PaneStores } from './row-view';
import type { TimeWindow } from './view-store';

/** Acts that pick out beats, one or many. */
export interface BeatChoosing {
  /** Selects the beat after or before the selected one (or the middle of Seconds) and brings it in sight. */
  selectNextBeat(): void;
  selectPreviousBeat(): void;
  /** Grows or shrinks the selection by one beat at its loose end; the end it began with stays. */
  extendToNextBeat(): void;
  extendToPreviousBeat(): void;
  /** Selects one beat; with `extend` all from the one selected before up to it. */
  selectBeat(tick: number, extend: boolean): void;
  /** Selects every beat inside the Seconds window. */
  selectBeatsInView(): void;
  /** Selects every beat of a stretch, both ends included, and says how many there are. */
  selectBeatsWithin(window: TimeWindow): void;
  clearSelection(): void;
}

/** Ticks of the beats in a stretch, both ends included. */
export function ticksWithin({ state, rateHz }: OpenBeats, window: TimeWindow): readonly number[] {
  const [from, to] = beatsInView(state.beats, window, rateHz);
  return Array.from(state.beats.ticks.subarray(from, to));
}

/** Makes the acts that pick out beats. */
export function beatChoosing(stores: PaneStores, act: PaneActs): BeatChoosing {
  const { view } = stores;
  const select = (ticks: readonly number[], anchor?: number) =>
    view.setState({
      selection: { kind: 'beats', ticks, ...(anchor === undefined ? {} : { anchor }) },
    });
  const selectBeatsWithin = (window: TimeWindow) => {
    const open = openBeats(stores);
    if (!open) return;
    const ticks = ticksWithin(open, window);
    select(ticks);
    act.say(`${beatsWords(ticks, open.rateHz)} selected`);
  };
  return {
    selectNextBeat: () => stepBeat(stores, act, select, 1),
    selectPreviousBeat: () => stepBeat(stores, act, select, -1),
    extendToNextBeat: () => extend(stores, act, select, 1),
    extendToPreviousBeat: () => extend(stores, act, select, -1),
    selectBeat: (tick, extending) => {
      const chosen = selectedTicks(stores);
      const open = openBeats(stores);
      if (!extending || chosen.length === 0 || !open) select([tick]);
      else
        select(
          between(
            open.state.beats,
            Math.min(chosen[0], tick),
            Math.max(chosen[chosen.length - 1], tick),
          ),
        );
    },
    selectBeatsInView: () => selectBeatsWithin(view.getState().seconds),
    selectBeatsWithin,
    clearSelection: () => view.setState({ selection: { kind: 'none' } }),
  };
}

type Select = (ticks: readonly number[], anchor?: number) => void;

/** Ticks from one beat to another, both included. */
const between = (beats: BeatList, low: number, high: number): readonly number[] =>
  Array.from(beats.ticks.subarray(firstBeatAt(beats, low), firstBeatAt(beats, high + 1)));

/** The loose end of the selection one beat on; where nothing is selected, the next beat itself. */
function extend(stores: PaneStores, act: PaneActs, select: Select, way: 1 | -1): void {
  const open = openBeats(stores);
  const chosen = selectedTicks(stores);
  if (!open || chosen.length === 0) {
    stepBeat(stores, act, select, way);
    return;
  }
  const { beats } = open.state;
  const { selection } = stores.view.getState();
  const [first, last] = [chosen[0], chosen[chosen.length - 1]];
  const kept = selection.kind === 'beats' ? selection.anchor : undefined;
  const anchor = kept === first || kept === last ? kept : way > 0 ? first : last;
  const loose = anchor === first ? last : first;
  const next = firstBeatAt(beats, loose) + way;
  if (next < 0 || next >= beats.ticks.length) {
    act.say(way > 0 ? 'No beat after this' : 'No beat before this');
    return;
  }
  const end = beats.ticks[next];
  const ticks = between(beats, Math.min(anchor, end), Math.max(anchor, end));
  select(ticks, anchor);
  bringInSight(stores, ticksToSeconds(end, open.rateHz));
  act.say(`${beatsWords(ticks, open.rateHz)} selected`);
}

/** Selects the beat one on from what is selected, brings it in sight and says it. */
function stepBeat(stores: PaneStores, act: PaneActs, select: Select, way: 1 | -1): void {
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
