import type { SessionStore } from '../session/store';
import type { AnalysisStore, SignalAccess } from './analysis-store';
import type { Row } from './rows';
import type { ThemeTokens } from './theme-tokens';
import type { TimeWindow, ViewStore } from './view-store';

/** The stores a pane reads. */
export interface PaneStores {
  readonly view: ViewStore;
  readonly analysis: AnalysisStore;
  readonly session: SessionStore;
}

/** What a row needs of its pane. */
export interface RowContext {
  readonly stores: PaneStores;
  readonly signals: SignalAccess;
  readonly tokens: () => ThemeTokens;
  /** Results are older than the last edit: drawn grey. */
  readonly stale: () => boolean;
  /** How much larger than CSS pixels the row is shown: plots are made that much finer. */
  readonly scale: number;
  /** Asks for a draw in the next frame. */
  readonly redraw: () => void;
}

/** One trace row as drawn. */
export interface RowView {
  readonly row: Row;
  /** The host was laid out anew; its size in CSS pixels. */
  resize(widthPx: number, heightPx: number): void;
  draw(window: TimeWindow): void;
  /** What the row shows, for the text twin: name, range, unit. */
  describe(): string;
  destroy(): void;
}
