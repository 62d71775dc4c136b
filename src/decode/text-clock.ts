import type { FoundInFile } from '../recording/recording';
import type { Hertz } from '../units/rate';
import { evenGrid, type GridFault, isGridFault } from './even-grid';
import { refusal } from './refusals';
import type { TextReading } from './text-reading';
import type { TextRows } from './text-rows';

/** The rate of a text file and, where its times jump, the place of each row. */
export interface TextClock {
  readonly rateHz: Hertz;
  readonly places: Float64Array | null;
  readonly length: number;
}

/**
 * The rate a person gave, else the one of the time column. Throws a Refusal of kind `needs-reading` where neither says it, and
 * `broken-format` where the times do not rise evenly.
 */
export function textClock(
  fileName: string,
  rows: TextRows,
  reading: TextReading | null,
  found: FoundInFile[],
): TextClock {
  const length = rows.signals[0].length;
  if (length < 3)
    throw refusal('wrong-input', fileName, {
      message: `the table has ${length} rows of samples, too few for a recording.`,
      place: null,
      remedy: 'Choose the file that holds the recording itself.',
    });
  const given = reading?.rateHz ?? null;
  if (given !== null) return { rateHz: checkedRate(fileName, given), places: null, length };
  if (rows.timesS === null)
    throw refusal('needs-reading', fileName, {
      message: 'the table has no time column, so its sampling rate is not known.',
      place: null,
      remedy: 'Give the rate in samples a second.',
    });
  const grid = evenGrid(rows.timesS);
  if (isGridFault(grid)) throw unevenTimes(fileName, grid, rows);
  const jitterMs = grid.jitterS * 1000;
  if (grid.jitterS * grid.rateHz > 0.02)
    found.push({
      severity: 'note',
      what: `the times scatter by up to ${Number(jitterMs.toPrecision(2))} ms around even steps of ${Number((1000 / grid.rateHz).toPrecision(6))} ms; the rows were taken as evenly spaced`,
      place: 'time column',
    });
  if (grid.places !== null)
    found.push({
      severity: 'warning',
      what: `the times jump; ${grid.length - length} missing rows were left as gaps`,
      place: 'time column',
    });
  return grid;
}

function checkedRate(fileName: string, rateHz: number): Hertz {
  if (Number.isFinite(rateHz) && rateHz > 0 && rateHz <= 1e6) return rateHz;
  throw refusal('needs-reading', fileName, {
    message: `a rate of ${rateHz} samples a second cannot be.`,
    place: 'rate',
    remedy: 'Give the rate as a positive number of samples a second.',
  });
}

function unevenTimes(fileName: string, fault: GridFault, rows: TextRows) {
  const row = fault.kind === 'too-few' ? null : rows.lineOf(fault.row);
  const ms = (seconds: number) => `${Number((1000 * seconds).toPrecision(4))} ms`;
  const words = {
    'too-few': () => 'the table has fewer than three rows, so no rate can be read from its times.',
    'not-rising': () => `the time in row ${row} is not later than in the row before.`,
    'huge-jump': (one: GridFault) =>
      one.kind === 'huge-jump'
        ? `the time jumps by ${one.jumpS} s at row ${row}, far more than the recording lasts.`
        : '',
    uneven: (one: GridFault) =>
      one.kind === 'uneven'
        ? `the rows are not evenly spaced: row ${row} comes ${ms(one.stepS)} after the row before, most come after ${ms(one.usualS)}.`
        : '',
  } satisfies Record<GridFault['kind'], (one: GridFault) => string>;
  return refusal('broken-format', fileName, {
    message: words[fault.kind](fault),
    place: row === null ? null : `row ${row}, time column`,
    remedy: 'Mend the time column, or give the rate, which is then used instead of it.',
  });
}
