import { writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { detectBeats } from '../../src/heart/detect';
import { rrSeries } from '../../src/heart/rr-series';
import { lombBandPowers } from '../../src/heart/variability-spectrum';
import type { RrSeries } from '../../src/recording/heart-series';
import type { HeartOutput, SlowOutput } from '../../src/recording/separated';
import { DEFAULT_SETTINGS } from '../../src/recording/settings';
import { slowWaveRhythm } from '../../src/stomach/slow-wave-rhythm';
import { windowSpectra } from '../../src/stomach/window-spectrum';
import { TICKS_PER_SAMPLE } from '../../src/units/ticks';
import { inventedStudy, RATE_HZ } from './invented-study';
import {
  type Bench,
  type Measured,
  medianTimed,
  type Part,
  ratioLine,
  type Timed,
  timed,
  timeLine,
} from './measured';
import { type ScipyScript, scipyVersion, startScipy } from './scipy';
import { separate } from './separate-lead';

const PART = 'detection';
const ROUNDS = 5;
/** Short work is done so often within one time. */
const REPEATS = 10;
const { variability, epoch } = DEFAULT_SETTINGS;

/** The 5 min segments of an NN series, its spectrum in each: Lomb-Scargle over LF and HF. */
function lombOfSegments({ timesS, rrMs }: RrSeries): number {
  const { segmentS, lfHz, hfHz } = variability;
  let sum = 0;
  for (let from = 0; from + segmentS <= (timesS.at(-1) ?? 0); from += segmentS) {
    const first = timesS.findIndex((time) => time >= from);
    const end = timesS.findIndex((time) => time >= from + segmentS);
    const [lf, hf] = lombBandPowers(timesS.subarray(first, end), rrMs.subarray(first, end), [
      lfHz,
      hfHz,
    ]);
    sum += lf + hf;
  }
  return sum;
}

/** The periodogram of every epoch of a lead, a minute apart. */
function spectraOfEpochs({ recorded, rateHz }: SlowOutput): number {
  const kept = new Uint8Array(recorded.length).fill(1);
  const { lengthS, stepS } = epoch;
  const spectra = windowSpectra({ signal: recorded, kept, rateHz, lengthS, powerResponse: null });
  let sum = 0;
  for (let at = 0; at + lengthS * rateHz <= recorded.length; at += stepS * rateHz)
    sum += spectra.density(spectra.prepare(at))[60];
  return sum;
}

const rhythmOf = (slow: SlowOutput, minutes: number) =>
  slowWaveRhythm({
    slow,
    spoiled: [],
    phases: [{ name: 'whole', fromS: 0, toS: minutes * 60 }],
    settings: DEFAULT_SETTINGS,
    breathing: null,
  });

const beatsOf = ({ heartbeat, rateHz, decimation }: HeartOutput) =>
  detectBeats({ heartbeat, rateHz, ticksPerSample: TICKS_PER_SAMPLE * decimation }).beats;

type Names = 'beats' | 'rhythm' | 'lomb' | 'spectra' | 'scipyLomb' | 'scipySpectra';

async function rounds(
  work: Readonly<Record<'beats' | 'rhythm' | 'lomb' | 'spectra', () => unknown>>,
  scipy: ScipyScript | null,
): Promise<Record<Names, Timed>> {
  const runs: Record<Names, Timed[]> = {
    beats: [],
    rhythm: [],
    lomb: [],
    spectra: [],
    scipyLomb: [],
    scipySpectra: [],
  };
  const often = async (one: () => unknown): Promise<Timed> => {
    const all = await timed(() => {
      for (let i = 0; i < REPEATS; i += 1) one();
    });
    return { processorMs: all.processorMs / REPEATS, clockMs: all.clockMs / REPEATS };
  };
  for (let round = 0; round <= ROUNDS; round += 1) {
    runs.beats.push(await timed(work.beats));
    runs.rhythm.push(await timed(work.rhythm));
    runs.lomb.push(await often(work.lomb));
    runs.spectra.push(await often(work.spectra));
    if (!scipy) continue;
    runs.scipyLomb.push(await scipy.time('lomb'));
    runs.scipySpectra.push(await scipy.time('epochs'));
  }
  const entries = Object.entries(runs).map(([name, all]) => [name, medianTimed(all.slice(1))]);
  return Object.fromEntries(entries) as Record<Names, Timed>;
}

/** Finding beats, the rhythm of epochs, and the spectra of both, on a lead that is parted already. */
export const detection: Part = async ({ minutes, folder, say }: Bench) => {
  const [samples] = inventedStudy(minutes).signals;
  const { slow, heart } = separate(samples, 'band', DEFAULT_SETTINGS);
  const rr = rrSeries(beatsOf(heart), RATE_HZ, []);
  const files = await Promise.all(
    [rr.timesS, rr.rrMs, slow.recorded].map(async (values, i) => {
      const path = join(folder, `detection-${i}.f64`);
      await writeFile(path, new Uint8Array(values.buffer, values.byteOffset, values.byteLength));
      return path;
    }),
  );
  const scipy =
    scipyVersion(say) === null
      ? null
      : startScipy('detection_scipy.py', [...files, String(REPEATS)]);
  try {
    const took = await rounds(
      {
        beats: () => beatsOf(heart),
        rhythm: () => rhythmOf(slow, minutes),
        lomb: () => lombOfSegments(rr),
        spectra: () => spectraOfEpochs(slow),
      },
      scipy,
    );
    const lines: Measured[] = [
      timeLine(PART, `beats of ${minutes} min: ${rr.rrMs.length + 1} of them`, took.beats),
      timeLine(PART, 'rhythm of all epochs of one lead, with the running spectrum', took.rhythm),
      timeLine(PART, 'of that the spectra of the epochs', took.spectra),
      timeLine(PART, 'Lomb-Scargle of all 5 min segments', took.lomb),
    ];
    if (scipy)
      lines.push(
        ratioLine(PART, 'spectra: faster than scipy', took.scipySpectra, took.spectra),
        ratioLine(PART, 'Lomb-Scargle: faster than scipy', took.scipyLomb, took.lomb),
      );
    return lines;
  } finally {
    scipy?.end();
  }
};
