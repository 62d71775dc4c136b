import { describe, expect, it } from 'vitest';
import { openRecording } from '../../src/decode/formats';
import { annotationBytes, annotationSignal, blobOf, edfBytes, type FileBytes } from './edf-bytes';
import { refused } from './refused';

const open = (file: FileBytes) => openRecording(blobOf(file), 'study.edf', null);
const records = [
  [1, 2, 3, 4],
  [5, 6, 7, 8],
  [9, 10, 11, 12],
];
const good: FileBytes = { signals: [{ records }] };
const withSignal = (signal: Partial<FileBytes['signals'][number]>): FileBytes => ({
  signals: [
    { records, ...signal },
    { label: 'good', records },
  ],
});

describe('defects that leave the samples readable are named', () => {
  const survives = async (file: FileBytes, words: RegExp) => {
    const { recording } = await open(file);
    expect(recording.found.map((found) => found.what).join('\n')).toMatch(words);
    return recording;
  };

  it('record count -1: whole records are counted', async () => {
    const recording = await survives(
      { ...good, recordCount: '-1' },
      /“-1” records .*3 whole records were found/,
    );
    expect(recording.durationS).toBe(3);
  });

  it.each(['', '0', 'many', '-7'])('record count “%s": the same', async (recordCount) => {
    expect((await survives({ ...good, recordCount }, /3 whole records/)).durationS).toBe(3);
  });

  it('count larger than the file', async () => {
    const recording = await survives({ ...good, recordCount: '9' }, /3 of 9 records are there/);
    expect(recording.durationS).toBe(3);
  });

  it('count smaller than the file: the tail is left out', async () => {
    const recording = await survives({ ...good, recordCount: '2' }, /8 bytes after the last of 2/);
    expect(recording.durationS).toBe(2);
  });

  it('a last record cut off is dropped, never filled up', async () => {
    const recording = await survives(
      { ...good, recordCount: '4', tail: Uint8Array.of(1, 2, 3) },
      /3 of 4 records .*last 3 bytes/,
    );
    expect(recording.channels[0].sampleCount).toBe(12);
  });

  it.each(['513', '', '100000', '-5'])('header length “%s”', async (headerBytes) => {
    const recording = await survives({ ...good, headerBytes }, /512, which was used/);
    expect(recording.durationS).toBe(3);
  });

  it('decimal commas', async () => {
    const recording = await survives(
      { ...withSignal({ physicalMin: '-0,5', physicalMax: '0,5' }), recordDuration: '0,5' },
      /“0,5”, has a comma/,
    );
    expect(recording.channels[0].rateHz).toBe(8);
    expect(recording.channels[0].railsUv).toEqual([-0.5, 0.5]);
  });

  it('characters outside ASCII', async () => {
    const recording = await survives(withSignal({ label: 'Brust\u00fc' }), /outside ASCII/);
    expect(recording.channels[0].label).toBe('Brust\u00fc');
  });

  it('padding by NUL instead of blanks', async () => {
    const file = edfBytes(good);
    file.fill(0, 1, 8);
    file.fill(0, 256 + 3, 256 + 16);
    const { recording } = await openRecording(new Blob([file]), 'study.edf', null);
    expect(recording.channels[0].label).toBe('EGG');
  });

  it.each([
    ['digital limits that do not rise', { digitalMin: '5', digitalMax: '5' }],
    ['digital limits that are no numbers', { digitalMin: 'x' }],
    ['equal physical limits', { physicalMin: '0', physicalMax: '0' }],
    ['physical limits that are no numbers', { physicalMax: '' }],
    ['physical limits with a comma that may group', { physicalMax: '1,234' }],
  ])('%s: that signal has no voltage, the others do', async (_, signal) => {
    const recording = await survives(withSignal(signal), /digital units .* breathing lead only/);
    expect(recording.channels[0].unit).toEqual({ kind: 'unknown', text: 'digital units' });
    expect(recording.channels[0].railsUv).toBeNull();
    expect(recording.channels[1].unit.kind).toBe('voltage');
  });

  it('an annotation signal in plain EDF is read', async () => {
    const bytes = annotationBytes(20, '+1', 0x14, 'meal', 0x14, 0);
    const recording = await survives(
      { signals: [{ records: [[0]] }, annotationSignal([bytes])] },
      /plain EDF and has an annotation signal/,
    );
    expect(recording.annotations[0].text).toBe('meal');
  });
});

