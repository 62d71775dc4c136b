import './borders.css';
import { useStore } from 'zustand';
import { SPAN_CAUSES, SPAN_TARGETS } from '../recording/span';
import { formatClock } from '../units/time';
import type { PaneStores } from './row-view';
import { type SpanCommands, selectedSpan } from './span-commands';
import { SpanEndField } from './span-end-field';

const TARGET_WORDS = { stomach: 'stomach', heart: 'heart', both: 'stomach and heart' } as const;

/** What the selected spoiled span is kept out of and why, changed in place. Nothing while none is selected. */
export function SpanBar({
  stores,
  commands,
}: {
  readonly stores: PaneStores;
  readonly commands: SpanCommands;
}) {
  useStore(stores.view, (state) => state.selection);
  useStore(stores.session, (state) => state.session?.state.spans);
  const span = selectedSpan(stores);
  if (!span) return null;
  const place = `${formatClock(span.fromS, 1)} to ${formatClock(span.toS, 1)}`;
  return (
    <fieldset className="span-bar" aria-label={`Spoiled span ${place}`}>
      <span className="span-place">{span.origin === 'proposed' ? 'Proposed' : 'Drawn'}</span>
      <SpanEndField key={`left ${span.id}`} end="left" {...{ stores, commands, span }} />
      <SpanEndField key={`right ${span.id}`} end="right" {...{ stores, commands, span }} />
      <Choice
        words="excluded for"
        value={span.target}
        options={SPAN_TARGETS}
        wordsOf={(target) => TARGET_WORDS[target]}
        onChange={(target) => commands.changeSelectedSpan({ target })}
      />
      <Choice
        words="cause"
        value={span.cause}
        options={SPAN_CAUSES}
        wordsOf={(cause) => cause}
        onChange={(cause) => commands.changeSelectedSpan({ cause })}
      />
      <button type="button" onClick={() => commands.deleteSelectedSpan()}>
        Include again
      </button>
    </fieldset>
  );
}

function Choice<T extends string>(props: {
  readonly words: string;
  readonly value: T;
  readonly options: readonly T[];
  readonly wordsOf: (option: T) => string;
  readonly onChange: (option: T) => void;
}) {
  const { words, value, options, wordsOf, onChange } = props;
  return (
    <label>
      {words}
      <select
        value={value}
        onChange={(event) => {
          const chosen = options.find((option) => option === event.target.value);
          if (chosen) onChange(chosen);
        }}
      >
        {options.map((option) => (
          <option key={option} value={option}>
            {wordsOf(option)}
          </option>
        ))}
      </select>
    </label>
  );
}
