import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { openRecording } from '../../src/decode/formats';

/**
 * Tables written by Python's csv module (3.11) and by R's write.csv, write.csv2 and write.table (4.2), with the numbers they
 * were given: test/fixtures/csv and the scripts in it.
 */
const FOLDER = new URL('../fixtures/csv/', import.meta.url);
const TRUTH: {
  readonly rate_hz: number;
  readonly missing: readonly number[];
  readonly egg_uv: readonly number[];
  readonly ecg_uv: readonly number[];
} = JSON.parse(readFileSync(new URL('truth.json', FOLDER), 'utf8'));
const bare = { rateHz: TRUTH.rate_hz, unit: 'uV' };

describe.each([
  ['comma.csv', 'comma, decimal point', null],
  ['comma-quoted-crlf.csv', 'every cell quoted, CRLF', null],
  ['comma-bare.csv', 'no names, no times', bare],
  ['semicolon-comma.csv', 'semicolon, decimal comma', null],
  ['semicolon-point-ms.csv', 'semicolon, decimal point, times in ms, mV', null],
  ['semicolon-clock.csv', 'a row of units, clock times past midnight', null],
  ['tab-units.tsv', 'tab, a row of units, ms, nV', null],
  ['tab-comma-clock.tsv', 'tab, decimal comma, clock times, V', null],
  ['blanks.txt', 'blanks, a row of units', null],
  ['blanks-comma-bare.txt', 'blanks, decimal comma, no names, no times', bare],
  ['r-write.csv', 'R write.csv', null],
  ['r-write.csv2.csv', 'R write.csv2', null],
  ['r-write-table.txt', 'R write.table', null],
] as const)('%s (%s)', (name, _, reading) => {
  it('is read to the numbers it was made of', async () => {
    const blob = new Blob([readFileSync(new URL(name, FOLDER))]);
    const source = await openRecording(blob, name, reading);
    const { channels } = source.recording;
    expect(channels.map(({ rateHz }) => rateHz)).toEqual([50, 50]);
    if (!reading) expect(channels.map(({ label }) => label)).toEqual(['EGG', 'ECG']);
    const [egg, ecg] = await Promise.all([0, 1].map((channel) => source.read(channel, 0, 1e9)));
    expect([egg.length, ecg.length]).toEqual([120, 120]);
    TRUTH.egg_uv.forEach((value, i) => {
      if (TRUTH.missing.includes(i)) expect(egg[i]).toBeNaN();
      else expect(egg[i]).toBeCloseTo(value, 9);
      expect(ecg[i]).toBeCloseTo(TRUTH.ecg_uv[i], 9);
    });
  });
});

it('a table with the names of its rows (R write.csv2) is read, the row names as a counter', async () => {
  const blob = new Blob([readFileSync(new URL('r-row-names.csv2.csv', FOLDER))]);
  const source = await openRecording(blob, 'r-row-names.csv2.csv', null);
  expect(source.recording.channels.map(({ label }) => label)).toContain('EGG');
  const at = source.recording.channels.findIndex(({ label }) => label === 'ECG');
  const ecg = await source.read(at, 0, 1e9);
  expect(ecg[20]).toBeCloseTo(TRUTH.ecg_uv[20], 9);
});
