import type { Annotation } from '../recording/recording';
import type { Seconds } from '../units/time';
import { annotationRecords, startFraction } from './edf-plus-annotations';
import { edfPlusHeader } from './edf-plus-header';

/** One signal with its digital samples, in the words of the header (Kemp 1992). */
export interface EdfPlusSignal {
  /** Up to 16 characters; longer ones are cut. */
  readonly label: string;
  readonly transducer: string;
  /** "uV", "mV"...; the micro sign is written as u. */
  readonly unit: string;
  /** Limits must be numbers that fit into 8 characters: see fitHeaderNumber. */
  readonly physicalMin: number;
  readonly physicalMax: number;
  readonly digitalMin: number;
  readonly digitalMax: number;
  readonly prefilter: string;
  readonly samplesPerRecord: number;
  /** All samples in order, or the samples of a record (from 0). */
  readonly digital: Int16Array | ((record: number) => Int16Array);
}

/** Subfields of the patient field (Kemp & Olivan 2003); null is written as X. */
export interface EdfPlusPatient {
  readonly code: string | null;
  readonly sex: 'F' | 'M' | null;
  /** "yyyy-mm-dd". */
  readonly birthDate: string | null;
  readonly name: string | null;
}

/** Subfields of the recording field after the start date (Kemp & Olivan 2003); null is written as X. */
export interface EdfPlusRecordingFields {
  readonly investigation: string | null;
  readonly technician: string | null;
  readonly equipment: string | null;
  /** Further subfields of our own. */
  readonly additional: readonly string[];
}

export interface EdfPlusContents {
  readonly patient: EdfPlusPatient;
  readonly recordingFields: EdfPlusRecordingFields;
  /** Local time of the first sample, "yyyy-mm-ddThh:mm:ss" with or without a fraction; null where unknown. */
  readonly start: string | null;
  readonly recordDurationS: Seconds;
  readonly recordCount: number;
  readonly signals: readonly EdfPlusSignal[];
  /** Times from the first sample; any order. */
  readonly annotations: readonly Annotation[];
}

/** Largest record of ordinary signals in bytes (Kemp & Olivan 2003). */
const MOST_RECORD_BYTES = 61_440;
const PART_BYTES = 4 * 1024 * 1024;

/**
 * Writes a contiguous EDF+ file (EDF+C; Kemp & Olivan 2003): the header, then parts of about 4 MB, to be put into a Blob or
 * file in order. Annotations lie in the record of their onset, in one annotation signal as long as the fullest record needs.
 * The same contents give the same bytes. Throws RangeError where a number does not fit its field, a count is no positive
 * whole number, a record of ordinary signals is longer than 61 440 bytes, or an array has not the length its records ask for.
 */
export function writeEdfPlus(contents: EdfPlusContents): Uint8Array<ArrayBuffer>[] {
  checkCounts(contents);
  const annotations = annotationRecords(contents, startFraction(contents.start));
  const words = contents.signals.reduce((sum, signal) => sum + signal.samplesPerRecord, 0);
  const recordBytes = 2 * words + annotations.bytesPerRecord;
  if (2 * words > MOST_RECORD_BYTES)
    throw new RangeError(`a record takes ${2 * words} bytes, more than ${MOST_RECORD_BYTES}`);
  const parts = [edfPlusHeader(contents, annotations.bytesPerRecord / 2)];
  const recordsPerPart = Math.max(1, Math.floor(PART_BYTES / recordBytes));
  for (let from = 0; from < contents.recordCount; from += recordsPerPart) {
    const to = Math.min(contents.recordCount, from + recordsPerPart);
    const part = new Uint8Array((to - from) * recordBytes);
    for (let record = from; record < to; record += 1) {
      const at = (record - from) * recordBytes;
      writeRecord(contents.signals, record, new DataView(part.buffer, at, 2 * words));
      part.set(annotations.record(record), at + 2 * words);
    }
    parts.push(part);
  }
  return parts;
}

function writeRecord(signals: readonly EdfPlusSignal[], record: number, view: DataView): void {
  let at = 0;
  for (const { label, digital, samplesPerRecord } of signals) {
    const given = typeof digital === 'function';
    const samples = given ? digital(record) : digital;
    if (given && samples.length !== samplesPerRecord)
      throw new RangeError(`${label}: record ${record} has ${samples.length} samples`);
    const from = given ? 0 : record * samplesPerRecord;
    for (let i = 0; i < samplesPerRecord; i += 1) {
      view.setInt16(at, samples[from + i], true);
      at += 2;
    }
  }
}

function checkCounts({ recordCount, recordDurationS, signals }: EdfPlusContents): void {
  const count = (value: number, what: string) => {
    if (!Number.isInteger(value) || value < 1) throw new RangeError(`${what}: ${value}`);
  };
  count(recordCount, 'number of records');
  if (!(recordDurationS > 0)) throw new RangeError(`duration of a record: ${recordDurationS}`);
  for (const signal of signals) {
    count(signal.samplesPerRecord, `${signal.label}: samples in a record`);
    const { digital, label, samplesPerRecord } = signal;
    if (typeof digital !== 'function' && digital.length !== samplesPerRecord * recordCount)
      throw new RangeError(`${label}: ${digital.length} samples for ${recordCount} records`);
    if (!(signal.digitalMin < signal.digitalMax) || signal.physicalMin === signal.physicalMax)
      throw new RangeError(`${label}: its limits give no scale`);
  }
}
