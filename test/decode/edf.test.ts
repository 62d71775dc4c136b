import { describe, expect, it } from 'vitest';
import { openRecording } from '../../src/decode/formats';
import type { SignalSource } from '../../src/recording/recording';
import { annotationBytes, annotationSignal, blobOf, edfBytes, type FileBytes } from './edf-bytes';

const open = (file: FileBytes): Promise<SignalSource> =>
  openRecording(blobOf(file), 'study.edf', null);
const one = (signal: Partial<FileBytes['signals'][number]>): FileBytes => ({
  signals: [{ records: [[0, 1000, -1000, 32767]], ...signal }],
});

describe('sample values (Kemp 1992)', () => {
  it('lie on the line through the digital and physical limits', async () => {
    // CV-32.
    const source = await open(one({ physicalMin: '-500', physicalMax: '500' }));
    const [zero, , , top] = await source.read(0, 0, 4);
    expect(Math.abs(zero - 0.00762951)).toBeLessThan(1e-8);
    expect(top).toBeCloseTo(500, 9);
  });

  it('use the limits of a 12-bit range', async () => {
    // CV-33.
    const source = await open(
      one({
        physicalMin: '-10',
        physicalMax: '10',
        digitalMin: '-2048',
        digitalMax: '2047',
        records: [[1024]],
      }),
    );
    expect((await source.read(0, 0, 1))[0]).toBeCloseTo(5.003663, 6);
  });

  it('are turned round where the physical limits are', async () => {
    // CV-34.
    const source = await open(one({ physicalMin: '500', physicalMax: '-500' }));
    expect((await source.read(0, 1, 2))[0]).toBeCloseTo(-15.2666514, 6);
    expect(source.recording.channels[0].railsUv).toEqual([-500, 500]);
    expect(source.recording.channels[0].stepUv).toBeCloseTo(1000 / 65535, 12);
  });

  it.each([
    ['V', 1e6],
    ['mV', 1e3],
    ['uV', 1],
    ['\u00b5V', 1],
    ['nV', 1e-3],
  ])('in %s become microvolts', async (dimension, factor) => {
    const source = await open(one({ dimension, physicalMin: '-32768', physicalMax: '32767' }));
    expect((await source.read(0, 1, 2))[0]).toBeCloseTo(1000 * factor, 6);
  });

  it('below and above the declared range are kept', async () => {
    const limits = {
      digitalMin: '-100',
      digitalMax: '100',
      physicalMin: '-100',
      physicalMax: '100',
    };
    const source = await open(one({ ...limits, records: [[200, -300]] }));
    expect([...(await source.read(0, 0, 2))]).toEqual([200, -300]);
  });
});

describe('records', () => {
  const ramp = (from: number, count: number) => Array.from({ length: count }, (_, i) => from + i);
  const twoRates: FileBytes = {
    recordDuration: '2.5',
    signals: [
      {
        label: 'fast',
        physicalMin: '-32768',
        physicalMax: '32767',
        records: [0, 1, 2].map((r) => ramp(r * 10, 10)),
      },
      {
        label: 'slow',
        physicalMin: '-32768',
        physicalMax: '32767',
        records: [0, 1, 2].map((r) => ramp(100 + r * 5, 5)),
      },
    ],
  };

  it('of any duration give each signal its own rate', async () => {
    const { recording } = await open(twoRates);
    expect(recording.channels.map((channel) => channel.rateHz)).toEqual([4, 2]);
    expect(recording.channels.map((channel) => channel.sampleCount)).toEqual([30, 15]);
    expect(recording.durationS).toBe(7.5);
  });

  it('are joined without a seam, whatever stretch is asked for', async () => {
    const source = await open(twoRates);
    expect([...(await source.read(0, 7, 23))]).toEqual(ramp(7, 16));
    expect([...(await source.read(1, 3, 99))]).toEqual(ramp(103, 12));
    expect([...(await source.read(1, -4, 2))]).toEqual([100, 101]);
    expect(await source.read(0, 40, 50)).toHaveLength(0);
  });

  it('longer than a slice of the file are read in parts', async () => {
    // One record of 1.5 million samples a signal: 6 MB.
    const words = 1_500_000;
    const head = edfBytes({
      recordDuration: '1500',
      recordCount: '1',
      signals: [
        {
          label: 'a',
          samplesPerRecord: String(words),
          physicalMin: '-32768',
          physicalMax: '32767',
          records: [],
        },
        {
          label: 'b',
          samplesPerRecord: String(words),
          physicalMin: '-32768',
          physicalMax: '32767',
          records: [],
        },
      ],
    });
    const data = Int16Array.from({ length: 2 * words }, (_, i) => (i % 30011) - 15000);
    const source = await openRecording(new Blob([head, data]), 'long.edf', null);
    const joined: number[] = [];
    let count = 0;
    for await (const block of source.blocks([1])) {
      expect(block.firstSamples[0]).toBe(count);
      expect(block.fromS).toBeCloseTo(count / 1000, 9);
      count += block.samples[0].length;
      joined.push(block.samples[0][0]);
    }
    expect(count).toBe(words);
    expect(joined.length).toBeGreaterThan(1);
    expect([...(await source.read(1, 1_499_998, 1_500_005))]).toEqual([
      data[2 * words - 2],
      data[2 * words - 1],
    ]);
  });

  it('have the size that CV-35 gives, to the byte', async () => {
    // CV-35: header 256 * (5 + 1) = 1536, 180 records of 5 * 2500 * 2 = 25 000 bytes.
    const signal = { label: 'EGG', samplesPerRecord: '2500', records: [] };
    const header = edfBytes({
      recordDuration: '10',
      recordCount: '180',
      signals: Array.from({ length: 5 }, (_, i) => ({ ...signal, label: `E${i + 1}` })),
    });
    const file = new Blob([header, new Uint8Array(180 * 25_000)]);
    expect(file.size).toBe(4_501_536);
    const { recording } = await openRecording(file, 'study.edf', null);
    expect(recording.found).toEqual([]);
    expect(recording.durationS).toBe(1800);
    expect(recording.channels.map((one) => [one.rateHz, one.sampleCount])).toEqual(
      new Array(5).fill([250, 450_000]),
    );
  });
});

