import type { SignalSource } from '../recording/recording';
import { openEdf } from './edf';
import { fieldText } from './edf-fields';
import { FIXED_BYTES, fixedField } from './edf-layout';
import type { EdfVariant } from './edf-variant';
import { readBytes } from './file-bytes';
import type { Format, Recognition } from './format';
import { refusal } from './refusals';
import { looksLike } from './signatures';
import { recognisesDelimitedText } from './text-head';
import type { TextReading } from './text-reading';

const HEAD_BYTES = 64 * 1024;
const LINE_FEED = 0x0a;

/** A header of this family: 256 bytes without a line feed, the expected first bytes, and a reserved field that fits. */
function headerRecognition(head: Uint8Array, version: RegExp, reserved: RegExp): Recognition {
  const fixed = head.subarray(0, FIXED_BYTES);
  const start = String.fromCharCode(...fixed.subarray(0, 8));
  if (!version.test(start)) return 'no';
  if (fixed.length < FIXED_BYTES) return fixed.includes(LINE_FEED) ? 'no' : 'possible';
  if (!reserved.test(fieldText(fixedField(fixed, 'reserved')))) return 'no';
  return fixed.includes(LINE_FEED) ? 'possible' : 'certain';
}

const EDF_VERSION = /^0[ \0]{7}$/;
/** Byte 255, then letters (24-bit files). */
const BDF_VERSION = /^\xff[ -~]{7}$/;

/** A row for one of the formats that share the layout of EDF. */
const edfFormat = (
  variant: EdfVariant,
  extensions: readonly string[],
  version: RegExp,
  reserved: RegExp,
): Format => ({
  name: variant.name,
  extensions,
  recognises: (head) => headerRecognition(head, version, reserved),
  open: (file, fileName) => openEdf(file, fileName, variant),
});

/** The table of formats. A new one is a row here and a file of its own. */
export const FORMATS: readonly Format[] = [
  edfFormat(
    { name: 'EDF', sampleBytes: 2, plus: 'none' },
    ['edf', 'rec'],
    EDF_VERSION,
    /^(?!EDF\+)/,
  ),
  edfFormat({ name: 'EDF+C', sampleBytes: 2, plus: 'C' }, ['edf'], EDF_VERSION, /^EDF\+(?!D)/),
  edfFormat({ name: 'EDF+D', sampleBytes: 2, plus: 'D' }, ['edf'], EDF_VERSION, /^EDF\+D/),
  edfFormat({ name: 'BDF', sampleBytes: 3, plus: 'none' }, ['bdf'], BDF_VERSION, /^(?!BDF\+)/),
  edfFormat({ name: 'BDF+C', sampleBytes: 3, plus: 'C' }, ['bdf'], BDF_VERSION, /^BDF\+(?!D)/),
  edfFormat({ name: 'BDF+D', sampleBytes: 3, plus: 'D' }, ['bdf'], BDF_VERSION, /^BDF\+D/),
  {
    name: 'delimited text',
    extensions: ['csv', 'tsv', 'txt', 'asc', 'dat'],
    recognises: recognisesDelimitedText,
    /** The reader is fetched with the first text file: most recordings are none. */
    open: async (file, fileName, reading) => {
      const { openDelimitedText } = await import('./delimited-text');
      return openDelimitedText(file, fileName, reading);
    },
  },
];

/**
 * The format of some bytes: the one row that is certain; else, among the rows that find it possible, one that the name's
 * extension fits, or the first. Null where every row says no. Two rows certain of the same bytes are a programming error.
 */
export function chooseFormat(
  formats: readonly Format[],
  head: Uint8Array,
  fileName: string,
): Format | null {
  const answers = formats.map((format) => format.recognises(head, fileName));
  const certain = formats.filter((_, i) => answers[i] === 'certain');
  if (certain.length > 1)
    throw new Error(`formats claim the same bytes: ${certain.map((one) => one.name).join(', ')}`);
  if (certain.length === 1) return certain[0];
  const possible = formats.filter((_, i) => answers[i] === 'possible');
  const extension = /\.([^.]+)$/.exec(fileName)?.[1].toLowerCase() ?? '';
  return possible.find((one) => one.extensions.includes(extension)) ?? possible[0] ?? null;
}

/**
 * Opens a recording by its content. `reading` holds what a person says about a text file. Throws a Refusal that names the
 * file, what it looks like or where it breaks its format, and the remedy.
 */
export async function openRecording(
  file: Blob,
  fileName: string,
  reading: TextReading | null,
): Promise<SignalSource> {
  const head = await readBytes(file, fileName, 0, HEAD_BYTES);
  const likeness = looksLike(head);
  const format = likeness === null ? chooseFormat(FORMATS, head, fileName) : null;
  if (format) return format.open(file, fileName, reading);
  throw refusal('wrong-input', fileName, {
    message:
      likeness === null
        ? 'this is no format that can be read; its first bytes fit none.'
        : `this looks like ${likeness}, not like a recording.`,
    place: 'byte 0',
    remedy:
      likeness !== null && /archive/.test(likeness)
        ? 'Unpack it and choose the recording inside.'
        : 'Choose an EDF, EDF+, BDF, BDF+ or delimited text file.',
  });
}
