import type { PaneDom } from './pane-dom';
import { gutterPart } from './pane-dom';
import { RateRowView } from './rate-row';
import type { RowContext, RowView } from './row-view';
import type { Row } from './rows';
import { SignalRowView } from './signal-row';
import { SpectrogramRowView } from './spectrogram-row';

/** Room of the interval line: painted with the pins, so that the row itself draws nothing. */
const emptyRow = (row: Row): RowView => ({
  row,
  resize: () => undefined,
  draw: () => undefined,
  describe: () => row.name,
  destroy: () => undefined,
});

/** The drawing of one row in its host. */
export function makeRowView(row: Row, dom: PaneDom, context: RowContext): RowView {
  const host = dom.hosts.get(row.key);
  if (!host) throw new Error(`row ${row.key} has no place`);
  if (row.kind === 'signal') return new SignalRowView(row, host, context);
  if (row.kind === 'interval') return emptyRow(row);
  const labels = gutterPart(dom.body, `labels ${row.key}`);
  if (row.kind === 'spectrogram') {
    const bar = gutterPart(dom.body, `bar ${row.key}`);
    const scale = bar instanceof HTMLCanvasElement && labels ? { bar, labels } : null;
    return new SpectrogramRowView(row, host, context, scale);
  }
  return new RateRowView(row, host, context, labels);
}
