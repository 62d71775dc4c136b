import type { FoundInFile, Recording, SignalSource } from '../recording/recording';
import { readBytes } from './file-bytes';
import { refusal } from './refusals';
import { type TextChannel, textChannels } from './text-channels';
import { textClock } from './text-clock';
import { detectLayout, type TextLayout } from './text-dialect';
import { HEAD_BYTES, headLines } from './text-head';
import { readTextHeader, type TextHeader } from './text-header';
import type { TextEncoding } from './text-lines';
import type { TextReading } from './text-reading';
import { readRows, type TextRows } from './text-rows';
import { gapsOf, memorySource, textChannel } from './text-source';
import { findTimeColumn, type TimeColumn } from './text-time-column';

/**
 * Opens a table of samples as text: comma, semicolon, tab or blanks between cells, decimal point or comma, with or without
 * names, a row of units and a time column (s, ms, clock). Missing values become NaN and gaps. Samples are kept in memory, 8
 * bytes each. Throws a Refusal that names row and column, or asks for the rate or the unit where nothing says it.
 */
export async function openDelimitedText(
  file: Blob,
  fileName: string,
  reading: TextReading | null,
): Promise<SignalSource> {
  const { encoding, lines } = headLines(await readBytes(file, fileName, 0, HEAD_BYTES));
  const layout = detectLayout(lines);
  if (!layout)
    throw refusal('wrong-input', fileName, {
      message: 'this is text, but its lines are no table of numbers with equally many cells.',
      place: 'row 1',
      remedy: 'Export the recording as one row a sample, one column a lead.',
    });
  const found: FoundInFile[] = [];
  const header = readTextHeader(lines, layout);
  const time = findTimeColumn(lines, layout, header);
  nameLayout(layout, header, time, encoding, found);
  const channels = textChannels({ fileName, lines, layout, header, time, reading }, found);
  if (time.kind === 'none' || time.kind === 'counter') refuseWithoutRate(fileName, time, reading);
  const rows = await readRows(file, {
    fileName,
    encoding,
    layout,
    header,
    time,
    signalColumns: channels.map((channel) => channel.column),
  });
  nameRows(rows, found);
  const clock = textClock(fileName, rows, reading, found);
  const signals = rows.signals.map((raw, i) => placed(raw, channels[i], clock));
  const recording: Recording = {
    format: 'delimited text',
    fileName,
    sizeBytes: file.size,
    identity: { code: null, name: null, sex: null, birthYear: null, recordingText: '' },
    start: { kind: 'unknown', raw: firstClock(time, rows) },
    durationS: clock.length / clock.rateHz,
    channels: channels.map((channel, i) => textChannel(i, channel, clock.rateHz, clock.length)),
    annotations: [],
    found,
    gaps: gapsOf(signals, clock.rateHz),
    invented: false,
  };
  return memorySource(recording, signals, clock.rateHz);
}

/** Asks for the rate before a long file is read in vain. */
function refuseWithoutRate(fileName: string, time: TimeColumn, reading: TextReading | null): void {
  if ((reading?.rateHz ?? null) !== null) return;
  throw refusal('needs-reading', fileName, {
    message:
      time.kind === 'counter'
        ? 'the first column only counts the rows, so the sampling rate is not known.'
        : 'the table has no time column, so its sampling rate is not known.',
    place: null,
    remedy: 'Give the rate in samples a second.',
  });
}

function nameLayout(
  layout: TextLayout,
  header: TextHeader,
  time: TimeColumn,
  encoding: TextEncoding,
  found: FoundInFile[],
): void {
  const add = (severity: FoundInFile['severity'], what: string, place: string | null) =>
    found.push({ severity, what, place });
  const decimal = layout.decimal === ',' ? 'comma' : 'point';
  add('note', `read as cells parted by ${layout.delimiter}, with decimal ${decimal}`, null);
  if (layout.ambiguous)
    add(
      'warning',
      'each row is two whole numbers parted by a comma and was read as two columns; if the comma is a decimal one, replace it by a point',
      null,
    );
  if (encoding === 'windows-1252')
    add('note', 'the text is not UTF-8 and was read as Windows-1252', null);
  if (header.otherLines > 0)
    add(
      'warning',
      `${header.otherLines} lines above the data are neither names nor units of its columns and were left out`,
      'row 1',
    );
  if (time.kind === 'number' && !time.named)
    add(
      'warning',
      'the first column has no name and rises evenly; it was read as the time',
      'column 1',
    );
  if (time.kind === 'number' && !time.unitStated)
    add(
      'warning',
      'the time column does not say its unit; it was read in seconds',
      `column ${time.column + 1}`,
    );
}

function nameRows(rows: TextRows, found: FoundInFile[]): void {
  if (rows.blankLines > 0)
    found.push({
      severity: 'warning',
      what: `${rows.blankLines} blank lines between rows were left out`,
      place: null,
    });
  if (rows.comments > 0)
    found.push({
      severity: 'note',
      what: `${rows.comments} lines that start with # were left out`,
      place: null,
    });
  if (rows.lastRowCut)
    found.push({
      severity: 'warning',
      what: 'the last row is cut off and was left out',
      place: 'last row',
    });
}

/** A column in uV (or its own unit where that is unknown) on its places of the grid. */
function placed(
  raw: Float64Array,
  { unit }: TextChannel,
  { places, length }: { readonly places: Float64Array | null; readonly length: number },
): Float64Array {
  const factor = unit.kind === 'voltage' ? unit.microvoltsPerUnit : 1;
  if (places === null) return factor === 1 ? raw : raw.map((value) => value * factor);
  const samples = new Float64Array(length).fill(Number.NaN);
  for (let row = 0; row < raw.length; row += 1) samples[places[row]] = raw[row] * factor;
  return samples;
}

/** The clock time of the first row, which has no date. */
function firstClock(time: TimeColumn, rows: TextRows): string {
  if (time.kind !== 'clock' || rows.timesS === null) return '';
  const seconds = Math.floor(rows.timesS[0]);
  const two = (value: number) => String(value).padStart(2, '0');
  return `${two(Math.floor(seconds / 3600))}:${two(Math.floor(seconds / 60) % 60)}:${two(seconds % 60)}`;
}
