import { useStore } from 'zustand';
import { BEAT_CLASSES } from '../recording/beat';
import { ticksToSeconds } from '../units/ticks';
import { formatClock } from '../units/time';
import type { BeatCommands } from './beat-commands';
import { useCommandLinks } from './command-links';
import { beatsWords, openBeats, selectedTicks } from './open-beats';
import type { PaneStores } from './row-view';

const CLASS_WORDS = {
  N: 'normal',
  S: 'supraventricular',
  V: 'ventricular',
  F: 'fusion',
  Q: 'not usable, or unknown',
} as const;

interface BeatBarProps {
  readonly stores: PaneStores;
  readonly commands: BeatCommands;
}

/** How many beats are selected and what can be done with them, for the mouse; the keys do the same. Nothing while none is. */
export function BeatBar({ stores, commands }: BeatBarProps) {
  useStore(stores.view, (state) => state.selection);
  useStore(stores.session, (state) => state.session?.state.beats);
  const { hint, run } = useCommandLinks();
  const ticks = selectedTicks(stores);
  const open = openBeats(stores);
  if (ticks.length === 0 || !open) return null;
  const words = beatsWords(ticks, open.rateHz);
  const one = ticks.length === 1 ? ticks[0] : null;
  return (
    <fieldset className="span-bar beat-bar" aria-label={words}>
      {one === null ? (
        <span className="span-place">{words}</span>
      ) : (
        <BeatTime
          key={one}
          time={formatClock(ticksToSeconds(one, open.rateHz), 3)}
          onTime={(text) => commands.moveBeatToTyped(one, text)}
        />
      )}
      {BEAT_CLASSES.map((beatClass) => (
        <button
          type="button"
          key={beatClass}
          title={hint(`Class ${beatClass}, ${CLASS_WORDS[beatClass]}`, `class-${beatClass}`)}
          aria-label={`Class ${beatClass}${beatClass === 'Q' ? '' : ','} ${CLASS_WORDS[beatClass]}`}
          onClick={() => commands.classSelected(beatClass)}
        >
          {beatClass === 'Q' ? 'Q not usable' : beatClass}
        </button>
      ))}
      <button
        type="button"
        title={hint('Delete', 'delete-selected')}
        onClick={() => commands.deleteSelectedBeats()}
      >
        Delete
      </button>
      <button
        type="button"
        title={hint('Find the beats of this stretch again, with other choices', 'find-within')}
        onClick={() => run('find-within')}
      >
        Find again…
      </button>
      <button
        type="button"
        title={hint('Select nothing', 'clear-selection')}
        onClick={() => commands.clearSelection()}
      >
        None
      </button>
    </fieldset>
  );
}

interface BeatTimeProps {
  readonly time: string;
  readonly onTime: (text: string) => void;
}

/** The time of the one selected beat; another time typed here moves it. */
function BeatTime({ time, onTime }: BeatTimeProps) {
  return (
    <label title="Type another time and press Enter to move the beat">
      Beat at
      <input
        type="text"
        defaultValue={time}
        autoComplete="off"
        spellCheck={false}
        onKeyDown={(event) => {
          if (event.key === 'Enter' && event.currentTarget.value !== time)
            onTime(event.currentTarget.value);
        }}
        onBlur={(event) => {
          event.currentTarget.value = time;
        }}
      />
    </label>
  );
}
