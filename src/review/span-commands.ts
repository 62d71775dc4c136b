import type { Span, SpanCause, SpanTarget } from '../recording/span';
import { addSpan, changeSpan, removeSpans } from '../session/edits';
import { goTo } from './navigate';
import { type PaneActs, tryEdit } from './pane-acts';
import type { PaneStores } from './row-view';

/** Acts on spoiled spans. */
export interface SpanCommands {
  /** Excludes a stretch on all leads, as a span drawn by hand, and selects it. */
  excludeRange(fromS: number, toS: number, target?: SpanTarget, cause?: SpanCause): void;
  changeSelectedSpan(
    parts: Partial<Pick<Span, 'fromS' | 'toS' | 'target' | 'cause' | 'note'>>,
  ): void;
  deleteSelectedSpan(): void;
  selectSpan(id: number): void;
  /** Selects the span after or before the middle of the Seconds window and goes there. */
  selectNextSpan(): void;
  selectPreviousSpan(): void;
}

/** The spoiled span that is selected now, or null. */
export function selectedSpan({ view, session }: PaneStores): Span | null {
  const { selection } = view.getState();
  if (selection.kind !== 'span') return null;
  const spans = session.getState().session?.state.spans ?? [];
  return spans.find((span) => span.id === selection.id) ?? null;
}

/** Makes the acts on spoiled spans. */
export function spanCommands(stores: PaneStores, act: PaneActs): SpanCommands {
  const { view, session } = stores;
  const select = (id: number) => view.setState({ selection: { kind: 'span', id } });
  const step = (way: 1 | -1) => {
    const { seconds } = view.getState();
    const middle = (seconds.fromS + seconds.toS) / 2;
    const here = selectedSpan(stores)?.fromS ?? middle;
    const spans = [...(session.getState().session?.state.spans ?? [])]
      .filter((span) => (span.fromS - here) * way > 1e-6)
      .sort((a, b) => (a.fromS - b.fromS) * way);
    const [next] = spans;
    if (!next) {
      act.say(way > 0 ? 'No spoiled span after this' : 'No spoiled span before this');
      return;
    }
    select(next.id);
    goTo(view, (next.fromS + next.toS) / 2);
    act.say(`Spoiled span, ${next.cause}, ${next.target}`);
  };
  return {
    excludeRange: (fromS, toS, target = 'both', cause = 'other') => {
      const made = tryEdit(stores, act, (open) =>
        addSpan(open, { fromS, toS, lead: null, target, cause, origin: 'drawn', note: '' }),
      );
      const [change] = made?.changes ?? [];
      if (change?.kind === 'spans' && change.added[0]) select(change.added[0].id);
    },
    changeSelectedSpan: (parts) => {
      const span = selectedSpan(stores);
      if (!span) return;
      tryEdit(stores, act, ({ state }) =>
        changeSpan(state, span.id, { ...parts, origin: 'drawn' }),
      );
    },
    deleteSelectedSpan: () => {
      const span = selectedSpan(stores);
      if (!span) return;
      tryEdit(stores, act, ({ state }) => removeSpans(state, [span.id]));
      view.setState({ selection: { kind: 'none' } });
    },
    selectSpan: select,
    selectNextSpan: () => step(1),
    selectPreviousSpan: () => step(-1),
  };
}
