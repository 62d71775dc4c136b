import { createFft, nextPowerOfTwo } from '../../src/numeric/fft';
import { createRandom, type Random } from '../../src/numeric/random';
import type { Interval } from '../../src/recording/span';
import { RATE_HZ } from './leads';

/** Invented leads as hard as the field's, made without src/simulate. */

const EPOCH_S = 240;
const BACKGROUND_UV = 30;

const scaled = (x: Float64Array, rmsUv: number) => {
  const rms = Math.sqrt(x.reduce((sum, value) => sum + value * value, 0) / x.length);
  return x.map((value) => (rmsUv * value) / rms);
};

/** Gaussian noise with the power density given at cpm (above 0), its rms 30 uV, from the seed alone. */
export function shapedNoise(length: number, powerAt: (cpm: number) => number, seed: number) {
  const random = createRandom(seed);
  const size = nextPowerOfTwo(2 * length);
  const spectrum = new Float64Array(2 * size);
  for (let k = 1; k < size / 2; k++) {
    const gain = Math.sqrt(powerAt((k * RATE_HZ * 60) / size));
    const [re, im] = [gain * random.gaussian(), gain * random.gaussian()];
    spectrum.set([re, im], 2 * k);
    spectrum.set([re, -im], 2 * (size - k));
  }
  const out = new Float64Array(2 * size);
  createFft(size).inverse(spectrum, out);
  return scaled(
    Float64Array.from({ length }, (_, i) => out[2 * i]),
    BACKGROUND_UV,
  );
}

/** Sum of first-order Markov processes (Ornstein & Uhlenbeck 1930) of equal rms and the correlation times given. */
function markovSum(length: number, timesS: readonly number[], seed: number) {
  const random = createRandom(seed);
  const sum = new Float64Array(length);
  for (const timeS of timesS) {
    const keep = Math.exp(-1 / (timeS * RATE_HZ));
    const fresh = Math.sqrt(1 - keep * keep);
    let value = random.gaussian();
    for (let i = 0; i < length; i++) {
      sum[i] += value;
      value = keep * value + fresh * random.gaussian();
    }
  }
  return scaled(sum, BACKGROUND_UV);
}

const hump = (cpm: number, at: number, width: number) => Math.exp(-0.5 * ((cpm - at) / width) ** 2);

type Background = (length: number, seed: number) => Float64Array;

const coloured =
  (exponent: number): Background =>
  (length, seed) =>
    shapedNoise(length, (cpm) => cpm ** -exponent, seed);

/** Backgrounds without a rhythm, by name. */
export const BACKGROUNDS: Readonly<Record<string, Background>> = {
  white: coloured(0),
  '1/f^0.5': coloured(0.5),
  '1/f': coloured(1),
  '1/f^1.5': coloured(1.5),
  '1/f^2': coloured(2),
  '1/f^2.5': coloured(2.5),
  'white and 1/f^2, equal at 3 cpm': (length, seed) =>
    shapedNoise(length, (cpm) => 1 + (3 / cpm) ** 2, seed),
  'white and 1/f^3, equal at 2 cpm': (length, seed) =>
    shapedNoise(length, (cpm) => 1 + (2 / cpm) ** 3, seed),
  'Markov sum of 1, 4, 16 and 64 s': (length, seed) => markovSum(length, [1, 4, 16, 64], seed),
  'Markov process of 8 s': (length, seed) => markovSum(length, [8], seed),
  '1/f and a broad hump at 5 cpm': (length, seed) =>
    shapedNoise(length, (cpm) => 1 / cpm + 0.6 * hump(cpm, 5, 1.5), seed),
  '1/f and a drift hump at 0.6 cpm': (length, seed) =>
    shapedNoise(length, (cpm) => 1 / cpm + 30 * hump(cpm, 0.6, 0.2), seed),
};

type Spoiling = (epochS: number, random: Random) => readonly Interval[];

const one = (fromS: number, lengthS: number): readonly Interval[] => [
  { fromS, toS: fromS + lengthS },
];

