import type { Row } from './rows';

/** The elements of a pane that are drawn on without React. */
export interface PaneDom {
  readonly body: HTMLElement;
  readonly under: HTMLCanvasElement;
  readonly over: HTMLCanvasElement;
  readonly stage: HTMLElement;
  readonly cursorLine: HTMLElement;
  readonly cursorText: HTMLElement;
  /** Frame of the lower pane; the lowest has none. */
  readonly slot: HTMLElement | null;
  readonly summary: HTMLElement;
  /** Host of each row's plot, in the order of the rows. */
  readonly hosts: ReadonlyMap<string, HTMLElement>;
}

function part<E extends HTMLElement>(section: HTMLElement, name: string, kind: new () => E): E {
  const found = section.querySelector(`[data-part="${name}"]`);
  if (!(found instanceof kind)) throw new Error(`the pane has no ${name}`);
  return found;
}

/** Finds a pane's parts by their `data-part`. Throws where one is missing. */
export function paneDom(section: HTMLElement, rows: readonly Row[]): PaneDom {
  const slot = section.querySelector('[data-part="slot"]');
  const hosts = new Map(
    rows.map((row) => [row.key, part(section, `plot ${row.key}`, HTMLElement)] as const),
  );
  return {
    body: part(section, 'body', HTMLElement),
    under: part(section, 'under', HTMLCanvasElement),
    over: part(section, 'over', HTMLCanvasElement),
    stage: part(section, 'stage', HTMLElement),
    cursorLine: part(section, 'cursor-line', HTMLElement),
    cursorText: part(section, 'cursor-text', HTMLElement),
    slot: slot instanceof HTMLElement ? slot : null,
    summary: part(section, 'summary', HTMLElement),
    hosts,
  };
}

/** An element of a row's gutter, or null where the row has none of that kind. */
export function gutterPart(section: HTMLElement, name: string): HTMLElement | null {
  const found = section.querySelector(`[data-part="${name}"]`);
  return found instanceof HTMLElement ? found : null;
}
