import type { ChannelUnit } from '../recording/channel';
import type { Refusal } from '../recording/failure';
import type { FoundInFile } from '../recording/recording';
import { microvoltsPerUnit } from '../units/voltage';
import { uniqueLabels } from './labels';
import { quoted, refusal } from './refusals';
import { splitCells } from './text-cells';
import { isSkipped, type TextLayout } from './text-dialect';
import type { TextHeader } from './text-header';
import type { TextReading } from './text-reading';
import type { TimeColumn } from './text-time-column';

/** A column of samples as a channel will have it. */
export interface TextChannel {
  readonly column: number;
  readonly label: string;
  readonly unit: ChannelUnit;
}

interface ChannelsInput {
  readonly fileName: string;
  readonly lines: readonly string[];
  readonly layout: TextLayout;
  readonly header: TextHeader;
  readonly time: TimeColumn;
  readonly reading: TextReading | null;
}

/**
 * The signal columns with their labels and units: the unit the file states, else the one a person gave. Throws a Refusal of
 * kind `needs-reading` where a column states no unit and none was given, `wrong-input` where no column is a voltage.
 */
export function textChannels(input: ChannelsInput, found: FoundInFile[]): readonly TextChannel[] {
  const { fileName, layout, header, time, reading } = input;
  const givenUnit = reading?.unit ?? null;
  if (givenUnit !== null && microvoltsPerUnit(givenUnit) === null)
    throw refusal('needs-reading', fileName, {
      message: `the unit ${quoted(givenUnit)} is none of V, mV, uV, nV.`,
      place: 'unit',
      remedy: 'Give the unit as V, mV, uV or nV.',
    });
  const empty = emptyColumns(input);
  const columns = Array.from({ length: layout.columns }, (_, i) => i).filter(
    (column) => (time.kind === 'none' || column !== time.column) && !empty.has(column),
  );
  const labels = uniqueLabels(columns.map((column) => header.names[column]));
  const channels = columns.map((column, i): TextChannel => {
    const text = header.units[column] || givenUnit || '';
    const factor = microvoltsPerUnit(text);
    const unit: ChannelUnit =
      factor === null
        ? { kind: 'unknown', text }
        : { kind: 'voltage', text, microvoltsPerUnit: factor };
    return { column, label: labels[i], unit };
  });
  if (!channels.some((channel) => channel.unit.kind === 'voltage'))
    throw noVoltage(fileName, channels);
  for (const { label, unit, column } of channels)
    if (unit.kind === 'unknown')
      found.push({
        severity: 'warning',
        what: `column “${label}” is in ${quoted(unit.text)}, no unit of voltage known here; it can serve as breathing lead only`,
        place: `column ${column + 1}`,
      });
  return channels;
}

function noVoltage(fileName: string, channels: readonly TextChannel[]): Refusal {
  if (channels.length === 0)
    return refusal('wrong-input', fileName, {
      message: 'the table has a time column and no column of samples.',
      place: null,
      remedy: 'Export the recording with at least one column of samples.',
    });
  const silent = channels.find((channel) => channel.unit.text === '');
  if (silent)
    return refusal('needs-reading', fileName, {
      message: `column ${silent.column + 1} (“${silent.label}”) does not say its unit.`,
      place: `column ${silent.column + 1}`,
      remedy: 'Give the unit of the columns: V, mV, uV or nV.',
    });
  const units = [...new Set(channels.map((channel) => quoted(channel.unit.text)))].join(', ');
  return refusal('wrong-input', fileName, {
    message: `no column is in V, mV, uV or nV; the units found are: ${units}.`,
    place: 'units of the columns',
    remedy: 'Export the recording in uV or mV.',
  });
}

/** Columns without a name and without a value in the first lines: what a delimiter at the end of each row leaves. */
function emptyColumns({ lines, layout, header }: ChannelsInput): ReadonlySet<number> {
  const rows = lines
    .slice(header.firstDataLine)
    .filter((line) => !isSkipped(line))
    .map((line) => splitCells(line, layout.delimiter));
  const last = layout.columns - 1;
  const isEmpty =
    last > 0 && header.names[last] === '' && rows.every((row) => (row[last] ?? '').trim() === '');
  return new Set(isEmpty ? [last] : []);
}
