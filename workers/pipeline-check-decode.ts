import { digitalNumbers } from '../src/decode/digital-numbers';
import { parseRecordAnnotations } from '../src/decode/edf-annotations';
import { fullYear } from '../src/decode/edf-fields';
import { openRecording } from '../src/decode/formats';
import { ARITHMETIC, type CheckValue, EXACT, within } from './check-value';
import { plainEdf } from './self-check-edf';

const KEMP = 'Kemp 1992';
const KEMP_PLUS = 'Kemp & Olivan 2003';

interface Scale {
  readonly physical: readonly [min: number, max: number];
  readonly digital: readonly [min: number, max: number];
}
const WHOLE = [-32768, 32767] as const;

/** What the reader makes of one stored number. */
async function readBack(stored: number, { physical, digital }: Scale): Promise<number> {
  const file = plainEdf({
    recordS: 1,
    records: 1,
    signals: [
      {
        label: 'EGG',
        physicalMin: physical[0],
        physicalMax: physical[1],
        digitalMin: digital[0],
        digitalMax: digital[1],
        digital: Int16Array.of(stored, 0),
      },
    ],
  });
  const source = await openRecording(file, 'check.edf', null);
  return (await source.read(0, 0, 1))[0];
}

/** Bytes of a file of five signals at 250 Hz over 180 records of 10 s, and the samples the reader finds of its first. */
async function fiveSignals(): Promise<number[]> {
  const digital = new Int16Array(180 * 2500);
  const signals = [1, 2, 3, 4, 5].map((n) => ({
    label: `E${n}`,
    physicalMin: -500,
    physicalMax: 500,
    digitalMin: WHOLE[0],
    digitalMax: WHOLE[1],
    digital,
  }));
  const file = plainEdf({ recordS: 10, records: 180, signals });
  const { recording } = await openRecording(file, 'check.edf', null);
  const { channels, durationS } = recording;
  return [file.size, channels.length, channels[0].sampleCount, channels[0].rateHz, durationS];
}

const MEAL = [
  0x2b, 0x31, 0x38, 0x30, 0x32, 0x2e, 0x35, 0x15, 0x33, 0x30, 0x14, 0x4d, 0x65, 0x61, 0x6c, 0x20,
  0x73, 0x74, 0x61, 0x72, 0x74, 0x14, 0x00,
];

function beforeStart(): (string | number)[] {
  const text = new TextEncoder().encode('-0.065\u0014pre-trigger\u0014\u0000');
  return parseRecordAnnotations(text).annotations.flatMap((one) => [one.onsetS, one.text]);
}

/** The reader of EDF and BDF files. */
export const DECODE_CHECKS: readonly CheckValue[] = [
  {
    id: 'CV-32',
    what: 'EDF: stored 0 of −32768..32767 as −500..500',
    source: KEMP,
    expected: [0.00762951],
    tolerance: within(1e-8),
    got: async () => [await readBack(0, { physical: [-500, 500], digital: WHOLE })],
  },
  {
    id: 'CV-33',
    what: 'EDF: stored 1024 of −2048..2047 as −10..10',
    source: KEMP,
    expected: [5.003663],
    tolerance: within(1e-6),
    got: async () => [await readBack(1024, { physical: [-10, 10], digital: [-2048, 2047] })],
  },
  {
    id: 'CV-34',
    what: 'EDF: stored 1000 with physical limits turned round, 500..−500',
    source: KEMP,
    expected: [-15.2666514],
    tolerance: within(1e-6),
    got: async () => [await readBack(1000, { physical: [500, -500], digital: WHOLE })],
  },
  {
    id: 'CV-35',
    what: 'EDF of 5 signals, 250 Hz, 180 records of 10 s: bytes; signals, samples of one, Hz, s as read',
    source: ARITHMETIC,
    expected: [4_501_536, 5, 450_000, 250, 1800],
    tolerance: EXACT,
    got: fiveSignals,
  },
  {
    id: 'CV-36',
    what: 'Years 84 85 99 00 24 of a header',
    source: KEMP_PLUS,
    expected: [2084, 1985, 1999, 2000, 2024],
    tolerance: EXACT,
    got: () => [84, 85, 99, 0, 24].map(fullYear),
  },
  {
    id: 'CV-37',
    what: 'An annotation’s bytes: onset, duration, text',
    source: KEMP_PLUS,
    expected: [1802.5, 30, 'Meal start'],
    tolerance: EXACT,
    got: () =>
      parseRecordAnnotations(Uint8Array.from(MEAL)).annotations.flatMap((one) => [
        one.onsetS,
        one.durationS ?? 'none',
        one.text,
      ]),
  },
  {
    id: 'CV-38',
    what: 'An annotation before the start: onset, text',
    source: KEMP_PLUS,
    expected: [-0.065, 'pre-trigger'],
    tolerance: EXACT,
    got: beforeStart,
  },
  {
    id: 'CV-39',
    what: '24-bit samples (BDF): 00 00 80, FF FF 7F, 40 0D 03',
    source: ARITHMETIC,
    expected: [-8_388_608, 8_388_607, 200_000],
    tolerance: EXACT,
    got: () => digitalNumbers(Uint8Array.of(0, 0, 0x80, 0xff, 0xff, 0x7f, 0x40, 0x0d, 0x03), 3),
  },
];
