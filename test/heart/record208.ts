import { readFileSync } from 'node:fs';
import { bandPassTaps, convolveSame } from '../../src/numeric/fir';

/**
 * The real recording of test/fixtures/record208, read by the offsets of Kemp 1992 and not by our own reader. Source and built
 * bench lie equally deep.
 */
const folder = new URL('../../test/fixtures/record208/', import.meta.url);
export const RATE_HZ = 360;
const SECONDS = 300;

interface Reference {
  readonly beats: readonly { readonly time_s: number; readonly class: 'N' | 'V' | null }[];
  readonly not_scored: readonly { readonly from_s: number; readonly to_s: number }[];
}

export const reference: Reference = JSON.parse(
  readFileSync(new URL('reference-beats.json', folder), 'utf8'),
);
export const referenceTimesS = reference.beats.map((beat) => beat.time_s);

/** Whether beats at a time are scored: not where the amplifier was driven to its limit. */
export const isScored = (timeS: number) =>
  !reference.not_scored.some(({ from_s, to_s }) => timeS >= from_s && timeS < to_s);

/** The ECG as recorded, in mV. */
export function ecgMv(): Float64Array {
  const file = readFileSync(new URL('record208-rates.edf', folder));
  const perRecord = 900 + 10 + 50;
  return Float64Array.from({ length: SECONDS * RATE_HZ }, (_, i) => {
    const record = Math.floor(i / 900);
    return file.readInt16LE(4 * 256 + 2 * (record * perRecord + (i % 900))) / 200;
  });
}

/** Channel 0, 1 or 2 of the abdominal mixture, in uV. */
export function abdomenUv(channel: number): Float64Array {
  const file = readFileSync(new URL('record208-abdomen.edf', folder));
  const annotations = Number(file.toString('latin1', 256 + 4 * 216 + 24, 256 + 4 * 216 + 32));
  const perRecord = 3 * RATE_HZ + annotations;
  return Float64Array.from({ length: SECONDS * RATE_HZ }, (_, i) => {
    const record = Math.floor(i / RATE_HZ);
    const place = record * perRecord + channel * RATE_HZ + (i % RATE_HZ);
    return ((file.readInt16LE(5 * 256 + 2 * place) + 32768) * 4000) / 65535 - 2000;
  });
}

/** The heartbeat signal: zero-phase, about 0.5-40 Hz. */
export function heartbeatOf(raw: Float64Array, rateHz: number): Float64Array {
  const taps = bandPassTaps({
    rateHz,
    lowStopHz: 0.2,
    lowPassHz: 0.8,
    highPassHz: 36,
    highStopHz: 44,
    attenuationDb: 50,
  });
  return convolveSame(raw, taps, 'reflect-odd');
}
