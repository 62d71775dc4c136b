import type { Phase } from '../recording/phase';
import { setField } from '../session/edits';
import { type PaneActs, tryEdit } from './pane-acts';
import type { PaneStores } from './row-view';

/** Acts on the borders of phases. */
export interface PhaseCommands {
  /** Phases as a border that was moved leaves them, in one step. */
  changePhases(phases: readonly Phase[]): void;
  /** Shows the borders in Whole study, to be moved by keys. */
  movePhaseBorders(): void;
}

/** Phases as a border that was moved leaves them, in one step. */
export function changePhases(stores: PaneStores, act: PaneActs, phases: readonly Phase[]): void {
  tryEdit(stores, act, ({ state }) => setField(state, 'phases', phases, 'move border of a phase'));
}

/** Makes the acts on phases. */
export function phaseCommands(stores: PaneStores, act: PaneActs): PhaseCommands {
  return {
    changePhases: (phases) => changePhases(stores, act, phases),
    movePhaseBorders: () => stores.view.setState({ bordersShown: true }),
  };
}