describe('what cannot be read is refused with its place and the remedy', () => {
  const cases: [string, FileBytes, string, RegExp, RegExp][] = [
    ['no signals', { ...good, signalCount: '0' }, 'broken-format', /“0” as the number/, /byte 252/],
    [
      'blank count',
      { ...good, signalCount: '' },
      'broken-format',
      /blank as the number/,
      /byte 252/,
    ],
    ['negative count', { ...good, signalCount: '-2' }, 'broken-format', /“-2”/, /byte 252/],
    ['9999 signals', { ...good, signalCount: '9999' }, 'broken-format', /“9999”/, /byte 252/],
    [
      'more signals than file',
      { ...good, signalCount: '400' },
      'broken-format',
      /ends inside its header/,
      /byte/,
    ],
    [
      'zero-length records',
      { ...good, recordDuration: '0' },
      'broken-format',
      /“0”, so no sampling rate/,
      /byte 244/,
    ],
    [
      'blank duration',
      { ...good, recordDuration: '' },
      'broken-format',
      /no sampling rate/,
      /byte 244/,
    ],
    [
      'negative duration',
      { ...good, recordDuration: '-1' },
      'broken-format',
      /“-1”.*no positive/,
      /byte 244/,
    ],
    ['duration NaN', { ...good, recordDuration: 'NaN' }, 'broken-format', /“NaN”/, /byte 244/],
    [
      'no samples',
      withSignal({ samplesPerRecord: '0' }),
      'broken-format',
      /signal 1.*“0” samples/,
      /byte 688, samples in a record of signal 1/,
    ],
    [
      'negative samples',
      withSignal({ samplesPerRecord: '-4' }),
      'broken-format',
      /“-4” samples/,
      /byte 688/,
    ],
    [
      'a billion samples',
      withSignal({ samplesPerRecord: '1E9' }),
      'broken-format',
      /“1E9” samples/,
      /byte 688/,
    ],
    [
      'sizes past the file',
      withSignal({ samplesPerRecord: '99999999' }),
      'broken-format',
      /no whole record/,
      /byte 236/,
    ],
    [
      'unknown units only',
      { signals: [{ dimension: 'mmHg', records }] },
      'wrong-input',
      /“mmHg”/,
      /dimension/,
    ],
    ['no unit', { signals: [{ dimension: '', records }] }, 'wrong-input', /blank/, /dimension/],
  ];

  it.each(cases)('%s', async (_, file, kind, message, place) => {
    const failure = await refused(open(file));
    expect(failure.kind).toBe(kind);
    expect(failure.message).toMatch(/^study\.edf: /);
    expect(failure.message).toMatch(message);
    expect(failure.place).toMatch(place);
    expect(failure.remedy.length).toBeGreaterThan(10);
  });

  it('annotations without a signal', async () => {
    const file = {
      reserved: 'EDF+C',
      signals: [annotationSignal([annotationBytes(10, '+0', 0x14, 0x14, 0)])],
    };
    expect(await refused(open(file))).toMatchObject({
      kind: 'wrong-input',
      message: 'study.edf: the file holds annotations only and no signal.',
    });
  });

  it('a file cut inside its header', async () => {
    const file = edfBytes(good);
    for (const size of [9, 100, 256, 511])
      expect(
        (await refused(openRecording(new Blob([file.slice(0, size)]), 'a.edf', null))).message,
      ).toMatch(new RegExp(`ends inside its header: ${size} of`));
  });

  it('a file that changed after it was chosen', async () => {
    const gone = new Blob([edfBytes(good)]);
    const source = await openRecording(gone, 'study.edf', null);
    gone.slice = () => {
      throw new DOMException('changed', 'NotReadableError');
    };
    expect(await refused(source.read(0, 0, 4))).toMatchObject({
      kind: 'unreadable',
      remedy: 'Choose the same file again.',
    });
  });
});
