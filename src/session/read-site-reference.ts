import { type Failure, Refusal } from '../recording/failure';
import { FIGURES, type FigureDefinition } from '../recording/figure-catalogue';
import {
  PHASE_KINDS,
  type PhaseKind,
  type SiteRange,
  type SiteReference,
} from '../recording/site-reference';
import { type Delimiter, delimiterOf, type TableRow, tableRows } from './table-cells';

/** Columns of the file; their order in it does not matter. */
export const REFERENCE_COLUMNS = [
  'figure',
  'phase',
  'min_minutes',
  'max_minutes',
  'posture',
  'meal',
  'low',
  'high',
  'unit',
  'population',
  'source',
] as const;
type Column = (typeof REFERENCE_COLUMNS)[number];

/** Something wrong with the file, where a spreadsheet shows it; row and column are null where the whole file is meant. */
export interface ReferenceFault {
  readonly row: number | null;
  readonly column: string | null;
  readonly words: string;
}

export type ReadReference =
  | { readonly ok: true; readonly reference: SiteReference }
  | { readonly ok: false; readonly faults: readonly ReferenceFault[] };

/** More ranges, or more letters, than a file kept by hand has. */
const MOST_RANGES = 2000;
const MOST_LETTERS = 1_000_000;
const LONGEST_TEXT = 300;

/** Keeps what is wrong with one row while it is read. */
interface RowReader {
  text(column: Column): string;
  fault(column: Column, words: string): void;
}

/**
 * Reads the reference values of a site: delimited text with a head line, comma, semicolon or tab between cells, decimal point
 * or, unless cells are parted by commas, decimal comma. Rows that begin with # are remarks. Either every row is good, or all
 * that is wrong is told.
 */
