import { useStore } from 'zustand';
import { BEAT_CLASSES } from '../recording/beat';
import { ticksToSeconds } from '../units/ticks';
import { formatClock } from '../units/time';
import { type BeatCommands, openBeats, selectedTicks } from './beat-commands';
import type { PaneStores } from './row-view';

const CLASS_WORDS = {
  N: 'normal',
  S: 'supraventricular',
  V: 'ventricular',
  F: 'fusion',
  Q: 'unknown or not usable',
} as const;

/** What can be done with the selected beats, for the mouse; the keys do the same. Nothing while none is selected. */
export function BeatBar({
  stores,
  commands,
}: {
  readonly stores: PaneStores;
  readonly commands: BeatCommands;
}) {
  useStore(stores.view, (state) => state.selection);
  useStore(stores.session, (state) => state.session?.state.beats);
  const ticks = selectedTicks(stores);
  const open = openBeats(stores);
  if (ticks.length === 0 || !open) return null;
  const place = formatClock(ticksToSeconds(ticks[0], open.rateHz), 1);
  const words = ticks.length === 1 ? `Beat at ${place}` : `${ticks.length} beats from ${place}`;
  return (
    <fieldset className="span-bar" aria-label={words}>
      <span className="span-place">{words}</span>
      {BEAT_CLASSES.map((beatClass) => (
        <button
          type="button"
          key={beatClass}
          title={`Class ${beatClass}, ${CLASS_WORDS[beatClass]} (key ${beatClass})`}
          aria-label={`Class ${beatClass}, ${CLASS_WORDS[beatClass]}`}
          onClick={() => commands.classSelected(beatClass)}
        >
          {beatClass}
        </button>
      ))}
      <button
        type="button"
        title="Delete (key Delete)"
        onClick={() => commands.deleteSelectedBeats()}
      >
        Delete
      </button>
    </fieldset>
  );
}
