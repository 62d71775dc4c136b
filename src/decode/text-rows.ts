import { GrowingColumn } from './growing-column';
import { quoted, refusal } from './refusals';
import { readClock, readNumber, splitCells } from './text-cells';
import { isSkipped, type TextLayout } from './text-dialect';
import type { TextHeader } from './text-header';
import { lineBatches, type TextEncoding } from './text-lines';
import type { TimeColumn } from './text-time-column';

/** What is to be read from a text file, and how. */
export interface RowsPlan {
  readonly fileName: string;
  readonly encoding: TextEncoding;
  readonly layout: TextLayout;
  readonly header: TextHeader;
  readonly time: TimeColumn;
  /** Columns that hold samples, in order. */
  readonly signalColumns: readonly number[];
}

/** The numbers of all rows. */
export interface TextRows {
  /** Seconds as written, one a row; null without a time column. */
  readonly timesS: Float64Array | null;
  /** One array a signal column, in the file's unit; NaN where a cell says that nothing was measured. */
  readonly signals: readonly Float64Array[];
  /** Line of the file (from 1) of each row's cells is firstLine + row where no line was skipped in between. */
  readonly lineOf: (row: number) => number;
  readonly blankLines: number;
  readonly comments: number;
  readonly lastRowCut: boolean;
}

/**
 * Reads all rows of a text file slice by slice into growing columns. Throws a Refusal that names row and column where a cell
 * is no number, or where a row has another number of cells; a last row cut off in the middle is left out and said.
 */
export async function readRows(file: Blob, plan: RowsPlan): Promise<TextRows> {
  const reader = new RowReader(plan);
  for await (const batch of lineBatches(file, plan.fileName, plan.encoding))
    for (let i = 0; i < batch.lines.length; i += 1)
      reader.line(batch.lines[i], batch.lastUnclosed && i === batch.lines.length - 1);
  return reader.result();
}

class RowReader {
  private readonly signals: GrowingColumn[];
  private readonly times = new GrowingColumn();
  /** Rows at which the distance between row and line number changes, and that distance. */
  private readonly shifts: { row: number; shift: number }[] = [];
  private lineNumber = 0;
  private rows = 0;
  private pendingBlanks = 0;
  private blankLines = 0;
  private comments = 0;
  private lastRowCut = false;
  private dayS = 0;
  private lastClockS = 0;

  constructor(private readonly plan: RowsPlan) {
    this.signals = plan.signalColumns.map(() => new GrowingColumn());
  }

  line(text: string, unclosed: boolean): void {
    this.lineNumber += 1;
    if (isSkipped(text)) {
      if (text.trim() !== '') this.comments += 1;
      else if (this.rows > 0) this.pendingBlanks += 1;
      return;
    }
    const { header, layout } = this.plan;
    if (this.lineNumber <= header.firstDataLine) return;
    const cells = splitCells(text, layout.delimiter);
    if (cells.length !== layout.columns) {
      if (unclosed && cells.length < layout.columns) {
        this.lastRowCut = true;
        return;
      }
      throw this.badRow(cells.length);
    }
    this.settleBlanks();
    this.row(cells);
  }

  /** Blank lines are missing samples in a table of one column, and nothing in a wider one. */
  private settleBlanks(): void {
    if (this.plan.layout.columns === 1)
      for (let i = 0; i < this.pendingBlanks; i += 1) {
        this.signals[0]?.push(Number.NaN);
        this.rows += 1;
      }
    else this.blankLines += this.pendingBlanks;
    this.pendingBlanks = 0;
  }

  private row(cells: readonly string[]): void {
    const { time, signalColumns, layout } = this.plan;
    const shift = this.lineNumber - this.rows;
    if (this.shifts.at(-1)?.shift !== shift) this.shifts.push({ row: this.rows, shift });
    if (time.kind === 'number' || time.kind === 'clock') this.times.push(this.timeOf(cells));
    for (let i = 0; i < signalColumns.length; i += 1) {
      const cell = cells[signalColumns[i]];
      const value = readNumber(cell, layout.decimal);
      if (value === null) throw this.badCell(signalColumns[i], cell, 'is no number');
      this.signals[i].push(value);
    }
    this.rows += 1;
  }

  private timeOf(cells: readonly string[]): number {
    const { time, layout } = this.plan;
    if (time.kind === 'clock') {
      const clock = readClock(cells[time.column]);
      if (clock === null) throw this.badCell(time.column, cells[time.column], 'is no time h:mm:ss');
      if (this.rows > 0 && clock < this.lastClockS - 43_200) this.dayS += 86_400;
      this.lastClockS = clock;
      return clock + this.dayS;
    }
    if (time.kind !== 'number') throw new Error('no time column to read');
    const value = readNumber(cells[time.column], layout.decimal);
    if (value === null || Number.isNaN(value))
      throw this.badCell(time.column, cells[time.column], 'is no time');
    return value * time.secondsPerUnit;
  }

  private badRow(count: number) {
    const { fileName, layout } = this.plan;
    return refusal('broken-format', fileName, {
      message: `row ${this.lineNumber} has ${count} ${count === 1 ? 'cell' : 'cells'}, the others have ${layout.columns}.`,
      place: `row ${this.lineNumber}`,
      remedy: 'Mend or delete this row and open the file again.',
    });
  }

  private badCell(column: number, cell: string, what: string) {
    const { fileName, header } = this.plan;
    const name = header.names[column] ? ` (${quoted(header.names[column])})` : '';
    return refusal('broken-format', fileName, {
      message: `the cell ${quoted(cell)} in row ${this.lineNumber}, column ${column + 1}${name} ${what}.`,
      place: `row ${this.lineNumber}, column ${column + 1}`,
      remedy:
        'Mend the cell, or leave it empty where nothing was measured, and open the file again.',
    });
  }

  result(): TextRows {
    const { shifts } = this;
    return {
      timesS: this.times.length > 0 ? this.times.take() : null,
      signals: this.signals.map((column) => column.take()),
      lineOf: (row) => row + (shifts.findLast((one) => one.row <= row)?.shift ?? 1),
      blankLines: this.blankLines,
      comments: this.comments,
      lastRowCut: this.lastRowCut,
    };
  }
}
