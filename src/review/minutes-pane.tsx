import { useCallback, useMemo } from 'react';
import { useStore } from 'zustand';
import { MINUTES, minutesActs } from './minutes-view';
import { PaneFrame } from './pane-frame';
import type { PaneProps } from './pane-props';
import { minutesRows } from './rows';
import { SpanBar } from './span-bar';
import { EpochTable, SpanTable } from './twin-tables';
import { type PaneSetup, usePane, usePaneCommands } from './use-pane';

/** The pane with the stomach's time scale. */
export function MinutesPane(props: PaneProps) {
  const { stores } = props;
  const roles = useStore(stores.session, (state) => state.session?.state.roles);
  const recording = useStore(stores.analysis, (state) => state.recording);
  const breathing = useStore(stores.analysis, (state) => {
    const from = state.heart?.breathing.from;
    return from === 'lead' || from === 'derived';
  });
  const rows = useMemo(
    () => (roles && recording ? minutesRows(roles, recording, { breathing }) : []),
    [roles, recording, breathing],
  );
  const commands = usePaneCommands(props);
  const setUp = useCallback(
    (): PaneSetup => ({ kind: MINUTES, acts: (view) => minutesActs(view, commands) }),
    [commands],
  );
  const sectionRef = usePane(props, rows, setUp);
  return (
    <PaneFrame
      name="minutes"
      title="Minutes"
      sectionRef={sectionRef}
      rows={rows}
      stores={stores}
      commands={commands}
      hasSlot
      notice={null}
    >
      <SpanBar stores={stores} commands={commands} />
      <EpochTable stores={stores} commands={commands} />
      <SpanTable stores={stores} commands={commands} />
    </PaneFrame>
  );
}
