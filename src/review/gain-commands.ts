import { leadKey } from '../recording/lead';
import type { SignalAccess } from './analysis-store';
import { windowGain } from './fit';
import { nextGain } from './gain';
import { asWork } from './idle';
import type { PaneActs } from './pane-acts';
import { fittedLevels } from './ramp';
import type { PaneStores } from './row-view';
import { minutesRows, type Row, type SignalRow, secondsRows } from './rows';

/** Acts on the size of traces. A row is given by its key; without one the selected row is meant, else the first of its pane. */
export interface GainCommands {
  gainUp(rowKey?: string): void;
  gainDown(rowKey?: string): void;
  /** Fits the row to what is in view. For the spectrogram: fits the level scale to the study. */
  gainFit(rowKey?: string): void;
  /** Gives all rows of the pane the gain of the row. */
  gainSame(rowKey?: string): void;
  /** Selects the next trace row, through both panes. */
  cycleRow(): void;
  selectRow(rowKey: string): void;
}

const LEVEL_STEP_DB = 5;
export const SPECTROGRAM_KEY = 'minutes:spectrogram';

const hasGain = (row: Row): boolean => row.kind === 'signal' || row.kind === 'spectrogram';

/** All rows of both panes as they stand now; none without a study. */
export function rowsNow({ session, analysis }: PaneStores): readonly Row[] {
  const roles = session.getState().session?.state.roles;
  const { recording } = analysis.getState();
  if (!roles || !recording) return [];
  return [
    ...minutesRows(roles, recording, { breathing: false, route: 'band' }),
    ...secondsRows(roles, recording),
  ];
}

/** Ends of the level scale in force. */
function levelsNow({ view, analysis, session }: PaneStores): readonly [number, number] {
  const { levelsDb } = view.getState();
  if (levelsDb) return levelsDb;
  const roles = session.getState().session?.state.roles;
  const reported = roles?.slow[roles.reported];
  const key = reported && leadKey(reported);
  const rhythm = analysis.getState().stomach.find((one) => one.lead === key);
  return fittedLevels(rhythm?.spectrogram.levelDb ?? []);
}

/** Makes the acts on the size of traces. */
export function gainCommands(
  stores: PaneStores,
  signals: SignalAccess,
  act: PaneActs,
): GainCommands {
  const { view } = stores;
  const chosen = (rowKey: string | undefined): Row | undefined => {
    const rows = rowsNow(stores).filter(hasGain);
    const key = rowKey ?? view.getState().selectedRow;
    return rows.find((row) => row.key === key) ?? rows[0];
  };
  const store = (row: SignalRow, gain: number) => {
    view.setState((now) => ({ gainsUv: { ...now.gainsUv, [row.key]: gain } }));
    act.say(`${row.name}, ${row.note}: ${gain} uV from middle to edge`);
  };
  const shiftLevels = (byDb: number) => {
    const [low, high] = levelsNow(stores);
    view.setState({ levelsDb: [low + byDb, high + byDb] });
    act.say(`Spectrogram ${low + byDb} to ${high + byDb} dB`);
  };
  const step = (rowKey: string | undefined, way: 'finer' | 'coarser') => {
    const row = chosen(rowKey);
    if (row?.kind === 'spectrogram') shiftLevels(way === 'finer' ? -LEVEL_STEP_DB : LEVEL_STEP_DB);
    const gain = row && view.getState().gainsUv[row.key];
    if (row?.kind === 'signal' && gain !== undefined) store(row, nextGain(gain, way));
  };
  const fitRow = async (row: SignalRow) => {
    const name = row.key.startsWith('minutes') ? 'minutes' : 'seconds';
    const gain = await windowGain(signals, row, view.getState()[name]);
    if (gain !== null) store(row, gain);
  };
  return {
    gainUp: (rowKey) => step(rowKey, 'finer'),
    gainDown: (rowKey) => step(rowKey, 'coarser'),
    gainFit: (rowKey) => {
      const row = chosen(rowKey);
      if (row?.kind === 'signal') void asWork(fitRow(row));
      if (row?.kind === 'spectrogram') view.setState({ levelsDb: null });
    },
    gainSame: (rowKey) => {
      const row = chosen(rowKey);
      if (row?.kind === 'signal') shareGain(stores, act, row);
    },
    cycleRow: () => cycleRow(stores, act),
    selectRow: (rowKey) => view.setState({ selectedRow: rowKey }),
  };
}

function shareGain(stores: PaneStores, act: PaneActs, row: SignalRow): void {
  const { view } = stores;
  const gain = view.getState().gainsUv[row.key];
  if (gain === undefined) return;
  const [pane] = row.key.split(':', 1);
  const all = rowsNow(stores)
    .filter((one) => one.kind === 'signal' && one.key.startsWith(`${pane}:`))
    .map((one) => [one.key, gain] as const);
  view.setState((now) => ({ gainsUv: { ...now.gainsUv, ...Object.fromEntries(all) } }));
  act.say(`All rows of the pane: ${gain} uV from middle to edge`);
}

function cycleRow(stores: PaneStores, act: PaneActs): void {
  const { view } = stores;
  const rows = rowsNow(stores).filter(hasGain);
  if (rows.length === 0) return;
  const at = rows.findIndex((row) => row.key === view.getState().selectedRow);
  const row = rows[(at + 1) % rows.length];
  view.setState({ selectedRow: row.key });
  act.say(`Row ${row.name}${row.note === '' ? '' : `, ${row.note}`}`);
}
