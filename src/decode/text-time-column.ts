import { isDataCell, readClock, readNumber, splitCells } from './text-cells';
import { isSkipped, type TextLayout } from './text-dialect';
import type { TextHeader } from './text-header';

/** Which column says when, and how it is read. */
export type TimeColumn =
  | { readonly kind: 'none' }
  /** A column that only counts rows. */
  | { readonly kind: 'counter'; readonly column: number }
  | {
      readonly kind: 'number';
      readonly column: number;
      readonly secondsPerUnit: number;
      /** How the unit is known: stated in the file, or taken for seconds. */
      readonly unitStated: boolean;
      /** False where only its even rise shows that it is a time. */
      readonly named: boolean;
    }
  | { readonly kind: 'clock'; readonly column: number };

const SECONDS_PER: Readonly<Record<string, number>> = {
  s: 1,
  sec: 1,
  secs: 1,
  second: 1,
  seconds: 1,
  ms: 1e-3,
  msec: 1e-3,
  milliseconds: 1e-3,
  us: 1e-6,
  min: 60,
  minutes: 60,
  h: 3600,
  hours: 3600,
};

const TIME_NAME = /^(t|time|times|timestamp|elapsed|clock|s|ms|sec|seconds|msec|milliseconds)$/i;
const COUNTER_NAME = /^(#|n|i|no|nr|row|index|idx|sample|samples|counter)\.?$/i;

/**
 * Finds the time column: by its name; by clock cells in the first column; or, where the first column has no name, by its
 * even rise, which by exactly 1 is taken for a counter of rows. `lines` are the first lines of the file.
 */
export function findTimeColumn(
  lines: readonly string[],
  layout: TextLayout,
  header: TextHeader,
): TimeColumn {
  const rows = firstRows(lines, layout, header);
  const named = header.names.findIndex((name) => TIME_NAME.test(firstWord(name)));
  const column = Math.max(0, named);
  const cells = rows.map((row) => row[column]);
  if (cells.length > 0 && cells.every((cell) => readClock(cell) !== null))
    return { kind: 'clock', column };
  if (named >= 0) {
    const unit = header.units[column] || header.names[column].toLowerCase();
    const secondsPerUnit = secondsPer(unit);
    return {
      kind: 'number',
      column,
      secondsPerUnit: secondsPerUnit ?? 1,
      unitStated: secondsPerUnit !== null,
      named: true,
    };
  }
  if (layout.columns > 1 && COUNTER_NAME.test(header.names[0]))
    return { kind: 'counter', column: 0 };
  if (layout.columns < 2 || header.names[0] !== '') return { kind: 'none' };
  const values = cells.map((cell) => readNumber(cell, layout.decimal) ?? Number.NaN);
  const step = evenStep(values);
  if (step === null) return { kind: 'none' };
  if (step === 1 && values.every(Number.isInteger)) return { kind: 'counter', column: 0 };
  const stated = secondsPer(header.units[0]);
  return {
    kind: 'number',
    column: 0,
    secondsPerUnit: stated ?? 1,
    unitStated: stated !== null,
    named: false,
  };
}

const firstWord = (name: string): string => /^[^\s_]*/.exec(name)?.[0] ?? '';

function secondsPer(unit: string): number | null {
  const text = unit
    .trim()
    .toLowerCase()
    .replace(/^[\u00b5\u03bc]/u, 'u');
  return Object.hasOwn(SECONDS_PER, text) ? SECONDS_PER[text] : null;
}

function firstRows(lines: readonly string[], layout: TextLayout, header: TextHeader): string[][] {
  return lines
    .slice(header.firstDataLine)
    .filter((line) => !isSkipped(line))
    .slice(0, 100)
    .map((line) => splitCells(line, layout.delimiter))
    .filter(
      (cells) =>
        cells.length === layout.columns && cells.every((cell) => isDataCell(cell, layout.decimal)),
    );
}

/** The usual step of numbers that rise evenly (each step within half of it, a jump here and there aside), else null. */
function evenStep(values: readonly number[]): number | null {
  const steps = values.slice(1).map((value, i) => value - values[i]);
  if (steps.length < 4 || !steps.every((step) => step > 0)) return null;
  const usual = [...steps].sort((a, b) => a - b)[Math.floor(steps.length / 2)];
  const even = steps.filter((step) => Math.abs(step - usual) <= usual / 2);
  return even.length >= 0.9 * steps.length ? usual : null;
}
