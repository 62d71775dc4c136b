import type { ReactNode, RefObject } from 'react';
import { useStore } from 'zustand';
import type { GainCommands } from './gain-commands';
import type { LookCommands } from './look-commands';
import { PaneMoves } from './pane-moves';
import { RowGutter } from './row-gutter';
import type { PaneStores } from './row-view';
import type { Row } from './rows';
import { widthText } from './time-ticks';

interface PaneFrameProps {
  readonly name: 'minutes' | 'seconds';
  readonly title: string;
  readonly sectionRef: RefObject<HTMLElement | null>;
  readonly rows: readonly Row[];
  readonly stores: PaneStores;
  readonly commands: GainCommands & LookCommands;
  readonly hasSlot: boolean;
  /** Words over the drawing where there is nothing to draw. */
  readonly notice: string | null;
  readonly children?: ReactNode;
}

/** The standing parts of a pane: gutter, places for the plots, layers, words. What moves is drawn without React. */
export function PaneFrame(props: PaneFrameProps) {
  const { name, title, rows, stores, commands, notice } = props;
  const widthS = useStore(stores.view, (state) => Math.round(state[name].toS - state[name].fromS));
  return (
    <section className={`pane ${name}`} aria-label={title} ref={props.sectionRef}>
      <div className="pane-body" data-part="body">
        <canvas className="pane-under" data-part="under" />
        <div className="pane-head">
          <div className="gutter">
            <h2>{title}</h2>
            <span className="pane-width">{widthS > 0 ? widthText(widthS) : ''}</span>
          </div>
        </div>
        {rows.map((row) => (
          <div className="pane-row" key={row.key} style={{ flexGrow: row.weight }}>
            <RowGutter row={row} stores={stores} commands={commands} />
            <div className="row-plot" data-part={`plot ${row.key}`} />
          </div>
        ))}
        <div className="pane-axis">
          <PaneMoves name={name} title={title} commands={commands} />
        </div>
        <canvas className="pane-over" data-part="over" />
        <div className="pane-stage" data-part="stage">
          {props.hasSlot && <div className="slot" data-part="slot" />}
          <div className="cursor-line" data-part="cursor-line" hidden />
          <div className="cursor-text" data-part="cursor-text" hidden />
        </div>
        {notice !== null && <p className="pane-notice">{notice}</p>}
      </div>
      <p className="visually-hidden" data-part="summary" />
      {props.children}
    </section>
  );
}
