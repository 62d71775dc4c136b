import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { openRecording } from '../../src/decode/formats';

/**
 * Files written by EDFlib 1.23 (Debian libedf-dev) through test/fixtures/edflib/edflib_files.c, and the numbers it was given:
 * the reader under test had no part in either.
 */
const FOLDER = new URL('../fixtures/edflib/', import.meta.url);

interface TruthChannel {
  readonly label: string;
  readonly unit: string;
  readonly rate_hz: number;
  readonly low: number;
  readonly high: number;
  readonly digital_low: number;
  readonly digital_high: number;
  readonly digital: readonly number[];
}
interface Truth {
  readonly channels: readonly TruthChannel[];
  readonly annotations: readonly (readonly [number, number | null, string])[];
}
const TRUTH: Readonly<Record<'edf' | 'bdf', Truth>> = JSON.parse(
  readFileSync(new URL('truth.json', FOLDER), 'utf8'),
);
const MICROVOLTS: Readonly<Record<string, number>> = { uV: 1, mV: 1000, nV: 0.001 };

const open = (name: string) =>
  openRecording(new Blob([readFileSync(new URL(name, FOLDER))]), name, null);

/** Value by the scale of Kemp 1992 in uV. */
const microvoltsOf = (digital: number, channel: TruthChannel): number => {
  const { low, high, digital_low, digital_high, unit } = channel;
  const gain = (high - low) / (digital_high - digital_low);
  return ((digital - digital_low) * gain + low) * MICROVOLTS[unit];
};

describe.each([
  ['contiguous.edf', 'EDF+C', 'edf', true],
  ['plain.edf', 'EDF', 'edf', false],
  ['contiguous.bdf', 'BDF+C', 'bdf', true],
  ['plain.bdf', 'BDF', 'bdf', false],
] as const)('%s, written by EDFlib, is read', (name, format, kind, annotated) => {
  const truth = TRUTH[kind];

  it('with its labels, rates and length', async () => {
    const { recording } = await open(name);
    expect(recording.format).toBe(format);
    expect(recording.durationS).toBe(4);
    expect(recording.gaps).toEqual([]);
    expect(recording.found).toEqual([]);
    expect(recording.start).toEqual({ kind: 'known', local: '2031-07-09T08:15:30' });
    expect(recording.channels.map(({ label, rateHz }) => [label, rateHz])).toEqual(
      truth.channels.map(({ label, rate_hz }) => [label, rate_hz]),
    );
  });

  it('with every sample, in uV', async () => {
    const source = await open(name);
    for (const [index, channel] of truth.channels.entries()) {
      const samples = await source.read(index, 0, Number.POSITIVE_INFINITY);
      const wanted = channel.digital.map((digital) => microvoltsOf(digital, channel));
      const size = Math.max(...wanted.map(Math.abs));
      expect(samples.length).toBe(wanted.length);
      expect(Math.max(...wanted.map((value, i) => Math.abs(value - samples[i])))).toBeLessThan(
        1e-12 * size,
      );
    }
  });

  it('in blocks as in single reads', async () => {
    const source = await open(name);
    for await (const { samples } of source.blocks([0, 1, 2]))
      for (const channel of [0, 1, 2])
        expect(samples[channel]).toEqual(await source.read(channel, 0, Number.POSITIVE_INFINITY));
  });

  it('with the annotations of both annotation signals', async () => {
    const { recording } = await open(name);
    const read = recording.annotations.map((one) => [one.onsetS, one.durationS, one.text]);
    expect(read).toEqual(annotated ? truth.annotations : []);
  });
});
