import type { SignalAccess } from './analysis-store';
import type { PaneActs } from './pane-acts';
import type { PaneStores } from './row-view';
import type { ThemeName } from './theme-tokens';

/** What every pane is given by the shell. `signals` and `act` stay the same objects as long as the page lives. */
export interface PaneProps {
  readonly stores: PaneStores;
  readonly signals: SignalAccess;
  readonly act: PaneActs;
  readonly theme: ThemeName;
  /** How much larger than CSS pixels the pane is shown, 1 unless given. */
  readonly scale?: number;
}
