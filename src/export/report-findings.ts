import type { FigureValue } from '../recording/figure';
import { FIGURES, type FigureDefinition, type Organ } from '../recording/figure-catalogue';
import { changeWords, figureWords } from '../recording/figure-words';
import type { FigureChange, Findings, PhaseFindings } from '../recording/findings';
import { isFasting, isFed, isMeal } from '../recording/phase';
import {
  type RangesFor,
  rangeGrounds,
  rangeWords,
  SITE_REFERENCE,
} from '../recording/site-reference';
import { createNotes, inTurn, type Note, type Notes } from './report-notes';

/** A column of figures: those of a phase or part, or what changed from fasting to a phase. */
export type FindingsColumn =
  | { readonly kind: 'phase'; readonly name: string }
  | { readonly kind: 'change'; readonly name: string };

/** One printed value with the letters of its notes. */
export interface FindingsCell {
  readonly kind: 'value' | 'withheld' | 'not-compared';
  readonly words: string;
  /** Said in the cell itself, after the value: a change in decibel as a factor. */
  readonly small: string;
  /** The ranges that the site keeps for this figure in this phase; their letters say what they hold for. */
  readonly ranges: readonly string[];
  readonly letters: readonly string[];
}

export interface FindingsRow {
  readonly key: string;
  readonly name: string;
  /** Letters of what holds for the figure in every column. */
  readonly letters: readonly string[];
  /** In the order of the table's columns. */
  readonly cells: readonly FindingsCell[];
}

export interface FindingsGroup {
  readonly organ: Organ;
  readonly title: string;
  readonly rows: readonly FindingsRow[];
  /** What else was different in the same minutes and may explain a change above. */
  readonly beside: readonly FindingsRow[];
}

export interface FindingsTable {
  readonly columns: readonly FindingsColumn[];
  readonly groups: readonly FindingsGroup[];
  readonly notes: readonly Note[];
  /** Names of the phase columns where notes give counts in their order; empty where there is one column only. */
  readonly inOrderOf: readonly string[];
  /** True where a change column holds dashes for figures that are never compared. */
  readonly hasNotCompared: boolean;
  readonly hasWithheld: boolean;
  /** True where ranges of the site stand beside figures. */
  readonly hasRanges: boolean;
  /** Ranges by chance that stand beneath the values, by `placeOf`; empty where none are told. */
  readonly chances: Readonly<Record<string, string>>;
}

/** Fed phases side by side in one table; more of them go into a table below. */
const FED_IN_A_TABLE = 2;

const TITLES: Readonly<Record<Organ, string>> = {
  stomach: 'Stomach',
  heart: 'Heart',
  breathing: 'Breathing and movement',
};

/** Whether a figure may explain a change of an organ's figures: breathing and movement may, and heart rate for the stomach. */
const explains = (figure: FigureDefinition, organ: Organ): boolean =>
  figure.main &&
  (figure.organ === 'breathing' || (organ === 'stomach' && figure.key === 'heart_rate_bpm'));

/** Rows of one organ before they have values. */
interface WantedGroup {
  readonly organ: Organ;
  readonly figures: readonly FigureDefinition[];
  readonly beside: readonly FigureDefinition[];
}

/**
 * The main figures of stomach and heart before and after the meal, with what else moved in the same minutes. Meals are left
 * out. One table, or more where a long study has many fed phases; fasting stands first in each.
 */
export function mainTables(findings: Findings, ranges: RangesFor): readonly FindingsTable[] {
  const organs: readonly Organ[] = ['stomach', 'heart'];
  const groups = organs.map((organ) => ({
    organ,
    figures: FIGURES.filter((figure) => figure.main && figure.organ === organ),
    beside: FIGURES.filter((figure) => explains(figure, organ)),
  }));
  return tablesOf(findings, groups, ranges);
}

/** Every figure that mainTables leaves out, in the order of the catalogue. */
export function otherTables(findings: Findings, ranges: RangesFor): readonly FindingsTable[] {
  const others = FIGURES.filter(({ main }) => !main);
  const organs = [...new Set(others.map(({ organ }) => organ))];
  const groups = organs.map((organ) => ({
    organ,
    figures: others.filter((figure) => figure.organ === organ),
    beside: [],
  }));
  return tablesOf(findings, groups, ranges);
}

function tablesOf(
  findings: Findings,
  wanted: readonly WantedGroup[],
  ranges: RangesFor,
): readonly FindingsTable[] {
  return partsSideBySide(findings.phases).map((parts) => {
    const notes = createNotes();
    const columns = columnsOf(parts, findings.changes);
    const row = (figure: FigureDefinition) =>
      rowOf(figure, { columns, parts, findings, notes, ranges });
    const groups = wanted.map(({ organ, figures, beside }) => ({
      organ,
      title: TITLES[organ],
      rows: figures.map(row),
      beside: beside.map(row),
    }));
    const cells = groups
      .flatMap(({ rows, beside }) => [...rows, ...beside])
      .flatMap((one) => one.cells);
    return {
      columns,
      groups,
      notes: notes.list(),
      inOrderOf: parts.length > 1 ? parts.map(({ name }) => name) : [],
      hasNotCompared: cells.some(({ kind }) => kind === 'not-compared'),
      hasWithheld: cells.some(({ kind }) => kind === 'withheld'),
      hasRanges: cells.some((cell) => cell.ranges.length > 0),
      chances: {},
    };
  });
}

