import { useId, useState } from 'react';
import { useStore } from 'zustand';
import { BEAT_CLASSES, type BeatClass } from '../recording/beat';
import { ticksToSeconds } from '../units/ticks';
import { formatClock } from '../units/time';
import { readTypedTime, timeOfDay, typedTimeFault } from '../units/typed-time';
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

/** A class in words that hold what its button shows. */
const classWords = (beatClass: BeatClass): string =>
  `Class ${beatClass}${beatClass === 'Q' ? '' : ','} ${CLASS_WORDS[beatClass]}`;

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
          tick={one}
          stores={stores}
          commands={commands}
        />
      )}
      {BEAT_CLASSES.map((beatClass) => (
        <button
          type="button"
          key={beatClass}
          title={hint(classWords(beatClass), `class-${beatClass}`)}
          aria-label={classWords(beatClass)}
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

interface BeatTimeProps extends BeatBarProps {
  readonly tick: number;
  readonly time: string;
}

/** The time of the one selected beat; another time typed here moves it, Escape takes back what was typed. */
function BeatTime({ stores, commands, tick, time }: BeatTimeProps) {
  const id = useId();
  const study = useStore(stores.session, (now) => now.session?.state.study);
  const [typed, setTyped] = useState(time);
  const [fault, setFault] = useState<string | null>(null);
  const frame = {
    durationS: study?.durationS ?? 0,
    startOfDayS: timeOfDay(study?.start ?? null),
  };
  const change = (text: string) => {
    setTyped(text);
    setFault(null);
  };
  const keep = () => {
    const read = readTypedTime(typed, frame);
    if ('atS' in read && typed !== time) commands.moveBeatTo(tick, read.atS);
    setFault(typedTimeFault(typed, frame));
  };
  return (
    <label title="Type another time and press Enter to move the beat">
      Beat at
      <input
        type="text"
        value={typed}
        autoComplete="off"
        spellCheck={false}
        aria-invalid={fault === null ? undefined : true}
        aria-describedby={fault === null ? undefined : id}
        onChange={(event) => change(event.target.value)}
        onKeyDown={(event) => {
          if (event.key === 'Enter') keep();
          else if (event.key === 'Escape' && typed !== time) change(time);
          else if (event.key === 'Escape') event.currentTarget.blur();
        }}
        onBlur={() => change(time)}
      />
      {fault === null ? null : (
        <span id={id} role="alert" className="span-fault">
          {fault}
        </span>
      )}
    </label>
  );
}
