import { describe, expect, it } from 'vitest';
import { openRecording } from '../../src/decode/formats';
import { type EdfPlusContents, writeEdfPlus } from '../../src/export/edf-plus';
import { fitHeaderNumber } from '../../src/export/edf-plus-header';

const contents: EdfPlusContents = {
  patient: { code: 'INV 01', sex: 'F', birthDate: '1956-01-29', name: null },
  recordingFields: {
    investigation: null,
    technician: 'jop',
    equipment: 'Bicadence 1',
    additional: ['invented data'],
  },
  start: '2021-03-02T10:20:30.25',
  recordDurationS: 2,
  recordCount: 3,
  signals: [
    {
      label: 'EGG E1',
      transducer: 'AgAgCl electrode',
      unit: '\u00b5V',
      physicalMin: -3276.8,
      physicalMax: 3276.7,
      digitalMin: -32768,
      digitalMax: 32767,
      prefilter: 'HP:DC LP:100Hz',
      samplesPerRecord: 4,
      digital: Int16Array.from([-32768, -1, 0, 1, 32767, 5, 6, 7, 8, 9, 10, 11]),
    },
    {
      label: 'slow',
      transducer: '',
      unit: 'mV',
      physicalMin: -1,
      physicalMax: 1,
      digitalMin: -100,
      digitalMax: 100,
      prefilter: '',
      samplesPerRecord: 1,
      digital: (record) => Int16Array.of(10 * record),
    },
  ],
  annotations: [
    { onsetS: 2.5, durationS: 1.5, text: 'meal start' },
    { onsetS: 0, durationS: null, text: 'água\u0000 20 °C' },
    { onsetS: 99, durationS: null, text: 'after' },
    { onsetS: -0.5, durationS: null, text: 'before' },
  ],
};

async function written(given: EdfPlusContents): Promise<Uint8Array> {
  return new Uint8Array(await new Blob(writeEdfPlus(given)).arrayBuffer());
}
const ascii = (bytes: Uint8Array, from: number, length: number) =>
  String.fromCharCode(...bytes.subarray(from, from + length));

describe('an EDF+ file (Kemp 1992; Kemp & Olivan 2003)', () => {
  it('has each fixed field at its place', async () => {
    const bytes = await written(contents);
    expect(ascii(bytes, 0, 8)).toBe('0       ');
    expect(ascii(bytes, 8, 80)).toBe('INV_01 F 29-JAN-1956 X'.padEnd(80));
    expect(ascii(bytes, 88, 80)).toBe(
      'Startdate 02-MAR-2021 X jop Bicadence_1 invented_data'.padEnd(80),
    );
    expect(ascii(bytes, 168, 16)).toBe('02.03.2110.20.30');
    expect(ascii(bytes, 184, 8)).toBe('1024    ');
    expect(ascii(bytes, 192, 44)).toBe('EDF+C'.padEnd(44));
    expect(ascii(bytes, 236, 20)).toBe('3       2       3   ');
  });

  it('has the signal fields one after the other, the annotation signal last', async () => {
    const bytes = await written(contents);
    // Offsets of Kemp 1992 for ns = 3: labels 256 + 16 i, dimension 544 + 8 i, physical minimum 568 + 8 i, ...
    expect(ascii(bytes, 256, 48)).toBe(
      `${'EGG E1'.padEnd(16)}${'slow'.padEnd(16)}${'EDF Annotations'.padEnd(16)}`,
    );
    expect(ascii(bytes, 304, 16)).toBe('AgAgCl electrode');
    expect(ascii(bytes, 544, 16)).toBe('uV      mV      ');
    expect(ascii(bytes, 568, 24)).toBe('-3276.8 -1      -1      ');
    expect(ascii(bytes, 592, 24)).toBe('3276.7  1       1       ');
    expect(ascii(bytes, 616, 24)).toBe('-32768  -100    -32768  ');
    expect(ascii(bytes, 664, 14)).toBe('HP:DC LP:100Hz');
    expect(ascii(bytes, 904, 16)).toBe('4       1       ');
  });

  it('has little-endian words and the time of each record first among its annotations', async () => {
    const bytes = await written(contents);
    const words = Number(ascii(bytes, 920, 8));
    expect(bytes.length).toBe(1024 + 3 * 2 * (4 + 1 + words));
    expect([...bytes.subarray(1024, 1034)]).toEqual([0, 128, 255, 255, 0, 0, 1, 0, 0, 0]);
    const second = 1024 + 2 * (5 + words) + 10;
    expect(
      ascii(bytes, second, 40).startsWith(
        '+2.25\u0014\u0014\u0000+2.75\u00151.5\u0014meal start\u0014\u0000',
      ),
    ).toBe(true);
  });

  it('is read back as it was written', async () => {
    const source = await openRecording(new Blob(writeEdfPlus(contents)), 'written.edf', null);
    const { recording } = source;
    expect(recording.found).toEqual([]);
    expect(recording.format).toBe('EDF+C');
    expect(recording.start).toEqual({ kind: 'known', local: '2021-03-02T10:20:30.25' });
    expect(recording.identity).toMatchObject({
      code: 'INV 01',
      sex: 'F',
      birthYear: 1956,
      name: null,
    });
    expect(recording.annotations).toEqual([
      { onsetS: -0.5, durationS: null, text: 'before' },
      { onsetS: 0, durationS: null, text: 'água  20 °C' },
      { onsetS: 2.5, durationS: 1.5, text: 'meal start' },
      { onsetS: 99, durationS: null, text: 'after' },
    ]);
    const uv = await source.read(0, 0, 12);
    [-3276.8, -0.1, 0, 0.1, 3276.7].forEach((value, i) => {
      expect(uv[i]).toBeCloseTo(value, 9);
    });
    expect([...(await source.read(1, 0, 3))].map((value) => Math.round(value))).toEqual([
      0, 100, 200,
    ]);
  });

  it('has no known start where none is given', async () => {
    const bytes = await written({ ...contents, start: null });
    expect(ascii(bytes, 88, 11)).toBe('Startdate X');
    expect(ascii(bytes, 168, 16)).toBe('01.01.8500.00.00');
  });
});

describe('header numbers', () => {
  it('fit into 8 characters', () => {
    expect(fitHeaderNumber(-3276.8)).toBe(-3276.8);
    expect(fitHeaderNumber(12.3456789)).toBe(12.34568);
    expect(fitHeaderNumber(-12.3456789)).toBe(-12.3457);
    expect(fitHeaderNumber(-1234567.89)).toBe(-1234568);
    expect(() => fitHeaderNumber(123456789)).toThrow(RangeError);
  });
});

describe('contents that make no file are programming errors', () => {
  const [signal] = contents.signals;
  it.each<[string, Partial<EdfPlusContents>]>([
    ['a limit with too many digits', { signals: [{ ...signal, physicalMax: Math.PI }] }],
    ['too few samples', { recordCount: 4 }],
    ['no scale', { signals: [{ ...signal, digitalMin: 5, digitalMax: 5 }] }],
    ['no records', { recordCount: 0 }],
    ['no duration', { recordDurationS: 0 }],
    ['a wrong date', { start: '2021-13-02T00:00:00' }],
    [
      'a record over 61 440 bytes',
      { signals: [{ ...signal, samplesPerRecord: 30_721, digital: () => new Int16Array(30_721) }] },
    ],
  ])('%s', (_, change) => {
    expect(() => writeEdfPlus({ ...contents, ...change })).toThrow(RangeError);
  });
});
