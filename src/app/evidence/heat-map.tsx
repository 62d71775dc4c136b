import { type KeyboardEvent, useRef } from 'react';
import { bestCell, type MapScores, type OrganMap } from '../../recording/settings-map';
import { type Cell, cellWords, windowText } from './settings-map-words';

/** Levels of the ramp, 1 dB each; what is further below the best is the lowest. */
export const LEVELS = 12;

/** Level of a score from 0 to LEVELS, the best being `topDb`. */
const levelOf = (snrDb: number, topDb: number): number =>
  Math.max(0, Math.min(LEVELS, LEVELS - Math.floor(topDb - snrDb + 1e-9)));

/** Orders and windows that are written on the axes: every so many. */
const ORDERS_APART = 5;
const WINDOWS_APART = 5;

interface HeatMapProps {
  readonly map: OrganMap;
  readonly scores: MapScores;
  readonly topDb: number;
  readonly label: string;
  /** The cell in hand. */
  readonly cell: Cell;
  readonly onCell: (cell: Cell) => void;
  readonly onHover: (cell: Cell | null) => void;
  /** Enter on the cell in hand. */
  readonly onChoose: () => void;
}

/** Index of the value nearest to another. */
function nearest(values: readonly number[], value: number): number {
  let best = 0;
  values.forEach((one, k) => {
    if (Math.abs(one - value) < Math.abs(values[best] - value)) best = k;
  });
  return best;
}

const STEPS: Readonly<Record<string, readonly [order: number, window: number]>> = {
  ArrowUp: [1, 0],
  ArrowDown: [-1, 0],
  ArrowLeft: [0, -1],
  ArrowRight: [0, 1],
};

const within = (at: number, count: number) => Math.max(0, Math.min(count - 1, at));

/** A map of scores: window lengths to the right, derivative orders upwards; arrow keys walk its cells. */
export function HeatMap(props: HeatMapProps) {
  const { map, scores, label, cell, onCell, onHover, onChoose } = props;
  const ref = useRef<HTMLTableElement>(null);
  const { orders, windowsMs } = map;
  const walk = (event: KeyboardEvent) => {
    const step = STEPS[event.key];
    const enter = event.key === 'Enter';
    if (!step && !enter) return;
    event.preventDefault();
    if (enter) return onChoose();
    const next = {
      order: within(cell.order + step[0], orders.length),
      window: within(cell.window + step[1], windowsMs.length),
    };
    onCell(next);
    ref.current?.querySelector<HTMLElement>(`[data-cell="${next.order} ${next.window}"]`)?.focus();
  };
  return (
    <div className="heat-frame">
      <span className="heat-up small" aria-hidden="true">
        order of the derivative
      </span>
      <table ref={ref} className="heat-map" aria-label={label} onPointerLeave={() => onHover(null)}>
        <tbody>
          {orders.map((_, k) => (
            <Row
              key={orders[k]}
              {...props}
              onKey={walk}
              order={orders.length - 1 - k}
              best={bestCell(scores)}
              set={{
                order: nearest(orders, map.order),
                window: nearest(windowsMs, map.windowMs),
              }}
            />
          ))}
        </tbody>
      </table>
      <div className="heat-foot small" aria-hidden="true">
        {windowsMs.map((windowMs, w) =>
          w % WINDOWS_APART === 0 || w === windowsMs.length - 1 ? (
            <span key={windowMs} className={`column-${w}`}>
              {windowText(windowMs)}
            </span>
          ) : null,
        )}
      </div>
      <span className="heat-right small" aria-hidden="true">
        window of the smoothing
      </span>
    </div>
  );
}

interface RowProps extends HeatMapProps {
  readonly onKey: (event: KeyboardEvent) => void;
  readonly order: number;
  readonly best: Cell;
  /** The cell nearest to the settings as they are. */
  readonly set: Cell;
}

/** One order; the best cell is ringed and the one as set crossed, so that they are told by shape. */
function Row(props: RowProps) {
  const { map, scores, topDb, cell, onCell, onHover, onKey, order, best, set } = props;
  const is = (one: Cell, window: number) => one.order === order && one.window === window;
  return (
    <tr>
      <th scope="row">
        <span className={order % ORDERS_APART === 0 ? undefined : 'unseen'}>
          {map.orders[order].toFixed(2)}
        </span>
      </th>
      {map.windowsMs.map((windowMs, window) => {
        const inHand = is(cell, window);
        const marks = [is(best, window) ? 'best' : '', is(set, window) ? 'as set' : ''];
        const words = [cellWords(map, scores, { order, window }), ...marks.filter(Boolean)];
        return (
          <td key={windowMs}>
            <button
              type="button"
              tabIndex={inHand ? 0 : -1}
              aria-label={words.join(', ')}
              aria-pressed={inHand}
              data-cell={`${order} ${window}`}
              className={`level-${levelOf(scores.cells[order][window].snrDb, topDb)}`}
              onPointerEnter={() => onHover({ order, window })}
              onClick={() => onCell({ order, window })}
              onKeyDown={onKey}
            >
              {marks[0] || marks[1] ? (
                <i className={marks[0] || undefined}>{marks[1] ? '×' : ''}</i>
              ) : null}
            </button>
          </td>
        );
      })}
    </tr>
  );
}
