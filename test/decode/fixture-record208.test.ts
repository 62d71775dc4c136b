import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { openRecording } from '../../src/decode/formats';

const folder = new URL('../fixtures/record208/', import.meta.url);
const open = (name: string) =>
  openRecording(new Blob([readFileSync(new URL(name, folder))]), name, null);
const truth = JSON.parse(readFileSync(new URL('truth.json', folder), 'utf8'));

describe('files that EDFlib wrote (test/fixtures/record208)', () => {
  it('plain EDF: labels, units, rates of each signal and length', async () => {
    const { recording } = await open('record208-rates.edf');
    expect(recording.format).toBe('EDF');
    expect(recording.durationS).toBe(truth.seconds);
    expect(recording.found).toEqual([]);
    expect(recording.channels.map(({ label, rateHz, unit }) => [label, rateHz, unit.text])).toEqual(
      [
        ['ECG MLII', 360, 'mV'],
        ['EGG', 4, 'uV'],
        ['Resp chest', 20, 'mV'],
      ],
    );
    expect(recording.channels.map((channel) => channel.prefilter)).toMatchObject([
      { kind: 'stated', highPassHz: 0.1, lowPassHz: 100 },
      { kind: 'stated', highPassHz: 0, lowPassHz: 1.8 },
      { kind: 'unknown' },
    ]);
  });

  it('plain EDF: the ECG that scipy documents, to within a step of the digitiser', async () => {
    const source = await open('record208-rates.edf');
    const { stepUv } = source.recording.channels[0];
    expect(stepUv).toBeCloseTo(20475 / 4095, 4);
    const first = await source.read(0, 0, 3);
    // First and last values: scipy 1.10, docstring of scipy.misc.electrocardiogram.
    [-245, -215, -185].forEach((uv, i) => {
      expect(Math.abs(first[i] - uv)).toBeLessThan(0.01);
    });
    const last = await source.read(0, 107_997, 108_000);
    [-405, -395, -385].forEach((uv, i) => {
      expect(Math.abs(last[i] - uv)).toBeLessThan(0.01);
    });
    let sum = 0;
    let count = 0;
    for await (const { samples } of source.blocks([0])) {
      for (const uv of samples[0]) sum += uv;
      count += samples[0].length;
    }
    expect(count).toBe(108_000);
    // Mean -0.16510875 mV in the same docstring.
    expect(sum / count).toBeCloseTo(-165.10875, 1);
  });

  it('EDF+C: identity, start, and annotations in UTF-8', async () => {
    const { recording } = await open('record208-abdomen.edf');
    expect(recording.format).toBe('EDF+C');
    expect(recording.identity).toEqual({
      code: 'MITDB-208',
      name: null,
      sex: null,
      birthYear: null,
      recordingText: 'EDFlib',
    });
    expect(recording.start).toEqual({ kind: 'known', local: '2020-03-01T09:00:00' });
    expect(recording.annotations).toEqual([
      { onsetS: 0, durationS: 300, text: 'fasting' },
      { onsetS: 120.5, durationS: null, text: 'water 20 °C' },
      { onsetS: 209, durationS: 4, text: 'moved' },
    ]);
    expect(recording.found).toEqual([]);
    expect(recording.invented).toBe(false);
  });

  it('EDF+C: the words of the file, scaled by its limits', async () => {
    const source = await open('record208-abdomen.edf');
    const bytes = readFileSync(new URL('record208-abdomen.edf', folder));
    expect(source.recording.channels.map((channel) => channel.label)).toEqual(truth.channels);
    // Signals 360 + 360 + 360 samples and the annotation signal; header of 256 * 5 bytes.
    const recordBytes = (bytes.length - 1280) / 300;
    for (const [channel, sample] of [
      [0, 0],
      [1, 359],
      [2, 54_321],
      [0, 107_999],
    ]) {
      const record = Math.floor(sample / 360);
      const word = bytes.readInt16LE(
        1280 + record * recordBytes + 2 * (channel * 360 + (sample % 360)),
      );
      const [uv] = await source.read(channel, sample, sample + 1);
      expect(uv).toBeCloseTo(-2000 + ((word + 32_768) * 4000) / 65_535, 9);
    }
  });
});
