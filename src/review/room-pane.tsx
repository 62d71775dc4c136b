import { useCallback, useMemo } from 'react';
import { useStore } from 'zustand';
import { MINUTES, minutesActs } from './minutes-view';
import { PaneFrame } from './pane-frame';
import type { PaneProps } from './pane-props';
import { PinButtons } from './pin-buttons';
import { minutesRows, type Row, secondsRows } from './rows';
import { type SecondsParts, secondsActs, secondsKind } from './seconds-view';
import { type PaneSetup, usePane, usePaneCommands } from './use-pane';
import { useRoles } from './use-roles';

/** The trace rows that can be brought forward, those of Minutes first. */
export function useForwardRows({ stores }: Pick<PaneProps, 'stores'>): readonly Row[] {
  const roles = useRoles(stores);
  const recording = useStore(stores.analysis, (state) => state.recording);
  const from = useStore(stores.analysis, (state) => state.breathing?.from);
  const breathing = from === 'lead' || from === 'derived';
  const route = useStore(stores.session, (state) => state.session?.state.settings.slowRoute);
  return useMemo(() => {
    if (!roles || !recording) return [];
    const minutes = minutesRows(roles, recording, { breathing, route: route ?? 'band' });
    const seconds = secondsRows(roles, recording).filter(({ kind }) => kind !== 'interval');
    return [...minutes, ...seconds];
  }, [roles, recording, breathing, route]);
}

/** One trace row alone, with the intervals over the beats where it is the lead they stand on. */
export function ForwardPane(props: PaneProps & { readonly row: Row }) {
  const { stores, row } = props;
  const name = row.key.startsWith('seconds:') ? 'seconds' : 'minutes';
  const roles = useRoles(stores);
  const recording = useStore(stores.analysis, (state) => state.recording);
  const rows = useMemo(() => {
    const beats = name === 'seconds' && row.kind === 'signal' && row.signal === 'recorded';
    if (!beats || !roles || !recording) return [row];
    return [...secondsRows(roles, recording).filter(({ kind }) => kind === 'interval'), row];
  }, [row, name, roles, recording]);
  const commands = usePaneCommands(props);
  const setUp = useCallback(
    (section: HTMLElement): PaneSetup => {
      if (name === 'minutes') return { kind: MINUTES, acts: (view) => minutesActs(view, commands) };
      const stage = section.querySelector('[data-part="stage"]');
      if (!(stage instanceof HTMLElement)) throw new Error('the trace row has no stage');
      const parts: SecondsParts = {
        buttons: new PinButtons(stage, commands),
        drag: null,
        band: null,
      };
      return {
        kind: secondsKind(parts),
        acts: (view) => secondsActs(view, commands, parts),
        stop: () => parts.buttons.destroy(),
      };
    },
    [name, commands],
  );
  const sectionRef = usePane(props, rows, setUp);
  return (
    <PaneFrame
      key={name}
      name={name}
      title={name === 'minutes' ? 'Minutes' : 'Seconds'}
      sectionRef={sectionRef}
      rows={rows}
      stores={stores}
      commands={commands}
      hasSlot={name === 'minutes'}
      notice={null}
    />
  );
}
