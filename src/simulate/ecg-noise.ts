import { exp, sin } from '../numeric/elementary';
import type { Random } from '../numeric/random';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import type { Microvolts } from '../units/voltage';
import { about, between } from './ecg-rhythm';
import { quickNormal } from './quick-normal';

/** What a surface ECG holds beside the heart, in uV. Stretches come at random, on average so many a minute or an hour. */
export interface EcgNoiseSpec {
  /** Slow baseline (below about 0.5 Hz) and muscle noise throughout, root mean square. */
  readonly wanderUv: Microvolts;
  readonly muscleUv: Microvolts;
  readonly burstsPerMin: number;
  readonly burstUv: Microvolts;
  readonly burstS: Seconds;
  /** Bumps of a moving electrode: as wide as a QRS complex or wider, in clusters. */
  readonly motionPerMin: number;
  readonly motionUv: Microvolts;
  /** Peak of the hum, with its second and third harmonic. */
  readonly humUv: Microvolts;
  readonly humHz: Hertz;
  /** Jumps of the level that the amplifier recovers from. */
  readonly stepsPerHour: number;
  readonly stepUv: Microvolts;
  readonly popsPerHour: number;
  readonly popUv: Microvolts;
}

/** Times of a Poisson process. */
function* moments(perS: number, endS: Seconds, random: Random): Generator<Seconds> {
  if (!(perS > 0)) return;
  for (let timeS = 0; ; ) {
    timeS += about(random, 0.7 / perS, 1);
    if (timeS >= endS) return;
    yield timeS;
  }
}

function addWanderAndMuscle(
  signal: Float64Array,
  rateHz: Hertz,
  { wanderUv, muscleUv }: EcgNoiseSpec,
  burst: Float32Array,
  random: Random,
): void {
  const keep = 1 - exp((-2 * Math.PI * 0.25) / rateHz);
  const soft = 1 - exp((-2 * Math.PI * 15) / rateHz);
  const sharp = 1 - exp((-2 * Math.PI * 90) / rateHz);
  const scale = wanderUv / Math.sqrt(keep / 4);
  let [a, b, low, high] = [0, 0, 0, 0];
  for (let i = 0; i < signal.length; i += 1) {
    a += keep * (quickNormal(random) - a);
    b += keep * (a - b);
    const white = quickNormal(random);
    high += sharp * (white - high);
    low += soft * (high - low);
    signal[i] += scale * b + (muscleUv + burst[i]) * 1.5 * (high - low);
  }
}

function bursts(length: number, rateHz: Hertz, spec: EcgNoiseSpec, random: Random): Float32Array {
  const rms = new Float32Array(length);
  for (const atS of moments(spec.burstsPerMin / 60, length / rateHz, random)) {
    const lengthS = about(random, spec.burstS, 0.6);
    const uv = about(random, spec.burstUv, 0.5);
    const from = Math.round(atS * rateHz);
    const count = Math.round(lengthS * rateHz);
    for (let i = 0; i < count && from + i < length; i += 1)
      rms[from + i] += uv * Math.abs(sin((Math.PI * i) / count));
  }
  return rms;
}

/** Adds a Gaussian; sizes in uV, places in s. */
export function addGaussian(
  signal: Float64Array,
  rateHz: Hertz,
  atS: Seconds,
  sdS: Seconds,
  uv: Microvolts,
): void {
  const from = Math.max(0, Math.ceil((atS - 4.5 * sdS) * rateHz));
  const to = Math.min(signal.length - 1, Math.floor((atS + 4.5 * sdS) * rateHz));
  for (let i = from; i <= to; i += 1) signal[i] += uv * exp(-0.5 * ((i / rateHz - atS) / sdS) ** 2);
}

function addMotion(signal: Float64Array, rateHz: Hertz, spec: EcgNoiseSpec, random: Random): void {
  for (const atS of moments(spec.motionPerMin / 60, signal.length / rateHz, random)) {
    const uv = about(random, spec.motionUv, 0.6);
    const waves = 1 + random.below(4);
    for (let k = 0; k < waves; k += 1)
      addGaussian(
        signal,
        rateHz,
        atS + between(random, -0.15, 0.15) * waves,
        about(random, 0.035, 0.6),
        (random.uniform() < 0.5 ? -1 : 1) * about(random, uv, 0.3),
      );
  }
}

function addSteps(signal: Float64Array, rateHz: Hertz, spec: EcgNoiseSpec, random: Random): void {
  for (const atS of moments(spec.stepsPerHour / 3600, signal.length / rateHz, random)) {
    const uv = (random.uniform() < 0.5 ? -1 : 1) * about(random, spec.stepUv, 0.6);
    const decay = exp(-1 / (between(random, 0.3, 3) * rateHz));
    let level = uv;
    for (let i = Math.round(atS * rateHz); i < signal.length && Math.abs(level) > 0.5; i += 1) {
      signal[i] += level;
      level *= decay;
    }
  }
  for (const atS of moments(spec.popsPerHour / 3600, signal.length / rateHz, random)) {
    const at = Math.round(atS * rateHz);
    const uv = (random.uniform() < 0.5 ? -1 : 1) * about(random, spec.popUv, 0.6);
    const width = 1 + random.below(3);
    for (let i = at; i < Math.min(signal.length, at + width); i += 1) signal[i] += uv;
  }
}

function addHum(signal: Float64Array, rateHz: Hertz, { humUv, humHz }: EcgNoiseSpec): void {
  if (humUv === 0) return;
  for (let i = 0; i < signal.length; i += 1) {
    const angle = (2 * Math.PI * humHz * i) / rateHz;
    signal[i] += humUv * (sin(angle) + 0.2 * sin(2 * angle + 1) + 0.3 * sin(3 * angle + 2));
  }
}

/** Adds all that is not the heart to a surface ECG. */
export function addEcgNoise(
  signal: Float64Array,
  rateHz: Hertz,
  spec: EcgNoiseSpec,
  random: Random,
): void {
  const burst = bursts(signal.length, rateHz, spec, random);
  addWanderAndMuscle(signal, rateHz, spec, burst, random);
  addMotion(signal, rateHz, spec, random);
  addSteps(signal, rateHz, spec, random);
  addHum(signal, rateHz, spec);
}
