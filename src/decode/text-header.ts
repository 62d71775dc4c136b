import { microvoltsPerUnit } from '../units/voltage';
import { isDataCell, readClock, readNumber, splitCells } from './text-cells';
import { isSkipped, type TextLayout } from './text-dialect';

/** What stands above the first row of data. */
export interface TextHeader {
  /** Index of the first line (from 0) that is to be read as data. */
  readonly firstDataLine: number;
  /** One a column, blank where there is none; units in brackets taken off. */
  readonly names: readonly string[];
  /** One a column, blank where none is stated. */
  readonly units: readonly string[];
  /** Lines above the data that are neither names, units nor comments. */
  readonly otherLines: number;
}

/**
 * Reads names and units from the lines above the first row of data: none, a row of names (units in brackets or after an
 * underscore: "lead 1 (uV)", "lead1_uV"), or names and a row of units. A line that already holds numbers is data.
 */
export function readTextHeader(lines: readonly string[], layout: TextLayout): TextHeader {
  const above: { readonly at: number; readonly cells: readonly string[] }[] = [];
  let firstDataLine = 0;
  for (; firstDataLine < lines.length; firstDataLine += 1) {
    if (isSkipped(lines[firstDataLine])) continue;
    const cells = splitCells(lines[firstDataLine], layout.delimiter).map((cell) => cell.trim());
    if (isDataRow(cells, layout)) break;
    above.push({ at: firstDataLine, cells: fitted(lines[firstDataLine], cells, layout) });
  }
  const fits = above.filter(({ cells }) => cells.length === layout.columns);
  const last = fits.at(-1)?.cells ?? [];
  const isUnits = fits.length > 1 && isUnitsRow(last);
  const names = (isUnits ? fits.at(-2)?.cells : last) ?? [];
  const parted = names.map(partName);
  const unitsRow = isUnits ? last.map((unit) => unit.replace(/^[([]|[)\]]$/g, '').trim()) : [];
  const columns = Array.from({ length: layout.columns }, (_, i) => i);
  return {
    firstDataLine,
    names: columns.map((i) => parted[i]?.name ?? ''),
    units: columns.map((i) => (unitsRow[i] || parted[i]?.unit) ?? ''),
    otherLines: above.length - (names.length > 0 ? 1 : 0) - (isUnits ? 1 : 0),
  };
}

/** A row of data, perhaps with bad cells: as many cells as columns and at least one number or clock among them. */
function isDataRow(cells: readonly string[], { columns, decimal }: TextLayout): boolean {
  if (cells.length !== columns) return false;
  if (cells.every((cell) => isDataCell(cell, decimal))) return true;
  return cells.some((cell) => {
    const value = readNumber(cell, decimal);
    return (value !== null && !Number.isNaN(value)) || readClock(cell) !== null;
  });
}

/** Names with blanks inside, in a table parted by blanks, are parted by two or more. */
function fitted(line: string, cells: readonly string[], layout: TextLayout): readonly string[] {
  if (layout.delimiter !== 'blanks' || cells.length === layout.columns) return cells;
  const wide = line.trim().split(/\t+| {2,}/);
  return wide.length === layout.columns ? wide : cells;
}

const UNIT_WORD =
  /^[([]?\s*([munkµμ]?V|s|ms|us|µs|μs|sec|min|h|seconds|clock|h{1,2}:mm:ss(\.s+)?|a\.?u\.?|%|-|°C|C|ohm|kohm)?\s*[)\]]?$/;

function isUnitsRow(cells: readonly string[]): boolean {
  return cells.every((cell) => UNIT_WORD.test(cell)) && cells.some((cell) => cell !== '');
}

function partName(cell: string): { readonly name: string; readonly unit: string } {
  const bracket = /^(.*?)\s*[([]\s*([^()[\]]*?)\s*[)\]]$/.exec(cell);
  if (bracket) return { name: bracket[1].trim(), unit: bracket[2] };
  const suffix = /^(.+)_([a-zA-Zµμ]+)$/u.exec(cell);
  if (suffix && (microvoltsPerUnit(suffix[2]) !== null || /^(s|ms|us|sec)$/.test(suffix[2])))
    return { name: suffix[1], unit: suffix[2] };
  return { name: cell, unit: '' };
}
