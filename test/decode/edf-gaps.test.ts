import { describe, expect, it } from 'vitest';
import { openRecording } from '../../src/decode/formats';
import { annotationBytes, annotationSignal, blobOf, type FileBytes } from './edf-bytes';

/**
 * EDF+D: "the first annotation list of each record says when it starts, and records need not follow one another" (Kemp &
 * Olivan 2003, Clin Neurophysiol 114:1755). EDFlib neither writes nor opens EDF+D, so the bytes are put together by hand.
 */
const timed = (onset: string, ...rest: (string | number)[]) =>
  annotationBytes(48, onset, 0x14, 0x14, 0, ...rest);

/** Records of 1 s: four samples of 10 uV a step on the first channel, two on the second; record k holds 10 k + i. */
function withTimes(onsets: readonly string[], rest: Partial<FileBytes> = {}): FileBytes {
  const words = (count: number) =>
    onsets.map((_, record) => Array.from({ length: count }, (_, i) => 10 * record + i));
  const scale = { physicalMin: '-327680', physicalMax: '327670' };
  return {
    reserved: 'EDF+D',
    recordDuration: '1',
    signals: [
      { ...scale, records: words(4) },
      { ...scale, label: 'ECG', records: words(2) },
      annotationSignal(onsets.map((onset) => (onset === '' ? annotationBytes(48) : timed(onset)))),
    ],
    ...rest,
  };
}
const open = (file: FileBytes) => openRecording(blobOf(file), 'gaps.edf', null);
const all = Number.POSITIVE_INFINITY;
const NaNs = (count: number) => Array.from({ length: count }, () => Number.NaN);

describe('a recording with gaps', () => {
  it('keeps each record at its own time and the gaps between them', async () => {
    const source = await open(withTimes(['+0', '+1', '+5.5']));
    expect(source.recording.durationS).toBe(6.5);
    expect(source.recording.gaps).toEqual([{ channel: null, fromS: 2, toS: 5.5 }]);
    expect([...(await source.read(0, 0, all))]).toEqual([
      ...[0, 10, 20, 30, 100, 110, 120, 130],
      ...NaNs(14),
      ...[200, 210, 220, 230],
    ]);
    expect([...(await source.read(1, 0, all))]).toEqual([0, 10, 100, 110, ...NaNs(7), 200, 210]);
  });

  it('says how many gaps there are and how long', async () => {
    const { recording } = await open(withTimes(['+0', '+3', '+4', '+10.25']));
    expect(recording.found).toEqual([
      {
        severity: 'note',
        what: '2 stretches without samples, 7.25 s in all; figures leave them out',
        place: 'record 2, byte 1084',
      },
    ]);
  });

  it('puts a record to the nearest sample where its time lies between two', async () => {
    const source = await open(withTimes(['+0', '+2.1', '+3.1']));
    expect(await source.read(0, 8, 10)).toEqual(Float64Array.of(100, 110));
    expect(source.recording.channels.map(({ sampleCount }) => sampleCount)).toEqual([16, 8]);
    expect(source.recording.gaps).toEqual([{ channel: null, fromS: 1, toS: 2.1 }]);
  });

  it('gives the same samples in blocks as in single reads, without a hole between blocks', async () => {
    const source = await open(withTimes(['+0', '+1', '+5.5', '+6.5', '+9']));
    const next = [0, 0];
    const parts: number[][] = [[], []];
    let beforeS = -1;
    for await (const { firstSamples, samples, fromS } of source.blocks([0, 1])) {
      expect(fromS).toBeGreaterThan(beforeS);
      beforeS = fromS;
      for (const i of [0, 1]) {
        expect(firstSamples[i]).toBe(next[i]);
        next[i] += samples[i].length;
        parts[i].push(...samples[i]);
      }
    }
    for (const i of [0, 1]) expect(parts[i]).toEqual([...(await source.read(i, 0, all))]);
  });

  it('counts time from the first sample, where the first record does not start at 0', async () => {
    const { recording } = await open(withTimes(['+0.25', '+1.25', '+4.25']));
    expect(recording.gaps).toEqual([{ channel: null, fromS: 2, toS: 4 }]);
    expect(recording.start).toEqual({ kind: 'known', local: '2021-03-02T10:20:30.25' });
  });

  it('keeps annotations on the same clock as the samples after a gap', async () => {
    const file = withTimes(['+0', '+5']);
    const marked = annotationSignal([timed('+0'), timed('+5', '+5.5', 0x14, 'drank', 0x14, 0)]);
    const { recording } = await open({ ...file, signals: [...file.signals.slice(0, 2), marked] });
    expect(recording.annotations).toEqual([{ onsetS: 5.5, durationS: null, text: 'drank' }]);
  });

  it('takes a record without a time as following on', async () => {
    const { recording } = await open(withTimes(['+0', '', '+4']));
    expect(recording.gaps).toEqual([{ channel: null, fromS: 2, toS: 4 }]);
    expect(recording.found[0].what).toBe(
      '1 of 3 records do not say when they start; they were taken as following on',
    );
  });
});

describe('times that contradict themselves', () => {
  it.each([
    ['backwards', ['+0', '+5', '+3']],
    ['over each other', ['+0', '+1', '+1.5']],
    ['by years', ['+0', '+1', '+90000000']],
  ])('running %s are not trusted: records lie end to end, and this is said', async (_, onsets) => {
    const source = await open(withTimes(onsets));
    expect(source.recording.durationS).toBe(3);
    expect(source.recording.gaps).toEqual([]);
    expect(await source.read(1, 0, all)).toEqual(Float64Array.of(0, 10, 100, 110, 200, 210));
    expect(source.recording.found[0]).toMatchObject({
      severity: 'warning',
      place: 'record 3, byte 1144',
    });
    expect(source.recording.found[0].what).toMatch(/record 3 begins at .* cannot be trusted/);
  });

  it('a gap that would take a thousand times the memory of the file is not laid out', async () => {
    const onsets = ['+0', '+1800'];
    const { recording } = await open(withTimes(onsets, { recordDuration: '1E-6' }));
    expect(recording.gaps).toEqual([]);
    expect(recording.channels.map(({ sampleCount }) => sampleCount)).toEqual([8, 4]);
  });

  it('a gap in a file that calls itself uninterrupted is kept, with a warning', async () => {
    const { recording } = await open(withTimes(['+0', '+1', '+7.5'], { reserved: 'EDF+C' }));
    expect(recording.gaps).toEqual([{ channel: null, fromS: 2, toS: 7.5 }]);
    expect(recording.found[0]).toMatchObject({ severity: 'warning' });
    expect(recording.found[0].what).toMatch(/^the file calls itself uninterrupted, but 1 stretch /);
  });

  it('a clock that is a little fast makes no gaps, and is named', async () => {
    const onsets = Array.from({ length: 40 }, (_, i) => `+${(i * 1.02).toFixed(2)}`);
    const { recording } = await open(withTimes(onsets));
    expect(recording.gaps).toEqual([]);
    expect(recording.durationS).toBe(40);
    expect(recording.found[0].what).toMatch(/wander by up to 780 ms/);
  });

  it('a gap after a slow clock is still a gap', async () => {
    const slow = Array.from({ length: 40 }, (_, i) => `+${(i * 0.98).toFixed(2)}`);
    const { recording } = await open(withTimes([...slow, '+49.22', '+50.2']));
    expect(recording.gaps).toHaveLength(1);
    expect(recording.gaps[0].fromS).toBe(40);
    expect(recording.gaps[0].toS).toBeCloseTo(50, 9);
  });
});
