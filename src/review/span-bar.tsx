import { useStore } from 'zustand';
import { SPAN_CAUSES, SPAN_TARGETS } from '../recording/span';
import { formatClock } from '../units/time';
import type { PaneStores } from './row-view';
import { type SpanCommands, selectedSpan } from './span-commands';

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
      <span className="span-place">
        {span.origin === 'proposed' ? 'Proposed' : 'Drawn'} {place}
      </span>
      <label>
        not for
        <select
          value={span.target}
          onChange={(event) => {
            const target = SPAN_TARGETS.find((one) => one === event.target.value);
            if (target) commands.changeSelectedSpan({ target });
          }}
        >
          {SPAN_TARGETS.map((target) => (
            <option key={target} value={target}>
              {TARGET_WORDS[target]}
            </option>
          ))}
        </select>
      </label>
      <label>
        cause
        <select
          value={span.cause}
          onChange={(event) => {
            const cause = SPAN_CAUSES.find((one) => one === event.target.value);
            if (cause) commands.changeSelectedSpan({ cause });
          }}
        >
          {SPAN_CAUSES.map((cause) => (
            <option key={cause} value={cause}>
              {cause}
            </option>
          ))}
        </select>
      </label>
      <button type="button" onClick={() => commands.deleteSelectedSpan()}>
        Count it again
      </button>
    </fieldset>
  );
}
