import { useCallback, useMemo } from 'react';
import { useStore } from 'zustand';
import { PaneFrame } from './pane-frame';
import type { PaneProps } from './pane-props';
import { PinButtons } from './pin-buttons';
import { secondsRows } from './rows';
import { pinKey, type SecondsParts, secondsActs, secondsKind } from './seconds-view';
import { SelectionBar } from './selection-bar';
import { BeatTable } from './twin-tables';
import { type PaneSetup, usePane, usePaneCommands } from './use-pane';
import { useRoles } from './use-roles';

const NO_HEART = 'No heart lead is chosen, so there are no beats to see.';

/** The pane with the heart's time scale, where beats are mended. */
export function SecondsPane(props: PaneProps) {
  const { stores } = props;
  const roles = useRoles(stores);
  const recording = useStore(stores.analysis, (state) => state.recording);
  const rows = useMemo(
    () => (roles && recording ? secondsRows(roles, recording) : []),
    [roles, recording],
  );
  const commands = usePaneCommands(props);
  const setUp = useCallback(
    (section: HTMLElement): PaneSetup => {
      const stage = section.querySelector('[data-part="stage"]');
      if (!(stage instanceof HTMLElement)) throw new Error('Seconds has no stage');
      const parts: SecondsParts = {
        buttons: new PinButtons(stage, commands),
        drag: null,
        band: null,
      };
      const keys = (event: KeyboardEvent) => {
        const chosen = stores.view.getState().selection.kind === 'beats';
        if (event.target !== stage || !chosen || !pinKey(commands, event)) return;
        event.preventDefault();
        event.stopPropagation();
      };
      stage.setAttribute('role', 'application');
      stage.setAttribute('aria-label', 'Beats: keys act on the selected ones');
      stage.addEventListener('keydown', keys);
      return {
        kind: secondsKind(parts),
        acts: (view) => secondsActs(view, commands, parts),
        stop: () => {
          parts.buttons.destroy();
          stage.removeEventListener('keydown', keys);
        },
      };
    },
    [commands, stores],
  );
  const sectionRef = usePane(props, rows, setUp);
  const noHeart = roles !== null && recording !== null && rows.length === 0;
  return (
    <PaneFrame
      name="seconds"
      title="Seconds"
      sectionRef={sectionRef}
      rows={rows}
      stores={stores}
      commands={commands}
      hasSlot={false}
      notice={noHeart ? NO_HEART : null}
    >
      <SelectionBar of="beats" stores={stores} commands={commands} />
      <BeatTable stores={stores} commands={commands} />
    </PaneFrame>
  );
}
