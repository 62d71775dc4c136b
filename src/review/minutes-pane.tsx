import { lazy, Suspense, useCallback, useMemo } from 'react';
import { useStore } from 'zustand';
import { asWork } from './idle';
import { useLeadsShown } from './leads-shown';
import { MINUTES, minutesActs } from './minutes-view';
import { PaneFrame } from './pane-frame';
import type { PaneProps } from './pane-props';
import { minutesRows, reportedOnly } from './rows';
import { EpochTable, SpanTable } from './twin-tables';
import { type PaneSetup, usePane, usePaneCommands } from './use-pane';
import { useRoles } from './use-roles';

/** Fetched when a span is selected first. */
const SpanBar = lazy(() => asWork(import('./span-bar')).then((all) => ({ default: all.SpanBar })));

/** The pane with the stomach's time scale. */
export function MinutesPane(props: PaneProps) {
  const { stores } = props;
  const allRoles = useRoles(stores);
  const shown = useLeadsShown(stores.view);
  const excluding = useStore(stores.view, (state) => state.tool === 'exclude');
  const chosen = useStore(stores.view, (state) => state.selection.kind === 'span');
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
        <button type="button" aria-pressed={excluding} title="Key E" onClick={commands.toggleTool}>
          {excluding ? 'Dragging excludes' : 'Exclude by dragging'}
        </button>
        {several && (
          <button type="button" title="Key L" onClick={commands.toggleLeads}>
            {shown === 'all' ? 'Reported lead only' : `Show all ${allRoles?.slow.length} leads`}
          </button>
        )}
      </div>
      {chosen && (
        <Suspense fallback={null}>
          <SpanBar stores={stores} commands={commands} />
        </Suspense>
      )}
      <EpochTable stores={stores} commands={commands} />
      <SpanTable stores={stores} commands={commands} />
    </PaneFrame>
  );
}
