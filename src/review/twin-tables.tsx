import { lazy, type ReactNode, Suspense, useState } from 'react';
import { asWork } from './idle';
import type { PaneCommands } from './pane-commands';
import type { PaneStores } from './row-view';

export interface TwinProps {
  readonly stores: PaneStores;
  readonly commands: PaneCommands;
}

type Rows = typeof import('./twin-rows');

/** Rows of a table that are fetched when one is opened first. */
const rows = <K extends keyof Rows>(name: K) =>
  lazy<Rows[K]>(() => asWork(import('./twin-rows')).then((all) => ({ default: all[name] })));

const BeatRows = rows('BeatRows');
const EpochRows = rows('EpochRows');
const PhaseRows = rows('PhaseRows');
const RateRows = rows('RateRows');
const SpanRows = rows('SpanRows');

/** A table in place of a drawing, hidden until it is reached by keyboard; its rows are made only while it is open. */
function Twin({ title, children }: { readonly title: string; readonly children: () => ReactNode }) {
  const [open, setOpen] = useState(false);
  return (
    <details className="twin" onToggle={(event) => setOpen(event.currentTarget.open)}>
      <summary>{title}</summary>
      {open && (
        <div className="twin-scroll">
          <Suspense fallback={null}>{children()}</Suspense>
        </div>
      )}
    </details>
  );
}

/** The beats of the Seconds window. */
export function BeatTable(props: TwinProps) {
  return <Twin title="Beats in Seconds as a table">{() => <BeatRows {...props} />}</Twin>;
}

/** The epochs of the Minutes window. */
export function EpochTable({ stores }: TwinProps) {
  return <Twin title="Epochs in Minutes as a table">{() => <EpochRows stores={stores} />}</Twin>;
}

/** The phases of the whole study. */
export function PhaseTable({ stores }: Pick<TwinProps, 'stores'>) {
  return <Twin title="Phases as a table">{() => <PhaseRows stores={stores} />}</Twin>;
}

/** Heart rate and breathing of the Minutes window. */
export function RateTable({ stores }: Pick<TwinProps, 'stores'>) {
  return (
    <Twin title="Heart rate and breathing in Minutes as a table">
      {() => <RateRows stores={stores} />}
    </Twin>
  );
}

/** All spoiled spans, each a way to select it. */
export function SpanTable(props: TwinProps) {
  return <Twin title="Spoiled spans as a table">{() => <SpanRows {...props} />}</Twin>;
}
