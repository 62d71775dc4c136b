import { type Dialect, isDataCell, splitCells } from './text-cells';

/** How a text file is laid out, as far as its first lines tell. */
export interface TextLayout extends Dialect {
  readonly columns: number;
  /** True where the same lines could also be one column of numbers with decimal commas. */
  readonly ambiguous: boolean;
}

const DIALECTS: readonly Dialect[] = [
  { delimiter: 'tab', decimal: '.' },
  { delimiter: 'tab', decimal: ',' },
  { delimiter: 'semicolon', decimal: '.' },
  { delimiter: 'semicolon', decimal: ',' },
  { delimiter: 'comma', decimal: '.' },
  { delimiter: 'blanks', decimal: '.' },
  { delimiter: 'blanks', decimal: ',' },
];

const MOST_LINES = 200;
const LEAST_SHARE = 0.3;

interface Trial {
  readonly dialect: Dialect;
  readonly columns: number;
  /** Share of the lines that are rows of `columns` readable cells. */
  readonly share: number;
  /** True where the first line splits into as many cells. */
  readonly firstFits: boolean;
}

/**
 * The dialect under which most of the lines are rows of equally many readable cells; of equals the one whose header fits,
 * then the one with more columns. Null where under 30 % of the lines are such rows. Blank lines and comments (#) are not
 * counted.
 */
export function detectLayout(lines: readonly string[]): TextLayout | null {
  const sample = lines.filter((line) => !isSkipped(line)).slice(0, MOST_LINES);
  if (sample.length === 0) return null;
  const trials = DIALECTS.map((dialect) => tryDialect(sample, dialect));
  const best = trials.reduce((a, b) => (better(b, a) ? b : a));
  if (best.share < LEAST_SHARE) return null;
  const oneColumn = trials.some(
    (trial) =>
      trial.dialect.decimal === ',' &&
      trial.columns === 1 &&
      trial.share === best.share &&
      trial.firstFits === best.firstFits,
  );
  return {
    ...best.dialect,
    columns: best.columns,
    ambiguous: best.dialect.delimiter === 'comma' && best.columns === 2 && oneColumn,
  };
}

/** True for a line that holds no row: blank, or a comment that starts with #. */
export function isSkipped(line: string): boolean {
  return /^\s*(#|$)/.test(line);
}

function tryDialect(lines: readonly string[], dialect: Dialect): Trial {
  const counts = new Map<number, number>();
  for (const line of lines) {
    const cells = splitCells(line, dialect.delimiter);
    if (!cells.every((cell) => isDataCell(cell, dialect.decimal))) continue;
    if (cells.every((cell) => cell.trim() === '')) continue;
    counts.set(cells.length, (counts.get(cells.length) ?? 0) + 1);
  }
  let columns = 0;
  let most = 0;
  for (const [count, times] of counts) if (times > most) [columns, most] = [count, times];
  const first = splitCells(lines[0], dialect.delimiter).length;
  return { dialect, columns, share: most / lines.length, firstFits: first === columns };
}

function better(a: Trial, b: Trial): boolean {
  if (a.share !== b.share) return a.share > b.share;
  if (a.firstFits !== b.firstFits) return a.firstFits;
  return a.columns > b.columns;
}
