import { useCallback, useMemo } from 'react';
import { useStore } from 'zustand';
import { useCommandLinks } from './command-links';
import { useLeadsShown } from './leads-shown';
import { MINUTES, minutesActs } from './minutes-view';
import { PaneFrame } from './pane-frame';
import type { PaneProps } from './pane-props';
import { minutesRows, reportedOnly } from './rows';
import { SelectionBar } from './selection-bar';
import { EpochTable, RateTable, SpanTable } from './twin-tables';
import { type PaneSetup, usePane, usePaneCommands } from './use-pane';
import { useRoles } from './use-roles';

/** The pane with the stomach's time scale. */
export function MinutesPane(props: PaneProps) {
  const { stores } = props;
  const allRoles = useRoles(stores);
  const shown = useLeadsShown(stores.view);
  const excluding = useStore(stores.view, (state) => state.tool === 'exclude');
  const several = (allRoles?.slow.length ?? 0) > 1;
  const roles = useMemo(
    () => (allRoles && shown === 'reported' ? reportedOnly(allRoles) : allRoles),
    [allRoles, shown],
  );
  const recording = useStore(stores.analysis, (state) => state.recording);
  const breathing = useStore(stores.analysis, (state) => {
    const from = state.breathing?.from;
    return from === 'lead' || from === 'derived';
  });
  const route = useStore(
    stores.session,
    (state) => state.session?.state.settings.slowRoute ?? 'band',
  );
  const rows = useMemo(
    () => (roles && recording ? minutesRows(roles, recording, { breathing, route }) : []),
    [roles, recording, breathing, route],
  );
  const { hint } = useCommandLinks();
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
      <div className="pane-switches">
        <button
          type="button"
          aria-pressed={excluding}
          title={hint('Drag to exclude, or to look', 'toggle-tool')}
          onClick={commands.toggleTool}
        >
          {excluding ? 'Dragging excludes' : 'Exclude by dragging'}
        </button>
        {several && (
          <button
            type="button"
            title={hint('All leads, or the reported one', 'toggle-leads')}
            onClick={commands.toggleLeads}
          >
            {shown === 'all' ? 'Reported lead only' : `Show all ${allRoles?.slow.length} leads`}
          </button>
        )}
      </div>
      <SelectionBar of="span" stores={stores} commands={commands} />
      <EpochTable stores={stores} commands={commands} />
      <RateTable stores={stores} />
      <SpanTable stores={stores} commands={commands} />
    </PaneFrame>
  );
}