export function readSiteReference(text: string): ReadReference {
  const refused = (words: string): ReadReference => ({
    ok: false,
    faults: [{ row: null, column: null, words }],
  });
  if (text.length > MOST_LETTERS) return refused('The file is longer than a million letters.');
  if (text.includes('\u0000') || text.includes('\ufffd'))
    return refused('The file is no plain text in UTF-8. Save it as “CSV UTF-8” and open it again.');
  const plain = text.replace(/^\ufeff/, '');
  const head = plain.split('\n').find((line) => line.trim() !== '' && !/^"?#/.test(line.trim()));
  if (head === undefined) return refused('The file is empty.');
  const delimiter = delimiterOf(head);
  const rows = tableRows(plain, delimiter).filter(({ cells }) => !cells[0].startsWith('#'));
  const [names, ...body] = rows;
  const faults = headFaults(names);
  if (faults.length > 0) return { ok: false, faults };
  if (body.length === 0) return refused('The file has a head line but no ranges below it.');
  if (body.length > MOST_RANGES) return refused(`The file has over ${MOST_RANGES} ranges.`);
  const ranges = body.flatMap((row) => rangeOf(row, names.cells, delimiter, faults));
  return faults.length > 0 ? { ok: false, faults } : { ok: true, reference: { ranges } };
}

function headFaults({ row, cells }: TableRow): ReferenceFault[] {
  const names = cells.map((cell) => cell.toLowerCase());
  const known: readonly string[] = REFERENCE_COLUMNS;
  const missing = REFERENCE_COLUMNS.filter((column) => !names.includes(column));
  const strange = names.filter((name) => name !== '' && !known.includes(name));
  const twice = names.filter((name, i) => name !== '' && names.indexOf(name) < i);
  return [
    ...missing.map((column) => ({ row, column, words: 'This column is missing.' })),
    ...strange.map((column) => ({ row, column, words: 'There is no such column.' })),
    ...twice.map((column) => ({ row, column, words: 'This column is there twice.' })),
  ];
}

/** The range of a row in a list of one; [] where something in it is wrong, which is added to `faults`. */
function rangeOf(
  { row, cells }: TableRow,
  names: readonly string[],
  delimiter: Delimiter,
  faults: ReferenceFault[],
): readonly SiteRange[] {
  const before = faults.length;
  const reader: RowReader = {
    text: (column) => cells[names.findIndex((name) => name.toLowerCase() === column)] ?? '',
    fault: (column, words) => faults.push({ row, column, words }),
  };
  if (cells.slice(names.length).some((cell) => cell !== ''))
    faults.push({ row, column: null, words: 'The row has more cells than the head line.' });
  const numberIn = (column: Column) => readNumber(reader, column, delimiter);
  const definition = readFigure(reader);
  const phase = readPhase(reader);
  const [minMinutes, maxMinutes] = readMinutes(reader, numberIn);
  const [low, high] = readLimits(reader, numberIn);
  if (definition) checkUnit(reader, definition);
  const words = (column: Column) => readWords(reader, column);
  const range = {
    posture: words('posture'),
    meal: words('meal'),
    population: words('population'),
    source: words('source'),
  };
  if (range.source === '') reader.fault('source', 'Name where the range comes from.');
  if (faults.length > before || !definition || !phase) return [];
  return [{ figure: definition.key, phase, minMinutes, maxMinutes, low, high, ...range }];
}

function readFigure({ text, fault }: RowReader): FigureDefinition | null {
  const key = text('figure');
  const found = FIGURES.find((figure) => figure.key === key.toLowerCase());
  if (!found)
    fault('figure', `${quoted(key)} is no key of a figure; the README lists them (df_median_cpm).`);
  return found ?? null;
}

function readPhase({ text, fault }: RowReader): PhaseKind | null {
  const name = text('phase');
  const found = PHASE_KINDS.find((kind) => kind === name.toLowerCase());
  if (!found) fault('phase', `${quoted(name)} is none of ${PHASE_KINDS.join(', ')}.`);
  return found ?? null;
}

type NumberIn = (column: Column) => number | null;

function readMinutes({ text, fault }: RowReader, numberIn: NumberIn): readonly [number, number] {
  const [least, most] = (['min_minutes', 'max_minutes'] as const).map((column) => {
    const minutes = numberIn(column);
    if (text(column) === '') fault(column, 'Say how long a phase it holds for, in minutes.');
    else if (minutes !== null && !(minutes > 0)) fault(column, 'Minutes are above 0.');
    return minutes ?? Number.NaN;
  });
  if (least > most) fault('max_minutes', 'max_minutes is below min_minutes.');
  return [least, most];
}

function readLimits(
  { text, fault }: RowReader,
  numberIn: NumberIn,
): readonly [number | null, number | null] {
  const [low, high] = [numberIn('low'), numberIn('high')];
  if (text('low') === '' && text('high') === '') fault('low', 'Give low, high or both.');
  if (low !== null && high !== null && low > high) fault('high', 'high is below low.');
  return [low, high];
}

/** Null where the cell is empty or holds no number, which is a fault. */
function readNumber(
  { text, fault }: RowReader,
  column: Column,
  delimiter: Delimiter,
): number | null {
  const cell = text(column);
  if (cell === '') return null;
  const point = delimiter === ',' ? cell : cell.replace(/^([^.,]*),(\d+)$/, '$1.$2');
  const usual = point.replace('−', '-');
  if (/^[+-]?\d+(\.\d+)?$/.test(usual)) return Number(usual);
  fault(column, `${quoted(cell)} is no number (write 3.75).`);
  return null;
}

/** Units as people type them, in one spelling. */
const unitOf = (text: string): string =>
  text
    .toLowerCase()
    .replaceAll('²', '2')
    .replaceAll(/[\^\s]/g, '');

function checkUnit({ text, fault }: RowReader, { unit }: FigureDefinition): void {
  const typed = unitOf(text('unit'));
  const allowed = [unitOf(unit), ...(unit === '% of time' ? ['%'] : [])];
  if (allowed.includes(typed)) return;
  fault(
    'unit',
    unit === ''
      ? `The figure has no unit; leave ${quoted(text('unit'))} out.`
      : `The figure is in ${unit}, not ${quoted(text('unit'))}.`,
  );
}

function readWords({ text, fault }: RowReader, column: Column): string {
  const words = text(column).replaceAll(/\s+/g, ' ');
  if (words.length > LONGEST_TEXT) fault(column, `Over ${LONGEST_TEXT} letters.`);
  return words;
}

const quoted = (text: string): string =>
  text === '' ? 'an empty cell' : `“${text.length > 40 ? `${text.slice(0, 40)}…` : text}”`;

/** Where a fault is and what it is: "row 4, column high: “abc” is no number (write 3.75)." */
export function faultWords({ row, column, words }: ReferenceFault): string {
  const place = [
    ...(row === null ? [] : [`row ${row}`]),
    ...(column === null ? [] : [`column ${column}`]),
  ];
  return place.length === 0 ? words : `${place.join(', ')}: ${words}`;
}

const MOST_TOLD = 12;

/** What is wrong, line by line, and how many more there are beyond what a person mends at a time. */
export function faultList(faults: readonly ReferenceFault[]): readonly string[] {
  const more = faults.length - MOST_TOLD;
  return [...faults.slice(0, MOST_TOLD).map(faultWords), ...(more > 0 ? [`and ${more} more`] : [])];
}

/** The reference values of a site's file. Throws a Refusal that names row and column. */
export function siteReferenceOf(text: string, fileName: string): SiteReference {
  const read = readSiteReference(text);
  if (read.ok) return read.reference;
  const failure: Failure = {
    kind: 'wrong-input',
    message: `${fileName} holds no reference values that can be used. ${faultList(read.faults).join(' ')}`,
    place: null,
    remedy: 'The README describes the file. Mend these places and give it again.',
  };
  throw new Refusal(failure);
}