/** The parts of each table: those before the first meal, then the fed phases with their halves, a few at a time. */
function partsSideBySide(phases: readonly PhaseFindings[]): readonly (readonly PhaseFindings[])[] {
  const shown = phases.filter((part) => !isMeal({ ...part, name: part.phase }));
  const ofFed = (part: PhaseFindings) => isFed({ ...part, name: part.phase });
  const first = shown.filter((part) => !ofFed(part));
  const fed = [...new Set(shown.filter(ofFed).map(({ phase }) => phase))];
  if (fed.length === 0) return [first];
  const tables: (readonly PhaseFindings[])[] = [];
  for (let from = 0; from < fed.length; from += FED_IN_A_TABLE) {
    const some = fed.slice(from, from + FED_IN_A_TABLE);
    const before = from === 0 ? first : first.filter(isFasting);
    tables.push([...before, ...shown.filter(({ phase }) => some.includes(phase))]);
  }
  return tables;
}

/** A whole fed phase is followed by its change against fasting; its halves carry none. */
function columnsOf(
  parts: readonly PhaseFindings[],
  changes: readonly FigureChange[],
): readonly FindingsColumn[] {
  return parts.flatMap((part): readonly FindingsColumn[] => {
    const { name } = part;
    const compared = isFed(part) && changes.some(({ to }) => to === name);
    return [{ kind: 'phase', name }, ...(compared ? [{ kind: 'change', name } as const] : [])];
  });
}

interface RowContext {
  readonly columns: readonly FindingsColumn[];
  readonly parts: readonly PhaseFindings[];
  readonly findings: Findings;
  readonly notes: Notes;
  readonly ranges: RangesFor;
}

function rowOf(figure: FigureDefinition, context: RowContext): FindingsRow {
  const { columns, parts, findings, notes, ranges } = context;
  const values = parts.map(({ figures }) => figures[figure.key]);
  const texts = rowTexts(values);
  const letters = texts.shared.map((text) => notes.letterOf(text));
  const cells = columns.map(({ kind, name }) => {
    if (kind === 'change') {
      const change = findings.changes.find(({ key, to }) => key === figure.key && to === name);
      return changeCell(change?.value, figure, notes);
    }
    const place = parts.findIndex((part) => part.name === name);
    const cell = phaseCell(values[place], figure, texts.own[place], notes);
    return withRanges(cell, ranges(figure.key, parts[place]), notes);
  });
  return { key: figure.key, name: nameOf(figure), letters, cells };
}

const nameOf = ({ label, unit }: FigureDefinition): string =>
  unit === '' ? label : `${label} (${unit})`;

/** What is said beside a figure: what it stands on, and its marks. */
function textsOf(value: FigureValue | undefined): readonly string[] {
  if (value?.kind === 'number')
    return [...(value.basis === null ? [] : [value.basis]), ...value.marks];
  if (value?.kind === 'count') return [`${value.what}, not percent`, ...value.marks];
  return [];
}

/** What is said beside a row's figures: `shared` once for the row, `own` in each column. */
interface RowTexts {
  readonly shared: readonly string[];
  readonly own: readonly (readonly string[])[];
}

/**
 * Parts the texts of a row: those that every number of it carries, alike or differing in their counts only, belong to the
 * row; the others stay in their cells.
 */
function rowTexts(values: readonly (FigureValue | undefined)[]): RowTexts {
  const numbers = values.filter((value) => value?.kind === 'number').length;
  const shapes = values.map((value) =>
    value?.kind === 'number' ? textsOf(value).map(shapeOf) : [],
  );
  const inAll = (shape: string) => shapes.filter((some) => some.includes(shape)).length === numbers;
  const first = shapes.find((some) => some.length > 0) ?? [];
  const common = [...new Set(first)].filter(inAll);
  const textOf = (shape: string) => (value: FigureValue | undefined, column: number) => {
    const place = shapes[column].indexOf(shape);
    return place < 0 ? null : textsOf(value)[place];
  };
  const shared = common.map((shape) => inTurn(values.map(textOf(shape))));
  const own = values.map((value, column) =>
    textsOf(value).filter((_, place) => {
      const shape = shapes[column][place];
      return !common.includes(shape) || shapes[column].indexOf(shape) !== place;
    }),
  );
  return { shared, own };
}

/** A text without its numbers and plurals: two texts of one shape say the same of two columns. */
const shapeOf = (text: string): string => text.replaceAll(/[\d.]+/g, '#').replaceAll(/s\b/g, '');

function phaseCell(
  value: FigureValue | undefined,
  figure: FigureDefinition,
  texts: readonly string[],
  notes: Notes,
): FindingsCell {
  const { large, small } = figureWords(value, figure);
  const withheld = !value || value.kind === 'withheld';
  const letters = (withheld ? small : texts).map((text) => notes.letterOf(text));
  return { kind: withheld ? 'withheld' : 'value', words: large, small: '', ranges: [], letters };
}

/** A cell with the site's ranges and the letters of what they hold for. */
function withRanges(cell: FindingsCell, ranges: ReturnType<RangesFor>, notes: Notes): FindingsCell {
  const grounds = ranges.map((range) =>
    notes.letterOf(`${SITE_REFERENCE}: ${rangeGrounds(range)}`),
  );
  return {
    ...cell,
    ranges: [...new Set(ranges.map(rangeWords))],
    letters: [...cell.letters, ...grounds],
  };
}

function changeCell(
  value: FigureValue | undefined,
  figure: FigureDefinition,
  notes: Notes,
): FindingsCell {
  if (figure.change === 'none' || !value)
    return { kind: 'not-compared', words: '–', small: '', ranges: [], letters: [] };
  const { large, small } = changeWords(value, figure);
  if (value.kind !== 'number') {
    const kind = value.kind === 'withheld' ? 'withheld' : 'value';
    const letters = small.map((text) => notes.letterOf(text));
    return { kind, words: large, small: '', ranges: [], letters };
  }
  const letters = value.marks.map((text) => notes.letterOf(text));
  return { kind: 'value', words: large, small: value.basis ?? '', ranges: [], letters };
}