describe('channels', () => {
  it('have labels of their own', async () => {
    const records = [[0]];
    const labels = ['EGG', 'EGG', '', 'ECG', 'EGG 1'];
    const { recording } = await open({ signals: labels.map((label) => ({ label, records })) });
    expect(recording.channels.map((channel) => channel.label)).toEqual([
      'EGG 2',
      'EGG 3',
      'channel 3',
      'ECG',
      'EGG 1',
    ]);
    expect(recording.found.filter((found) => found.place?.startsWith('signal'))).toHaveLength(3);
  });

  it('in a unit that is no voltage are read in it and named', async () => {
    const records = [[100]];
    const source = await open({
      signals: [
        { label: 'Resp', dimension: 'degC', physicalMin: '-32768', physicalMax: '32767', records },
        { label: 'EGG', records },
      ],
    });
    expect(source.recording.channels[0].unit).toEqual({ kind: 'unknown', text: 'degC' });
    expect((await source.read(0, 0, 1))[0]).toBe(100);
    expect(source.recording.found[0].what).toMatch(/“Resp” is in “degC”.*breathing lead only/);
  });

  it('carry transducer, filters and markup as plain text', async () => {
    const { recording } = await open(
      one({ label: '<img src=x>', transducer: 'AgAgCl', prefilter: 'HP:0.016Hz LP:35Hz' }),
    );
    expect(recording.channels[0]).toMatchObject({
      label: '<img src=x>',
      transducer: 'AgAgCl',
      prefilter: { kind: 'stated', highPassHz: 0.016, lowPassHz: 35 },
    });
  });
});

describe('EDF+ annotations', () => {
  const keep = (onset: string, ...more: (string | number)[]) =>
    annotationBytes(40, onset, 0x14, 0x14, 0, ...more);
  const plus = (records: Uint8Array[], more: Uint8Array[] | null = null): FileBytes => ({
    reserved: 'EDF+C',
    signals: [
      { records: records.map(() => [0, 0, 0, 0]) },
      annotationSignal(records),
      ...(more ? [annotationSignal(more)] : []),
    ],
  });

  it('of every annotation signal are listed in order of time', async () => {
    const { recording } = await open(
      plus(
        [keep('+0', '+1.5', 0x14, 'late', 0x14, 0), keep('+1')],
        [annotationBytes(40, '+0.5', 0x15, '2', 0x14, 'early', 0x14, 0), annotationBytes(40)],
      ),
    );
    expect(recording.format).toBe('EDF+C');
    expect(recording.channels).toHaveLength(1);
    expect(recording.annotations).toEqual([
      { onsetS: 0.5, durationS: 2, text: 'early' },
      { onsetS: 1.5, durationS: null, text: 'late' },
    ]);
    expect(recording.found).toEqual([]);
  });

  it('count from the first sample where the first record starts within the second', async () => {
    const { recording } = await open(
      plus([keep('+0.25', '+1.25', 0x14, 'meal', 0x14, 0), keep('+1.25')]),
    );
    expect(recording.start).toEqual({ kind: 'known', local: '2021-03-02T10:20:30.25' });
    expect(recording.annotations[0].onsetS).toBe(1);
  });

  it('without record times leave the records in their order, and this is said', async () => {
    const { recording } = await open(plus([annotationBytes(8), annotationBytes(8)]));
    expect(recording.found.map((found) => found.what)).toEqual([
      '2 of 2 records do not say when they start; they were taken as following on',
    ]);
  });

  it('that cannot be read are counted', async () => {
    const { recording } = await open(plus([keep('+0', 'rubbish', 0), keep('+1')]));
    expect(recording.found[0]).toMatchObject({
      severity: 'warning',
      what: '1 annotation lists could not be read',
    });
  });
});
