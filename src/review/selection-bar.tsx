import { lazy, Suspense } from 'react';
import { useStore } from 'zustand';
import { asWork } from './idle';
import type { PaneCommands } from './pane-commands';
import type { PaneStores } from './row-view';

type Bars = typeof import('./selection-bars');

/** A bar that is fetched when something is selected first. */
const later = <K extends keyof Bars>(name: K) =>
  lazy<Bars[K]>(() => asWork(import('./selection-bars')).then((all) => ({ default: all[name] })));

const BAR_OF = { beats: later('BeatBar'), span: later('SpanBar') } as const;

interface SelectionBarProps {
  readonly of: keyof typeof BAR_OF;
  readonly stores: PaneStores;
  readonly commands: PaneCommands;
}

/** The bar of what is selected, beats or a span; nothing while nothing of the kind is. */
export function SelectionBar({ of, ...props }: SelectionBarProps) {
  const there = useStore(props.stores.view, (state) => state.selection.kind === of);
  const Bar = BAR_OF[of];
  if (!there) return null;
  return (
    <Suspense fallback={null}>
      <Bar {...props} />
    </Suspense>
  );
}
