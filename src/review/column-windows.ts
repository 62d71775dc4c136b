import type { TimeWindow } from './view-store';

/** A stretch of time cut into equal columns. */
export interface ColumnSpan extends TimeWindow {
  readonly columns: number;
}

/**
 * Columns to hold for a view `widthPx` wide: the window and as much again on both sides, a column a pixel, cut to the study
 * and laid on whole multiples of the column's width so that the same place gives the same columns.
 */
export function columnsWanted(view: TimeWindow, durationS: number, widthPx: number): ColumnSpan {
  const windowS = view.toS - view.fromS;
  const columnS = windowS / Math.max(1, Math.round(widthPx));
  const first = Math.floor(Math.max(0, view.fromS - windowS) / columnS);
  const last = Math.ceil(Math.min(durationS, view.toS + windowS) / columnS);
  const columns = Math.max(1, last - first);
  return { fromS: first * columnS, toS: (first + columns) * columnS, columns };
}

/**
 * Whether held columns still serve a view: they cover it with a quarter of a window to spare where the study has that much,
 * and are between 0.7 and 1.5 to a pixel.
 */
export function columnsServe(
  held: ColumnSpan,
  view: TimeWindow,
  durationS: number,
  widthPx: number,
): boolean {
  const windowS = view.toS - view.fromS;
  const spare = windowS / 4;
  const covers =
    held.fromS <= Math.max(0, view.fromS - spare) + 1e-9 &&
    held.toS >= Math.min(durationS, view.toS + spare) - 1e-9;
  const perPixel = (held.columns * windowS) / ((held.toS - held.fromS) * Math.max(1, widthPx));
  return covers && perPixel >= 0.7 && perPixel <= 1.5;
}
