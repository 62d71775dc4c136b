import type { FoundInFile } from '../recording/recording';
import type { SampleBytes } from './digital-numbers';
import { fieldInteger, fieldNumber, fieldText } from './edf-fields';
import {
  FIXED_BYTES,
  FIXED_FIELDS,
  type FixedField,
  fixedField,
  headerBytesFor,
} from './edf-layout';
import { type EdfSignal, readSignals } from './edf-signals';
import { readBytes } from './file-bytes';
import { quoted, refusal } from './refusals';

/** Largest count of signals taken for a real one; the field could say 9999. */
export const MOST_SIGNALS = 512;

/** A header that can be worked with: every size checked against the file. */
export interface EdfHeader {
  readonly patient: string;
  readonly recording: string;
  readonly startDate: string;
  readonly startTime: string;
  readonly reserved: string;
  readonly headerBytes: number;
  /** Whole records that are in the file and belong to the recording. */
  readonly recordCount: number;
  readonly recordDurationS: number;
  /** Samples of all signals in one record. */
  readonly recordSamples: number;
  readonly sampleBytes: SampleBytes;
  readonly signals: readonly EdfSignal[];
  readonly found: readonly FoundInFile[];
}

/** Where a fixed field lies, for people. */
export const placeOf = (field: FixedField, name: string): string =>
  `byte ${FIXED_FIELDS[field][0]}, ${name}`;

/**
 * Reads the header of an EDF or EDF+ file (Kemp 1992; Kemp & Olivan 2003) or of the same with 24-bit samples (BDF, BDF+), at
 * most 131 kB whatever it claims. Defects that leave the samples readable are named in `found`; others are thrown as a Refusal of kind
 * `broken-format` (or `wrong-input` where the file holds no signal).
 */
export async function readEdfHeader(
  file: Blob,
  fileName: string,
  sampleBytes: SampleBytes,
): Promise<EdfHeader> {
  const fixed = await readBytes(file, fileName, 0, FIXED_BYTES);
  if (fixed.length < FIXED_BYTES) throw endsInHeader(fileName, file.size, FIXED_BYTES);
  const text = (name: FixedField) => fieldText(fixedField(fixed, name));
  const signalCount = readSignalCount(fileName, text('signalCount'));
  const headerBytes = headerBytesFor(signalCount);
  if (headerBytes > file.size) throw endsInHeader(fileName, file.size, headerBytes);
  const found: FoundInFile[] = [];
  noteHeaderLength(text('headerBytes'), headerBytes, found);
  const bytes = await readBytes(file, fileName, 0, headerBytes);
  const signals = readSignals(bytes, signalCount, fileName, found);
  const strange = bytes.findIndex((byte, at) => byte > 126 && at > 0);
  if (strange > 0)
    found.push({
      severity: 'note',
      what: 'the header holds characters outside ASCII; they were read as UTF-8 or Latin-1',
      place: `byte ${strange}`,
    });
  const last = signals[signals.length - 1];
  const recordSamples = last.firstSample + last.samplesPerRecord;
  const recordDurationS = readDuration(fileName, text('recordDuration'), found);
  const dataBytes = file.size - headerBytes;
  const recordCount = countRecords(
    { fileName, text: text('recordCount'), dataBytes, recordBytes: sampleBytes * recordSamples },
    found,
  );
  return {
    patient: text('patient'),
    recording: text('recording'),
    startDate: text('startDate'),
    startTime: text('startTime'),
    reserved: text('reserved'),
    headerBytes,
    recordCount,
    recordDurationS,
    recordSamples,
    sampleBytes,
    signals,
    found,
  };
}

function endsInHeader(fileName: string, size: number, wanted: number) {
  return refusal('broken-format', fileName, {
    message: `the file ends inside its header: ${size} of ${wanted} bytes are there.`,
    place: `byte ${size}`,
    remedy: 'Copy the file again from the recorder; this copy is not complete.',
  });
}

function readSignalCount(fileName: string, text: string): number {
  const count = fieldInteger(text);
  if (count !== null && count >= 1 && count <= MOST_SIGNALS) return count;
  throw refusal('broken-format', fileName, {
    message: `the header gives ${quoted(text)} as the number of signals; 1 to ${MOST_SIGNALS} can be real.`,
    place: placeOf('signalCount', 'number of signals'),
    remedy: 'Export the recording again; this is no usable EDF header.',
  });
}

function noteHeaderLength(text: string, headerBytes: number, found: FoundInFile[]): void {
  if (fieldInteger(text) === headerBytes) return;
  found.push({
    severity: 'warning',
    what: `the header says it is ${quoted(text)} bytes long; its count of signals asks for ${headerBytes}, which was used`,
    place: placeOf('headerBytes', 'header length'),
  });
}

function readDuration(fileName: string, text: string, found: FoundInFile[]): number {
  const number = fieldNumber(text);
  const place = placeOf('recordDuration', 'duration of a record');
  if (number && number.value > 0) {
    if (number.comma)
      found.push({
        severity: 'warning',
        what: `the duration of a record, ${quoted(text)}, has a comma; it was read as a decimal point`,
        place,
      });
    return number.value;
  }
  const zero = text === '' || number?.value === 0;
  throw refusal('broken-format', fileName, {
    message: zero
      ? `the duration of a record is ${quoted(text)}, so no sampling rate can be known.`
      : `the duration of a record is ${quoted(text)}, which is no positive number of seconds.`,
    place,
    remedy: 'Export the recording again with records of known duration.',
  });
}

interface RecordCountInput {
  readonly fileName: string;
  readonly text: string;
  readonly dataBytes: number;
  readonly recordBytes: number;
}

/** Whole records to be read: the stated count where they are all there, else those that are, named in `found`. */
function countRecords(input: RecordCountInput, found: FoundInFile[]): number {
  const { fileName, text, dataBytes, recordBytes } = input;
  const whole = Math.floor(dataBytes / recordBytes);
  const place = placeOf('recordCount', 'number of records');
  const stated = fieldInteger(text);
  if (whole < 1)
    throw refusal('broken-format', fileName, {
      message: `the file holds no whole record: one takes ${recordBytes} bytes, ${dataBytes} follow the header (stated: ${quoted(text)} records).`,
      place,
      remedy: 'Copy the file again from the recorder; if it is complete, its header is wrong.',
    });
  const warn = (what: string) => found.push({ severity: 'warning', what, place });
  const tail = dataBytes - whole * recordBytes;
  const cut = tail > 0 ? `; the last ${tail} bytes are a record cut off and were left out` : '';
  if (stated === null || stated < 1) {
    warn(
      `the header gives ${quoted(text)} records (the recording was not closed); ${whole} whole records were found${cut}`,
    );
    return whole;
  }
  if (stated > whole) {
    warn(`the file ends early: ${whole} of ${stated} records are there${cut}`);
    return whole;
  }
  const extra = dataBytes - stated * recordBytes;
  if (extra > 0) warn(`${extra} bytes after the last of ${stated} records were left out`);
  return stated;
}
