import { openRecording } from '../../src/decode/formats';
import { createRandom, type Random } from '../../src/numeric/random';
import { Refusal } from '../../src/recording/failure';
import { annotationBytes, annotationSignal, edfBytes } from './edf-bytes';

/** A file that was damaged or made to harm, by its number: the same number gives the same bytes. */
export interface MutatedFile {
  readonly name: string;
  readonly bytes: Uint8Array<ArrayBuffer>;
}

const rows = [1, 2, 3, 4].map((k) => [k, -k, 100 * k, 32_000 - k]);
const timed = (onset: string) =>
  annotationBytes(24, onset, 0x14, 0x14, 0, onset, 0x14, 'x', 0x14, 0);
const signals = (onsets: readonly string[]) => [
  { records: rows },
  { label: 'ECG', records: rows },
  annotationSignal(onsets.map(timed)),
];

/** 24-bit bytes of the same layout: only their header and their size matter here. */
function wide(reserved: string): Uint8Array<ArrayBuffer> {
  const narrow = edfBytes({
    version: '\u00ffBIOSEMI',
    reserved,
    signals: signals(['+0', '+1', '+2', '+3']),
  });
  const bytes = new Uint8Array(1024 + 4 * 3 * 20);
  bytes.set(narrow.subarray(0, Math.min(narrow.length, bytes.length)));
  return bytes;
}

const TEMPLATES: readonly MutatedFile[] = [
  { name: 'a.edf', bytes: edfBytes({ signals: [{ records: rows }, { records: rows }] }) },
  {
    name: 'b.edf',
    bytes: edfBytes({ reserved: 'EDF+C', signals: signals(['+0', '+1', '+2', '+3']) }),
  },
  {
    name: 'c.edf',
    bytes: edfBytes({ reserved: 'EDF+D', signals: signals(['+0', '+1', '+9', '+20']) }),
  },
  { name: 'd.bdf', bytes: wide('24BIT') },
  { name: 'e.bdf', bytes: wide('BDF+D') },
  {
    name: 'f.csv',
    bytes: new TextEncoder().encode(
      `time (s),E1 (uV)\n${Array.from({ length: 60 }, (_, i) => `${i / 20},${(7 * i) % 50}`).join('\n')}\n`,
    ),
  },
];

/** What a hostile or broken field may hold. */
const FIELDS = [
  ...['0', '-1', '1', '2', '9999', '99999999', '2147483647', '-8388608', '1E9', '1e300', '1E-300'],
  ...[
    'NaN',
    'Infinity',
    '',
    ' ',
    '1,5',
    '0,000001',
    '.',
    '+',
    '-',
    '0x10',
    '１２',
    'EDF+C',
    'EDF+D',
  ],
  ...[
    'BDF+D',
    '24BIT',
    '\u0000\u0000',
    '\u00ff',
    '<script>alert(1)</script>',
    '..\\..\\x',
    '00.00.00',
  ],
] as const;

/** Header fields by first byte and length, for three signals (Kemp 1992). */
const PLACES: readonly (readonly [number, number])[] = [
  ...([
    [0, 8],
    [8, 80],
    [88, 80],
    [168, 8],
    [176, 8],
    [184, 8],
    [192, 44],
    [236, 8],
    [244, 8],
    [252, 4],
  ] as const),
  ...[0, 48, 288, 312, 336, 360, 384, 408, 648, 672].flatMap((from) =>
    [0, 1, 2].map((k) => [256 + from + 8 * k, 8] as const),
  ),
];

const pick = <T>(random: Random, from: readonly T[]): T => from[random.below(from.length)];

const MUTATIONS: readonly ((
  bytes: Uint8Array<ArrayBuffer>,
  random: Random,
) => Uint8Array<ArrayBuffer>)[] = [
  /** A field with something else in it. */
  (bytes, random) => {
    const [at, length] = pick(random, PLACES);
    const text = pick(random, FIELDS).padEnd(length).slice(0, length);
    for (let i = 0; i < length && at + i < bytes.length; i += 1)
      bytes[at + i] = text.charCodeAt(i) & 0xff;
    return bytes;
  },
  /** Cut off. */
  (bytes, random) => bytes.slice(0, random.below(bytes.length + 1)),
  /** Some bits turned. */
  (bytes, random) => {
    for (let k = random.below(6); k >= 0 && bytes.length > 0; k -= 1)
      bytes[random.below(bytes.length)] ^= 1 << random.below(8);
    return bytes;
  },
  /** A stretch of one byte. */
  (bytes, random) => {
    const from = random.below(bytes.length + 1);
    return bytes.fill(pick(random, [0, 0x14, 0x15, 0x20, 0x2b, 0x2c, 0x0a, 0xff]), from, from + 40);
  },
  /** A piece said twice. */
  (bytes, random) => {
    const from = random.below(bytes.length + 1);
    const piece = bytes.subarray(from, from + random.below(200));
    const longer = new Uint8Array(bytes.length + piece.length);
    longer.set(bytes.subarray(0, from));
    longer.set(piece, from);
    longer.set(bytes.subarray(from), from + piece.length);
    return longer;
  },
];

/** The file of a number. */
export function mutatedFile(number: number): MutatedFile {
  const random = createRandom(number + 1);
  const { name, bytes } = TEMPLATES[number % TEMPLATES.length];
  let mutated = bytes.slice();
  for (let k = random.below(4); k >= 0; k -= 1) mutated = pick(random, MUTATIONS)(mutated, random);
  return { name, bytes: mutated };
}

export type Outcome = 'read' | 'refused';

/** A sample takes 8 bytes once it is read. */
const MOST_SAMPLES = (64 * 1024 * 1024) / 8;

/**
 * Opens a file and reads all of it. Throws Error where that is worse than being read or refused in words: another error, a
 * refusal without remedy, more read than the file holds, or samples that would take over 64 MB.
 */
export async function openMutated({ name, bytes }: MutatedFile): Promise<Outcome> {
  const blob = new Blob([bytes]);
  const slice = blob.slice.bind(blob);
  let asked = 0;
  blob.slice = (from, to, type) => {
    const part = slice(from, to, type);
    asked += part.size;
    return part;
  };
  try {
    const { recording, blocks } = await openRecording(blob, name, { rateHz: 20, unit: 'uV' });
    const most = recording.channels.reduce((sum, { sampleCount }) => sum + sampleCount, 0);
    if (!(most <= MOST_SAMPLES)) throw new Error(`${most} samples of ${bytes.length} bytes`);
    let count = 0;
    for await (const block of blocks(recording.channels.map((_, i) => i)))
      count += block.samples.reduce((sum, one) => sum + one.length, 0);
    if (count !== most) throw new Error(`${count} samples came, ${most} were promised`);
    if (asked > 20 * bytes.length + 1000) throw new Error(`${asked} of ${bytes.length} bytes read`);
    return 'read';
  } catch (error) {
    if (!(error instanceof Refusal)) throw error;
    const { message, remedy } = error.failure;
    if (!message.startsWith(`${name}: `) || !/^[A-Z].{10,}\.$/.test(remedy))
      throw new Error(`refused without words: ${message} / ${remedy}`);
    return 'refused';
  }
}
