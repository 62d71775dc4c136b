import { parseClock, type Seconds } from '../units/time';

/** What stands between the cells of a row, and in a number between whole and fraction. */
export interface Dialect {
  readonly delimiter: 'tab' | 'semicolon' | 'comma' | 'blanks';
  readonly decimal: '.' | ',';
}

const MARKS = { tab: '\t', semicolon: ';', comma: ',' } as const;

/** Cells of one line; double quotes around a cell are taken off ("" inside stands for one, RFC 4180), blanks too. */
export function splitCells(line: string, delimiter: Dialect['delimiter']): string[] {
  if (line.includes('"')) return splitQuoted(line, delimiter);
  if (delimiter !== 'blanks') return line.split(MARKS[delimiter]);
  const trimmed = line.trim();
  return trimmed === '' ? [] : trimmed.split(/[ \t]+/);
}

function splitQuoted(line: string, delimiter: Dialect['delimiter']): string[] {
  const cells: string[] = [];
  let cell = '';
  let inside = false;
  const isMark = (c: string) =>
    delimiter === 'blanks' ? c === ' ' || c === '\t' : c === MARKS[delimiter];
  for (let i = 0; i < line.length; i += 1) {
    const c = line[i];
    if (c === '"' && inside && line[i + 1] === '"') {
      cell += c;
      i += 1;
    } else if (c === '"') inside = !inside;
    else if (!inside && isMark(c)) {
      if (delimiter !== 'blanks' || cell !== '') cells.push(cell.trim());
      cell = '';
    } else cell += c;
  }
  if (delimiter !== 'blanks' || cell !== '') cells.push(cell.trim());
  return cells;
}

const MISSING = new Set(['', 'nan', 'na', 'n/a', '-']);

/** Value of a cell: NaN where it says that nothing was measured (empty, NaN, NA, -), null where it is no number. */
export function readNumber(cell: string, decimal: Dialect['decimal']): number | null {
  const text = decimal === ',' ? withPoint(cell) : cell;
  const value = Number(text);
  const plain = Number.isFinite(value) && !/^\s*$|^\s*0[xob]/i.test(text);
  if (plain) return value;
  return MISSING.has(cell.trim().toLowerCase()) ? Number.NaN : null;
}

function withPoint(cell: string): string {
  return cell.includes('.') ? 'mixed' : cell.replace(',', '.');
}

/** Seconds of a clock cell h:mm:ss with or without a fraction; null where it is none. */
export function readClock(cell: string): Seconds | null {
  return /^\s*\d+:\d\d:\d\d([.,]\d+)?\s*$/.test(cell) ? parseClock(cell) : null;
}

/** True for a cell that a row of data can hold. */
export function isDataCell(cell: string, decimal: Dialect['decimal']): boolean {
  return readNumber(cell, decimal) !== null || readClock(cell) !== null;
}
