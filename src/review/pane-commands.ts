import type { SignalAccess } from './analysis-store';
import { type BeatCommands, beatCommands } from './beat-commands';
import { type GainCommands, gainCommands } from './gain-commands';
import { type LookCommands, lookCommands } from './look-commands';
import type { PaneActs } from './pane-acts';
import { type PhaseCommands, phaseCommands } from './phase-commands';
import type { PaneStores } from './row-view';
import { type SpanCommands, spanCommands } from './span-commands';

/** Every act of the panes, for the shell's command table and for pins and buttons. */
export interface PaneCommands
  extends LookCommands,
    GainCommands,
    BeatCommands,
    SpanCommands,
    PhaseCommands {
  /** Deletes the selected beats, or takes away the selected spoiled span. */
  deleteSelected(): void;
}

/** Makes the acts of the panes over the page's stores. */
export function paneCommands(
  stores: PaneStores,
  signals: SignalAccess,
  act: PaneActs,
): PaneCommands {
  const beats = beatCommands(stores, signals, act);
  const spans = spanCommands(stores, act);
  return {
    ...lookCommands(stores, act),
    ...gainCommands(stores, signals, act),
    ...beats,
    ...spans,
    ...phaseCommands(stores, act),
    deleteSelected: () => {
      if (stores.view.getState().selection.kind === 'span') spans.deleteSelectedSpan();
      else beats.deleteSelectedBeats();
    },
  };
}
