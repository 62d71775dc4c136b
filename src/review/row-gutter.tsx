import { useStore } from 'zustand';
import type { GainCommands } from './gain-commands';
import type { PaneStores } from './row-view';
import type { ResultRow, Row, SignalRow } from './rows';

interface GutterProps<R extends Row> {
  readonly row: R;
  readonly stores: PaneStores;
  readonly commands: GainCommands;
}

/** Name, unit, scale and gain buttons of one row, left of its trace. */
export function RowGutter({ row, stores, commands }: GutterProps<Row>) {
  return (
    <div className={`gutter of-${row.kind} hue-${row.hue}`}>
      {row.kind === 'signal' ? (
        <SignalGutter row={row} stores={stores} commands={commands} />
      ) : (
        <ResultGutter row={row} stores={stores} commands={commands} />
      )}
    </div>
  );
}

function SignalGutter({ row, stores, commands }: GutterProps<SignalRow>) {
  const gainUv = useStore(stores.view, (state) => state.gainsUv[row.key]);
  return (
    <>
      <RowName row={row} stores={stores} commands={commands} />
      <span className="uv-bar" aria-hidden="true" />
      <span className="uv-text">{gainUv === undefined ? '' : `${gainUv} µV`}</span>
      <GainButtons row={row} commands={commands} />
    </>
  );
}

function ResultGutter({ row, stores, commands }: GutterProps<ResultRow>) {
  if (row.kind === 'spectrogram')
    return (
      <>
        <RowName row={row} stores={stores} commands={commands} />
        <span className="level-scale">
          <canvas data-part={`bar ${row.key}`} />
          <span data-part={`labels ${row.key}`} className="level-labels">
            <span />
            <span />
          </span>
        </span>
        <CpmLabels stores={stores} />
        <GainButtons row={row} commands={commands} />
      </>
    );
  return (
    <>
      <span className="row-name">
        <span className="name">{row.name}</span>
        <span className="note">{row.note}</span>
      </span>
      <span data-part={`labels ${row.key}`} className="edge-labels" />
    </>
  );
}

function RowName({ row, stores, commands }: GutterProps<Row>) {
  const chosen = useStore(stores.view, (state) => state.selectedRow === row.key);
  return (
    <button
      type="button"
      className="row-name"
      aria-pressed={chosen}
      title={`${[row.name, row.note].filter(Boolean).join(', ')}: gain keys act on this row`}
      onClick={() => commands.selectRow(row.key)}
    >
      <span className="name">{row.name}</span>
      <span className="note">{row.note}</span>
    </button>
  );
}

function GainButtons({ row, commands }: { readonly row: Row; readonly commands: GainCommands }) {
  const what = row.kind === 'spectrogram' ? 'levels' : 'trace';
  const about = `${row.name} ${row.note}`.trim();
  const acts = [
    ['+', `Larger ${what}`, commands.gainUp],
    ['−', `Smaller ${what}`, commands.gainDown],
    ['fit', `Fit ${what}`, commands.gainFit],
  ] as const;
  return (
    <span className="gain-buttons">
      {acts.map(([sign, words, run]) => (
        <button
          key={sign}
          type="button"
          title={words}
          aria-label={`${words}: ${about}`}
          onClick={() => run(row.key)}
        >
          {sign}
        </button>
      ))}
    </span>
  );
}

/** Rates beside the spectrogram: the ends of what is shown and the limits of the bands, at their heights. */
function CpmLabels({ stores }: { readonly stores: PaneStores }) {
  const bands = useStore(stores.session, (state) => state.session?.state.settings.rhythmBands);
  if (!bands) return null;
  const low = Math.min(1, bands.lowCpm);
  const high = Math.max(9, bands.highCpm);
  const rates = [...new Set([low, bands.normoLowCpm, bands.normoHighCpm, 6, high])];
  return (
    <span className="cpm-labels" aria-hidden="true">
      {rates.map((cpm) => (
        <span
          key={cpm}
          className={cpm === high ? 'at-top' : cpm === low ? 'at-bottom' : 'at-middle'}
          style={{ top: `${(100 * (high - cpm)) / (high - low)}%` }}
        >
          {cpm}
        </span>
      ))}
    </span>
  );
}
