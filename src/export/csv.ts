import { writeNumber } from './write-number';

/** A cell: text, a number with its decimals, or null where there is nothing to say. */
export type Cell = string | WrittenNumber | null;

/** A number on its way into a cell; where there is none (null, undefined, NaN) the cell stays empty. */
export interface WrittenNumber {
  readonly value: number | null;
  readonly decimals: number;
}

/** A number cell. */
export const numberCell = (value: number | null | undefined, decimals: number): WrittenNumber => ({
  value: value ?? null,
  decimals,
});

/** A time in seconds from the start of the recording: 6 decimals. */
export const timeCell = (seconds: number | null): WrittenNumber => numberCell(seconds, 6);

/** A flag: 1 or 0. */
export const flagCell = (flag: boolean): WrittenNumber => numberCell(flag ? 1 : 0, 0);

/**
 * The text of a delimited file by RFC 4180, but with line feeds alone: header first, each row as long as the header. A text
 * cell that a spreadsheet would run as a formula (it begins with = + - @) gets an apostrophe before it. Throws Error where a
 * row has another length.
 */
export function csvText(header: readonly string[], rows: Iterable<readonly Cell[]>): string {
  const lines = [header.map(cellText).join(',')];
  for (const row of rows) {
    if (row.length !== header.length)
      throw new Error(`a row of ${row.length} under ${header.length} names`);
    lines.push(row.map(cellText).join(','));
  }
  return `${lines.join('\n')}\n`;
}

function cellText(cell: Cell): string {
  if (cell === null) return '';
  if (typeof cell === 'string') return quoted(/^[=+\-@]/.test(cell) ? `'${cell}` : cell);
  if (cell.value === null || Number.isNaN(cell.value)) return '';
  return writeNumber(cell.value, cell.decimals);
}

function quoted(text: string): string {
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
