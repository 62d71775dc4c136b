/** Byte offsets and lengths of the fixed part of a header (Kemp 1992). */
export const FIXED_BYTES = 256;

export const FIXED_FIELDS = {
  version: [0, 8],
  patient: [8, 80],
  recording: [88, 80],
  startDate: [168, 8],
  startTime: [176, 8],
  headerBytes: [184, 8],
  reserved: [192, 44],
  recordCount: [236, 8],
  recordDuration: [244, 8],
  signalCount: [252, 4],
} as const satisfies Record<string, readonly [offset: number, length: number]>;

export type FixedField = keyof typeof FIXED_FIELDS;

/** Length of each signal field in bytes, in the order in which the blocks follow (Kemp 1992). */
export const SIGNAL_FIELDS = [
  ['label', 16],
  ['transducer', 80],
  ['dimension', 8],
  ['physicalMin', 8],
  ['physicalMax', 8],
  ['digitalMin', 8],
  ['digitalMax', 8],
  ['prefilter', 80],
  ['samplesPerRecord', 8],
  ['reserved', 32],
] as const;

export type SignalField = (typeof SIGNAL_FIELDS)[number][0];

/** Bytes of one of the fixed fields. */
export function fixedField(head: Uint8Array, name: FixedField): Uint8Array {
  const [offset, length] = FIXED_FIELDS[name];
  return head.subarray(offset, offset + length);
}

/** Where field `name` of signal `index` starts among `signals` signals: blocks lie field after field. */
export function signalFieldOffset(name: SignalField, index: number, signals: number): number {
  let offset = FIXED_BYTES;
  for (const [field, length] of SIGNAL_FIELDS) {
    if (field === name) return offset + index * length;
    offset += length * signals;
  }
  throw new RangeError(`no header field ${name}`);
}

/** Bytes of field `name` of signal `index`. */
export function signalField(
  header: Uint8Array,
  name: SignalField,
  index: number,
  signals: number,
): Uint8Array {
  const offset = signalFieldOffset(name, index, signals);
  const length = SIGNAL_FIELDS.find(([field]) => field === name)?.[1] ?? 0;
  return header.subarray(offset, offset + length);
}

/** Header length that a count of signals asks for: 256 (signals + 1). */
export const headerBytesFor = (signals: number): number => FIXED_BYTES * (signals + 1);