/** Spoiled spans of one epoch that begins at `epochS`, by name. */
export const SPOILINGS: Readonly<Record<string, Spoiling>> = {
  none: () => [],
  '5 s': (epochS, random) => one(epochS + 20 + 195 * random.uniform(), 5),
  '20 s': (epochS, random) => one(epochS + 20 + 180 * random.uniform(), 20),
  '30 s in the middle': (epochS) => one(epochS + 105, 30),
  '60 s at one end': (epochS, random) => one(epochS + (random.uniform() < 0.5 ? 10 : 170), 60),
  'eight of 5 s': (epochS, random) =>
    Array.from({ length: 8 }, (_, k) => one(epochS + 30 * k + 24 * random.uniform(), 5)).flat(),
  'four of 10 s': (epochS, random) =>
    Array.from({ length: 4 }, (_, k) => one(epochS + 60 * k + 48 * random.uniform(), 10)).flat(),
  'every 20 s, 3 s': (epochS) =>
    Array.from({ length: 12 }, (_, k) => one(epochS + 20 * k + 8, 3)).flat(),
};

/** Spans of a whole lead, the same kind in every epoch of 240 s. */
export function spoiledLead(kind: string, epochs: number, seed: number): readonly Interval[] {
  const random = createRandom(seed);
  return Array.from({ length: epochs }, (_, k) => SPOILINGS[kind](EPOCH_S * k, random)).flat();
}

/** What artefacts leave beside the spans drawn round them: tails that die away in `timeS`, of either sign, up to `uv`. */
export function leftovers(
  length: number,
  spans: readonly Interval[],
  uv: number,
  timeS: number,
  seed: number,
): Float64Array {
  const random = createRandom(seed);
  const out = new Float64Array(length);
  for (const { toS } of spans) {
    const height = uv * (2 * random.uniform() - 1);
    const from = Math.round(toS * RATE_HZ);
    for (let i = from; i < Math.min(length, from + 8 * timeS * RATE_HZ); i++)
      out[i] += height * Math.exp(-(i - from) / (timeS * RATE_HZ));
  }
  return out;
}

/** How a wave is made; all optional, a plain cosine of steady frequency else. */
export interface WaveSpec {
  readonly cpmAt: (t: number) => number;
  readonly uvAt?: (t: number) => number;
  /** Relative amplitude and phase of the harmonics from the second on. */
  readonly harmonics?: readonly (readonly [share: number, phase: number])[];
  /** SD and correlation time of the frequency's and the amplitude's wander. */
  readonly wanderCpm?: number;
  readonly wanderShare?: number;
  readonly wanderS?: number;
  readonly seed: number;
}

/** A wave with its true frequency from sample to sample. */
export function fieldWave(length: number, spec: WaveSpec) {
  const { cpmAt, uvAt = () => 1, harmonics = [], wanderCpm = 0, wanderShare = 0 } = spec;
  const random = createRandom(spec.seed);
  const keep = Math.exp(-1 / ((spec.wanderS ?? 120) * RATE_HZ));
  const fresh = Math.sqrt(1 - keep * keep);
  let phase = 2 * Math.PI * random.uniform();
  let [offset, swell] = [random.gaussian(), random.gaussian()];
  const cpm = new Float64Array(length);
  const uv = new Float64Array(length);
  for (let i = 0; i < length; i++) {
    const t = i / RATE_HZ;
    cpm[i] = Math.max(0.3, cpmAt(t) + wanderCpm * offset);
    let shape = Math.cos(phase);
    harmonics.forEach(([share, lead], h) => {
      shape += share * Math.cos((h + 2) * phase + lead);
    });
    uv[i] = uvAt(t) * Math.max(0.1, 1 + wanderShare * swell) * shape;
    phase += (2 * Math.PI * cpm[i]) / (60 * RATE_HZ);
    offset = keep * offset + fresh * random.gaussian();
    swell = keep * swell + fresh * random.gaussian();
  }
  return { cpm, uv };
}

/** A sawtooth's first harmonics beside its fundamental. */
export const SAWTOOTH = Array.from(
  { length: 9 },
  (_, k) => [1 / (k + 2), (-Math.PI / 2) * (k + 1)] as const,
);

export const sumOf = (...signals: readonly Float64Array[]) =>
  signals[0].map((_, i) => signals.reduce((sum, signal) => sum + signal[i], 0));

export const EPOCH_SAMPLES = EPOCH_S * RATE_HZ;
