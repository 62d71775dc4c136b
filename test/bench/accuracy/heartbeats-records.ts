import { createRandom, type Random } from '../../../src/numeric/random';
import type { EcgNoiseSpec } from '../../../src/simulate/ecg-noise';
import type { EcgRecordSpec } from '../../../src/simulate/ecg-record';
import {
  about,
  between,
  type EcgRhythmName,
  type EcgRhythmSpec,
} from '../../../src/simulate/ecg-rhythm';
import { ECG_FAMILIES, type EcgFamily } from '../../../src/simulate/ecg-shape';

/** A record to be made, with the words its family goes by. */
export interface DrawnRecord {
  readonly name: string;
  readonly rhythm: string;
  readonly shape: string;
  readonly noise: string;
  readonly spec: EcgRecordSpec;
}

const pick = <T>(random: Random, from: readonly T[]): T => from[random.below(from.length)];

/** What records of ambulatory patients hold, about as often (common practice, no source): most are sinus with early beats. */
const RHYTHMS = [
  'sinus',
  'sinus with early beats',
  'sinus with early beats',
  'sinus with many early beats',
  'sinus with pauses',
  'fibrillation',
  'fibrillation with early beats',
  'bigeminy and trigeminy',
  'blocks',
  'paced',
  'flutter',
  'fast and slow',
] as const;
type RhythmWord = (typeof RHYTHMS)[number];

const NOISES = ['clean', 'clean', 'usual', 'usual', 'usual', 'noisy', 'hard'] as const;
type NoiseWord = (typeof NOISES)[number];

const episode = (rhythm: EcgRhythmName, everyS: number, lengthS: number) => ({
  rhythm,
  everyS,
  lengthS,
});

function rhythmSpec(word: RhythmWord, random: Random): EcgRhythmSpec {
  const few = {
    ventricular: between(random, 0, 0.002),
    atrial: between(random, 0, 0.003),
    pause: 0,
  };
  const plain: EcgRhythmSpec = {
    base: 'sinus',
    rateBpm: about(random, 75, 0.2),
    breathing: between(random, 0.005, 0.12),
    wander: between(random, 0.02, 0.08),
    jitter: between(random, 0.004, 0.03),
    breathsPerMin: between(random, 10, 22),
    chances: few,
    aberrant: between(random, 0, 0.6),
    blocked: between(random, 0, 0.3),
    again: between(random, 0, 0.25),
    foci: 1 + random.below(4),
    episodes: [],
  };
  const early = (most: number) => ({
    ventricular: between(random, 0.01, most),
    atrial: between(random, 0, most),
    pause: 0,
  });
  switch (word) {
    case 'sinus':
      return plain;
    case 'sinus with early beats':
      return { ...plain, chances: early(0.05) };
    case 'sinus with many early beats':
      return {
        ...plain,
        chances: early(0.25),
        episodes: [episode('ventricularRun', 150, 3)],
      };
    case 'sinus with pauses':
      return {
        ...plain,
        rateBpm: between(random, 45, 80),
        chances: { ...early(0.03), pause: 0.02 },
      };
    case 'fibrillation':
      return { ...plain, base: 'fibrillation', rateBpm: between(random, 60, 130) };
    case 'fibrillation with early beats':
      return {
        ...plain,
        base: 'fibrillation',
        rateBpm: between(random, 60, 120),
        chances: { ventricular: between(random, 0.02, 0.12), atrial: 0, pause: 0 },
        aberrant: between(random, 0.1, 0.6),
        episodes: [episode('ventricularRun', 200, 3)],
      };
    case 'bigeminy and trigeminy':
      return {
        ...plain,
        chances: early(0.06),
        episodes: [episode('bigeminy', 60, 30), episode('trigeminy', 70, 30)],
      };
    case 'blocks':
      return { ...plain, episodes: [episode('wenckebach', 60, 40), episode('block', 90, 25)] };
    case 'paced':
      return { ...plain, base: 'paced', rateBpm: 70, chances: { ...few, ventricular: 0.02 } };
    case 'flutter':
      return { ...plain, episodes: [episode('flutter', 40, 60), episode('fibrillation', 80, 30)] };
    case 'fast and slow':
      return {
        ...plain,
        chances: early(0.03),
        episodes: [episode('tachycardia', 60, 15), episode('idioventricular', 80, 20)],
      };
  }
}

/** Noise of an ambulatory record; `heightUv` is that of its beats, which moving electrodes may rival. */
function noiseSpec(word: NoiseWord, heightUv: number, random: Random): EcgNoiseSpec {
  const level = { clean: 0, usual: 1, noisy: 2, hard: 3 }[word];
  const by = (values: readonly [number, number, number, number]) =>
    about(random, values[level], 0.5);
  return {
    wanderUv: by([30, 90, 180, 400]) * (random.uniform() < 0.1 ? 5 : 1),
    muscleUv: by([4, 9, 16, 22]),
    burstsPerMin: by([0.05, 0.4, 1, 2]),
    burstUv: by([20, 60, 100, 130]),
    burstS: 3,
    motionPerMin: by([0.02, 0.15, 0.6, 1.5]),
    motionUv: by([0.3, 0.5, 0.6, 0.8]) * heightUv,
    humUv: random.uniform() < 0.4 ? by([3, 8, 15, 20]) : 0,
    humHz: 60,
    stepsPerHour: by([0.1, 0.5, 2, 5]),
    stepUv: by([400, 800, 1200, 2000]),
    popsPerHour: by([0.2, 1, 3, 8]),
    popUv: by([300, 500, 800, 1000]),
  };
}

/** Draws a record as ambulatory ECG recorders make them: 360 Hz, steps of 5 uV, rails at 5.12 mV. */
export function drawRecord(seed: number, durationS: number): DrawnRecord {
  const random = createRandom(seed);
  const rhythm = RHYTHMS[seed % RHYTHMS.length];
  const shape: EcgFamily = pick(random, ECG_FAMILIES);
  const noise = pick(random, NOISES);
  const heightUv =
    shape === 'tiny' ? between(random, 180, 350) : Math.min(2800, about(random, 1000, 0.4));
  return {
    name: `${seed}`,
    rhythm,
    shape,
    noise,
    spec: {
      seed,
      durationS,
      rateHz: 360,
      rhythm: rhythmSpec(rhythm, random),
      family: shape,
      sign: random.uniform() < 0.8 ? 1 : -1,
      heightUv,
      breathHeight:
        random.uniform() < 0.15 ? between(random, 0.3, 0.5) : between(random, 0.02, 0.2),
      shapeSpread: between(random, 0.02, 0.12),
      turnsPerHour: between(random, 0, 15),
      atrialUv: between(random, 0.03, 0.09) * heightUv,
      noise: noiseSpec(noise, heightUv, random),
      digitiser: { stepUv: 5, railUv: 5120 },
    },
  };
}
