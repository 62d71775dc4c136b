import { useStore } from 'zustand';
import type { Doubt } from '../recording/doubt';
import { openBeats } from '../review/beat-commands';
import { inSight } from '../review/doubt-travel';
import {
  type EffectWords,
  effectWords,
  KIND_WORDS,
  mendWords,
  placeWords,
} from '../review/doubt-words';
import type { CommandParts } from './command';
import { CommandButton, stopRepeat } from './command-button';
import { canRun, commandOf } from './commands';
import { shownKey } from './own-keys';

interface DoubtCardProps {
  readonly parts: CommandParts;
  readonly doubt: Doubt;
  /** Its place in the list, from 1, and how many there are. */
  readonly at: number;
  readonly of: number;
}

/** The doubt in front: where, why, and the two ways to settle it with what each gives. */
export function DoubtCard({ parts, doubt, at, of }: DoubtCardProps) {
  const shown = useStore(parts.view, () => inSight(parts.view, doubt));
  const rateHz = openBeats(parts)?.rateHz ?? null;
  const effect = doubt.effect && effectWords(doubt.effect);
  return (
    <section className="doubt-card" aria-label="The doubt in front">
      <h3>
        {placeWords(doubt, rateHz)} · {KIND_WORDS[doubt.kind]}
        <span className="quiet small">
          {at} of {of}
        </span>
      </h3>
      <p>{doubt.why}</p>
      <EffectHead effect={effect} />
      {doubt.mend ? (
        <Way
          id="mend-doubt"
          parts={parts}
          words={mendWords(doubt, rateHz ?? 1)}
          figure={effect ? changeWords(effect) : ''}
        />
      ) : null}
      <Way
        id="keep-doubt"
        parts={parts}
        words="Keep as it is"
        figure={effect ? `${effect.before} stays` : ''}
      />
      {doubt.mend ? null : (
        <p className="small quiet">Nothing is proposed: keep it, or mend it by hand in Seconds.</p>
      )}
      <p className="button-row">
        <CommandButton
          command={commandOf('next-doubt')}
          parts={parts}
          words={shown ? 'Next' : 'Go there'}
          className="button slight"
          showKey
        />
        <CommandButton
          command={commandOf('previous-doubt')}
          parts={parts}
          words="Before"
          className="button slight"
          showKey
        />
        {doubt.tick === null ? null : (
          <CommandButton
            command={commandOf('look-alikes')}
            parts={parts}
            words="Look-alikes…"
            className="button slight"
            showKey
          />
        )}
      </p>
    </section>
  );
}

/** Before and after beside each other; once where they are the same as far as is shown. */
const changeWords = ({ before, after, same }: EffectWords): string =>
  same ? before : `${before} → ${after}`;

/** Which figure is moved most, and why one side of it is withheld. */
function EffectHead({ effect }: { readonly effect: EffectWords | null }) {
  if (!effect) return <p className="doubt-figure quiet small">Moves no figure that is shown.</p>;
  const { name, unit, same } = effect;
  const reason = same ? 'too small a change to show' : effect.reason;
  return (
    <p className="doubt-figure quiet small">
      <span>{unit === '' ? name : `${name}, ${unit}`}</span>
      {reason === '' ? null : <span>— {reason}</span>}
    </p>
  );
}

interface WayProps {
  readonly id: 'mend-doubt' | 'keep-doubt';
  readonly parts: CommandParts;
  readonly words: string;
  readonly figure: string;
}

/** One way to settle: its key, what it does, what the figure is then. */
function Way({ id, parts, words, figure }: WayProps) {
  const command = commandOf(id);
  const key = useStore(parts.shell, (state) => shownKey(command, state));
  return (
    <button
      type="button"
      className="doubt-way"
      title={key === '' ? command.words : `${command.words} (${key})`}
      disabled={!canRun(command, parts)}
      onKeyDown={stopRepeat}
      onClick={() => command.run(parts)}
    >
      {key === '' ? null : (
        <span className="key-cap" aria-hidden="true">
          {key}
        </span>
      )}
      <span className="doubt-act">{words}</span>
      <strong>{figure}</strong>
    </button>
  );
}
