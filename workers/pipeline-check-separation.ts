import { log10 } from '../src/numeric/elementary';
import { DEFAULT_SETTINGS, type Settings } from '../src/recording/settings';
import { bandPeaks } from '../src/stomach/dominant-peak';
import { windowSpectra } from '../src/stomach/window-spectrum';
import { ARITHMETIC, type CheckValue, within } from './check-value';
import type { Job } from './job';
import {
  beatsAt,
  df,
  LEAD,
  type MakePipeline,
  most,
  RATE_HZ,
  type Result,
  taken,
} from './self-check-lead';

const rms = (x: Float64Array): number => {
  const mean = x.reduce((sum, value) => sum + value, 0) / x.length;
  return Math.sqrt(x.reduce((sum, value) => sum + (value - mean) ** 2, 0) / x.length);
};

function drawnOf({ pipeline }: Result) {
  const drawn = pipeline.slowWave(LEAD);
  if (!drawn) throw new Error('no slow wave was made');
  return drawn;
}

/** In-band rms of steady beats in the 4 Hz lead over that of the lead picked once a second. */
async function foldedShare(make: MakePipeline, job: Job): Promise<number> {
  const minutes = 10;
  const times = Array.from({ length: minutes * 63 + 1 }, (_, i) => (i * 60) / 63);
  const picked = beatsAt(times);
  const naive = Float64Array.from({ length: 540 }, (_, i) => picked(30 + i));
  const result = await taken(
    make,
    { minutes, rateHz: RATE_HZ, limitUv: 400, uvAt: beatsAt(times) },
    { heart: false, phases: [], settings: DEFAULT_SETTINGS },
    job,
  );
  const { recorded, rateHz } = drawnOf(result);
  return rms(recorded.subarray(30 * rateHz, recorded.length - 30 * rateHz)) / rms(naive);
}

/** Level of the 6 cpm line over the 3 cpm line of a sawtooth after a derivative, dB; and the epochs' greatest distance from 3 cpm. */
async function sawtooth(make: MakePipeline, order: number, job: Job) {
  const settings: Settings = {
    ...DEFAULT_SETTINGS,
    slowRoute: 'fractional',
    fractional: { ...DEFAULT_SETTINGS.fractional, order, slowWindowMs: 100, memoryS: 240 },
  };
  const result = await taken(
    make,
    { minutes: 20, rateHz: 50, limitUv: 200, uvAt: (t) => 300 * ((t / 20) % 1) - 150 },
    { heart: false, phases: [], settings },
    job,
  );
  const { forSpectra, rateHz } = drawnOf(result);
  const kept = new Uint8Array(forSpectra.length).fill(1);
  const spectra = windowSpectra({
    signal: forSpectra,
    kept,
    rateHz,
    lengthS: 240,
    powerResponse: null,
  });
  const density = spectra.density(spectra.prepare(rateHz * 480));
  const peaks = bandPeaks(density, spectra.binCpm, { lowCpm: 2, highCpm: 7 });
  const level = (cpm: number) =>
    10 * log10(peaks.find((peak) => Math.abs(peak.cpm - cpm) < 0.1)?.density ?? Number.NaN);
  return { overFirstDb: level(6) - level(3), offCpm: most(df(result).map((cpm) => cpm - 3)) };
}

/** What separation leaves of the heartbeat, and what a derivative makes of a wave's harmonics. */
export function separationChecks(make: MakePipeline): readonly CheckValue[] {
  return [
    {
      id: 'CV-13',
      what: 'Beats at 63 a minute in the 4 Hz lead, over the lead picked once a second: share of rms',
      source: ARITHMETIC,
      expected: [0],
      tolerance: within(0.001),
      got: async (job) => [await foldedShare(make, job)],
    },
    {
      id: 'CV-22',
      what: 'Sawtooth at 3 cpm: its 6 cpm line over the 3 cpm line after order 0, 0.5, 1, dB',
      source: ARITHMETIC,
      expected: [-6.02, -3.01, 0],
      tolerance: within(0.05),
      async got(job) {
        const levels: number[] = [];
        for (const order of [0, 0.5, 1])
          levels.push((await sawtooth(make, order, job)).overFirstDb);
        return levels;
      },
    },
    {
      id: 'CV-22',
      what: 'the same, order 0.5: farthest DF from 3 cpm',
      source: ARITHMETIC,
      expected: [0],
      tolerance: within(0.01),
      got: async (job) => [(await sawtooth(make, 0.5, job)).offCpm],
    },
  ];
}
