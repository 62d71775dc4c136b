import { readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { overlapSave } from '../../src/numeric/overlap-save';
import { beatsOf } from '../../src/recording/beat';
import { DEFAULT_SETTINGS, type Settings } from '../../src/recording/settings';
import { prepareFractional } from '../../src/separate/fractional';
import { heartPart } from '../../src/separate/heart-part';
import { createWideSampler } from '../../src/separate/wide-lead';
import type { TrueBeat } from '../../src/simulate/beat-times';
import { secondsToTicks } from '../../src/units/ticks';
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

const PART = 'separation';
const ROUNDS = 7;
/** What design.md measures: windows of 1001 and 41 samples at 1 kHz; and the plain band, which is what scipy can be asked for. */
const SETTINGS: Settings = {
  ...DEFAULT_SETTINGS,
  slowGain: 'even',
  breathingOut: 'never',
  fractional: {
    order: 0.5,
    memoryS: 60,
    slowWindowMs: 1001,
    heartWindowMs: 41,
    polynomialOrder: 2,
    undoLead: false,
  },
};

const preparedFor = (samples: Float64Array) =>
  prepareFractional({
    rateHz: RATE_HZ,
    sampleCount: samples.length,
    settings: SETTINGS,
    slow: true,
    heart: true,
  });

interface Rounds {
  readonly fractional: Timed;
  readonly band: Timed;
  readonly scipy: Readonly<Record<'plain' | 'fft' | 'band', Timed>> | null;
}

/** Both sides in turns, so that whatever else the machine does falls on both; the first round of each is not counted. */
async function rounds(samples: Float64Array, scipy: ScipyScript | null): Promise<Rounds> {
  const runs = { fractional: [], band: [], plain: [], fft: [], scipyBand: [] } as Record<
    'fractional' | 'band' | 'plain' | 'fft' | 'scipyBand',
    Timed[]
  >;
  for (let round = 0; round <= ROUNDS; round += 1) {
    runs.fractional.push(await timed(() => separate(samples, 'fractional', SETTINGS)));
    runs.band.push(await timed(() => separate(samples, 'band', SETTINGS)));
    if (!scipy) continue;
    runs.plain.push(await scipy.time('plain'));
    runs.fft.push(await scipy.time('fft'));
    runs.scipyBand.push(await scipy.time('band'));
  }
  const middle = (all: readonly Timed[]) => medianTimed(all.slice(1));
  return {
    fractional: middle(runs.fractional),
    band: middle(runs.band),
    scipy: scipy
      ? { plain: middle(runs.plain), fft: middle(runs.fft), band: middle(runs.scipyBand) }
      : null,
  };
}

/** What route `beat-average` does beyond `band`: the wide form of a lead, once, and its averages after every edit of a beat. */
async function averaging(
  samples: Float64Array,
  trueBeats: readonly TrueBeat[],
): Promise<readonly Measured[]> {
  const sampler = createWideSampler(RATE_HZ);
  sampler.push(samples);
  const wide = sampler.finish({ sampleCount: samples.length, gaps: [], meanUv: 0 });
  const beats = beatsOf(
    trueBeats.map(({ timeS, beatClass }) => ({
      tick: secondsToTicks(timeS, RATE_HZ),
      beatClass,
      origin: 'detected',
    })),
  );
  const kept = new Uint8Array(Math.ceil((4 * samples.length) / RATE_HZ)).fill(1);
  const settings = SETTINGS.beatAverage;
  const runs: Timed[] = [];
  for (let round = 0; round <= ROUNDS; round += 1)
    runs.push(
      await timed(() => {
        const work = heartPart({ wide, beats, beatRateHz: RATE_HZ, kept, settings });
        while (!work.next().done);
      }),
    );
  return [
    timeLine(PART, 'beat-average: averages and low-pass of one lead', medianTimed(runs.slice(1))),
  ];
}

/** What the ends of the longest filter reach (route band, slow wave); inside both sides filter the same samples. */
const ENDS_S = 150;

/** Largest difference of two signals over the largest value of the second, the ends left out. */
function difference(ours: ArrayLike<number>, theirs: Float64Array, rateHz: number): number {
  const ends = ENDS_S * rateHz;
  let most = 0;
  let size = 0;
  for (let i = ends; i < theirs.length - ends; i += 1) {
    most = Math.max(most, Math.abs(ours[i] - theirs[i]));
    size = Math.max(size, Math.abs(theirs[i]));
  }
  return most / size;
}

/** The heartbeat of route fractional in double precision, as it is before it is stored. */
function heartbeatUnstored(samples: Float64Array): Float64Array {
  const mean = samples.reduce((sum, one) => sum + one, 0) / samples.length;
  const level = samples.map((one) => one - mean);
  return overlapSave(level, { spectrum: preparedFor(samples).spectrum, ends: 'reflect-odd' })[1];
}

async function differences(
  samples: Float64Array,
  scipy: ScipyScript,
  folder: string,
): Promise<readonly Measured[]> {
  await scipy.time('write');
  const fractional = separate(samples, 'fractional', SETTINGS);
  const band = separate(samples, 'band', SETTINGS);
  const stored = 'kept in single precision (6e-8)';
  const rows: readonly (readonly [string, string, ArrayLike<number>, number, string])[] = [
    ['fractional, slow wave', 'fractional-slow', fractional.slow.forSpectra, 4, ''],
    [
      'fractional, heartbeat in double',
      'fractional-heart',
      heartbeatUnstored(samples),
      250,
      'the worker keeps it in single precision',
    ],
    ['fractional, heartbeat', 'fractional-heart', fractional.heart.heartbeat, 250, stored],
    ['band, lead at 4 Hz', 'band-recorded', band.slow.recorded, 4, ''],
    ['band, slow wave', 'band-slow', band.slow.slowWave, 4, ''],
    ['band, heartbeat', 'band-heart', band.heart.heartbeat, 250, stored],
  ];
  const lines: Measured[] = [];
  for (const [what, file, ours, rateHz, note] of rows)
    lines.push({
      part: PART,
      what: `${what}: largest difference from scipy`,
      value: difference(ours, await readDoubles(join(folder, `${file}.f64`)), rateHz),
      unit: '',
      decimals: 12,
      budget: note === stored ? '' : '1e-9 of its size',
      note: [`at ${rateHz} Hz, ${ENDS_S} s at both ends left out`, note].filter(Boolean).join('; '),
    });
  return lines;
}

async function readDoubles(path: string): Promise<Float64Array> {
  const { buffer, byteOffset, byteLength } = await readFile(path);
  return new Float64Array(buffer.slice(byteOffset, byteOffset + byteLength));
}

/** Against scipy in the same run. */
function ratios({ fractional, band, scipy }: Rounds): readonly Measured[] {
  if (!scipy) return [];
  const plain = 'scipy: oaconvolve, then savgol_filter, each output';
  const fft = 'scipy: both steps by oaconvolve, each output';
  return [
    timeLine(PART, plain, scipy.plain),
    timeLine(PART, fft, scipy.fft),
    ratioLine(PART, 'fractional: faster than plain scipy', scipy.plain, fractional, 'at least 4'),
    ratioLine(PART, 'fractional: faster than scipy by FFT', scipy.fft, fractional, 'at least 1.5'),
    timeLine(PART, 'scipy: the filters of route band', scipy.band),
    ratioLine(PART, 'band: faster than scipy', scipy.band, band, 'at least 1'),
  ];
}

/** One lead of 1 kHz parted into slow wave and heartbeat by both routes, beside scipy on the same samples. */
export const separation: Part = async ({ minutes, folder, say }: Bench) => {
  const { signals, beats } = inventedStudy(minutes);
  const [samples] = signals;
  const file = join(folder, 'lead.f64');
  await writeFile(file, new Uint8Array(samples.buffer, samples.byteOffset, samples.byteLength));
  const version = scipyVersion(say);
  const scipy = version === null ? null : startScipy('separation_scipy.py', [file, folder]);
  try {
    if (version !== null) say(`scipy ${version}, one thread`);
    const kernels = await timed(() => preparedFor(samples));
    const taken = await rounds(samples, scipy);
    return [
      timeLine(PART, 'fractional: kernel spectra, once', kernels),
      timeLine(PART, 'fractional: one lead, both outputs', taken.fractional),
      timeLine(PART, 'band: one lead, both outputs', taken.band),
      ...(await averaging(samples, beats)),
      ...ratios(taken),
      ...(scipy ? await differences(samples, scipy, folder) : []),
    ];
  } finally {
    scipy?.end();
  }
};
