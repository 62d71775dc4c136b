import { beatAt } from '../recording/beat';
import type { SessionState } from '../session/document';
import { ticksToSeconds } from '../units/ticks';
import { formatClock } from '../units/time';
import { beatsAtTicks, heartRateHz, rrMsAt } from './beats-in-view';
import type { PaneStores } from './row-view';
import { lookAtSeconds } from './view-store';

/** The open session with the clock of its beats' ticks. */
export interface OpenBeats {
  readonly state: SessionState;
  readonly rateHz: number;
}

/** The open session with the clock of its beats; null without a study or a heart lead. */
export function openBeats({ session, analysis }: PaneStores): OpenBeats | null {
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
export function beatWords({ state, rateHz }: OpenBeats, index: number): string {
  const { tick, beatClass, origin } = beatAt(state.beats, index);
  const rrMs = rrMsAt(state.beats, index, rateHz);
  const interval = !Number.isNaN(rrMs) ? `, interval ${Math.round(rrMs)} ms` : '';
  const placed = origin === 'placed' ? ', placed' : '';
  return `beat ${beatClass} at ${formatClock(ticksToSeconds(tick, rateHz), 3)}${interval}${placed}`;
}

/** Some beats in words: how many, from when to when. */
export function beatsWords(ticks: readonly number[], rateHz: number): string {
  const clock = (tick: number) => formatClock(ticksToSeconds(tick, rateHz), 1);
  const [first = 0] = ticks;
  if (ticks.length === 0) return 'No beat';
  if (ticks.length === 1) return `Beat at ${clock(first)}`;
  return `${ticks.length} beats from ${clock(first)} to ${clock(ticks[ticks.length - 1])}`;
}

/** Pans Seconds so that a time is clear of its ends. */
export function bringInSight({ view }: PaneStores, atS: number): void {
  const { fromS, toS } = view.getState().seconds;
  const margin = (toS - fromS) / 10;
  if (atS < fromS + margin || atS > toS - margin) lookAtSeconds(view, atS);
}
