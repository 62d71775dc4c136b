/**
 * EDF bytes built from the published layout alone (Kemp et al. 1992, Electroenceph Clin Neurophysiol 82:391; Kemp & Olivan
 * 2003, Clin Neurophysiol 114:1755), without the code under test. Field texts are put in as given, so that a test can break
 * any of them.
 */
export interface SignalBytes {
  readonly label?: string;
  readonly transducer?: string;
  readonly dimension?: string;
  readonly physicalMin?: string;
  readonly physicalMax?: string;
  readonly digitalMin?: string;
  readonly digitalMax?: string;
  readonly prefilter?: string;
  readonly samplesPerRecord?: string;
  /** Words of each record; a Uint8Array is put in as it is. */
  readonly records: readonly (readonly number[] | Uint8Array)[];
}

export interface FileBytes {
  readonly version?: string;
  readonly patient?: string;
  readonly recording?: string;
  readonly startDate?: string;
  readonly startTime?: string;
  readonly headerBytes?: string;
  readonly reserved?: string;
  readonly recordCount?: string;
  readonly recordDuration?: string;
  readonly signalCount?: string;
  readonly signals: readonly SignalBytes[];
  readonly tail?: Uint8Array;
}

const latin1 = (text: string, length: number): number[] =>
  Array.from({ length }, (_, i) => (i < text.length ? text.charCodeAt(i) & 0xff : 0x20));

function recordBytes(record: readonly number[] | Uint8Array): number[] {
  if (record instanceof Uint8Array) return [...record];
  return record.flatMap((word) => [word & 0xff, (word >> 8) & 0xff]);
}

const SIGNAL_FIELDS: readonly [(signal: SignalBytes) => string, number][] = [
  [(s) => s.label ?? 'EGG', 16],
  [(s) => s.transducer ?? '', 80],
  [(s) => s.dimension ?? 'uV', 8],
  [(s) => s.physicalMin ?? '-3276.8', 8],
  [(s) => s.physicalMax ?? '3276.7', 8],
  [(s) => s.digitalMin ?? '-32768', 8],
  [(s) => s.digitalMax ?? '32767', 8],
  [(s) => s.prefilter ?? '', 80],
  [(s) => s.samplesPerRecord ?? String(recordBytes(s.records[0] ?? []).length / 2), 8],
  [() => '', 32],
];

export function edfBytes(file: FileBytes): Uint8Array<ArrayBuffer> {
  const { signals } = file;
  const records = signals[0]?.records.length ?? 0;
  const bytes = [
    ...latin1(file.version ?? '0', 8),
    ...latin1(file.patient ?? 'X X X X', 80),
    ...latin1(file.recording ?? 'Startdate 02-MAR-2021 X X X', 80),
    ...latin1(file.startDate ?? '02.03.21', 8),
    ...latin1(file.startTime ?? '10.20.30', 8),
    ...latin1(file.headerBytes ?? String(256 * (signals.length + 1)), 8),
    ...latin1(file.reserved ?? '', 44),
    ...latin1(file.recordCount ?? String(records), 8),
    ...latin1(file.recordDuration ?? '1', 8),
    ...latin1(file.signalCount ?? String(signals.length), 4),
  ];
  for (const [field, length] of SIGNAL_FIELDS)
    for (const signal of signals) bytes.push(...latin1(field(signal), length));
  for (let record = 0; record < records; record += 1)
    for (const signal of signals) bytes.push(...recordBytes(signal.records[record]));
  bytes.push(...(file.tail ?? []));
  return Uint8Array.from(bytes);
}

/** Bytes of text and byte values, padded with zeros to a length: an annotation record. */
export function annotationBytes(length: number, ...parts: (string | number)[]): Uint8Array {
  const bytes = parts.flatMap((part) =>
    typeof part === 'number' ? [part] : [...new TextEncoder().encode(part)],
  );
  if (bytes.length > length) throw new Error(`${bytes.length} bytes do not fit into ${length}`);
  return Uint8Array.from([...bytes, ...new Array<number>(length - bytes.length).fill(0)]);
}

/** An annotation signal, one array of bytes a record. */
export function annotationSignal(records: readonly Uint8Array[]): SignalBytes {
  return {
    label: 'EDF Annotations',
    dimension: '',
    physicalMin: '-1',
    physicalMax: '1',
    records,
  };
}

export const blobOf = (file: FileBytes): Blob => new Blob([edfBytes(file)]);
