import { exp, sin } from '../numeric/elementary';
import { createRandom, type Random } from '../numeric/random';
import type { Interval } from '../recording/span';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import type { Microvolts } from '../units/voltage';
import { FLUTTER_CYCLE_S } from './ecg-episodes';
import { addEcgNoise, addGaussian, type EcgNoiseSpec } from './ecg-noise';
import { type EcgBeat, type EcgRhythm, type EcgRhythmSpec, ecgRhythm } from './ecg-rhythm';
import {
  drawHeart,
  type EcgComplex,
  type EcgFamily,
  type EcgHeart,
  type EcgWave,
} from './ecg-shape';

/** Everything that decides an invented surface ECG. */
export interface EcgRecordSpec {
  /** Whole number from 0 to 2^32 - 1. */
  readonly seed: number;
  readonly durationS: Seconds;
  readonly rateHz: Hertz;
  readonly rhythm: EcgRhythmSpec;
  readonly family: EcgFamily;
  readonly sign: 1 | -1;
  /** Height of the greatest wave of the normal QRS complex. */
  readonly heightUv: Microvolts;
  /** Share by which breathing changes it. */
  readonly breathHeight: number;
  /** Spread of each wave's size from beat to beat, correlated over some ten beats. */
  readonly shapeSpread: number;
  /** Changes of posture an hour, each turning the shape somewhat. */
  readonly turnsPerHour: number;
  /** Peak of fibrillation and flutter waves. */
  readonly atrialUv: Microvolts;
  readonly noise: EcgNoiseSpec;
  readonly digitiser: { readonly stepUv: Microvolts; readonly railUv: Microvolts };
}

export interface EcgRecord {
  readonly rateHz: Hertz;
  /** In uV. */
  readonly signal: Float64Array;
  /** In ascending order; a beat's time is that its waves are placed by, within 40 ms of its greatest. */
  readonly beats: readonly EcgBeat[];
}

const CHANGES_KEEP = 0.9;
const PACING_SPIKE_S = 0.0012;

/** Slow random changes of the waves of a complex, each kept from beat to beat. */
type Changes = Map<EcgWave, number>;

function changed(changes: Changes, wave: EcgWave, spread: number, random: Random): number {
  const before = changes.get(wave) ?? random.gaussian();
  const fresh = Math.sqrt(1 - CHANGES_KEEP ** 2) * random.gaussian();
  const now = CHANGES_KEEP * before + fresh;
  changes.set(wave, now);
  return exp(spread * (now + 0.3 * random.gaussian()));
}

interface Drawing {
  readonly signal: Float64Array;
  readonly spec: EcgRecordSpec;
  readonly heart: EcgHeart;
  readonly changes: Changes;
  readonly random: Random;
  /** How far the shape is turned at a time, 0 to 1. */
  readonly turnAt: (timeS: Seconds) => number;
}

function addWaves(
  drawing: Drawing,
  waves: readonly EcgWave[],
  timeS: Seconds,
  gain: number,
  stretch = 1,
): void {
  const { signal, spec, changes, random } = drawing;
  const breath = sin((2 * Math.PI * spec.rhythm.breathsPerMin * timeS) / 60 + 0.7);
  for (const wave of waves) {
    const size = wave.size * changed(changes, wave, spec.shapeSpread, random);
    const height = 1 + spec.breathHeight * wave.breath * breath;
    const uv = gain * spec.heightUv * size * height;
    addGaussian(signal, spec.rateHz, timeS + wave.atS * stretch, wave.sdS, uv);
  }
}

function addComplex(
  drawing: Drawing,
  complex: EcgComplex,
  { timeS, rrS }: EcgBeat,
  gain: number,
): void {
  if (gain === 0) return;
  addWaves(drawing, complex.qrs, timeS, gain);
  addWaves(drawing, complex.t, timeS, gain, Math.min(1.15, Math.sqrt(rrS)));
}

function addHeartbeat(drawing: Drawing, beat: EcgBeat): void {
  const { heart, spec, signal, turnAt } = drawing;
  const turn = turnAt(beat.timeS);
  switch (beat.origin) {
    case 'ventricular':
      addComplex(drawing, heart.foci[beat.focus], beat, 1);
      break;
    case 'fusion':
      addComplex(drawing, heart.normal, beat, 0.5);
      addComplex(drawing, heart.foci[beat.focus], beat, 0.5);
      break;
    case 'aberrant':
      addComplex(drawing, heart.aberrant, beat, 1);
      break;
    case 'paced':
      addGaussian(signal, spec.rateHz, beat.timeS - 0.05, PACING_SPIKE_S, 0.7 * spec.heightUv);
      addComplex(drawing, heart.paced, beat, 1);
      break;
    default:
      addComplex(drawing, heart.normal, beat, 1 - turn);
      addComplex(drawing, heart.turned, beat, turn);
  }
}

/** Turns of posture: the shape goes over within some seconds and stays until the next. */
function turns(spec: EcgRecordSpec, random: Random): (timeS: Seconds) => number {
  const at: { timeS: Seconds; to: number }[] = [];
  for (let timeS = 0; spec.turnsPerHour > 0; ) {
    timeS += (3600 / spec.turnsPerHour) * (0.3 + 1.4 * random.uniform());
    if (timeS > spec.durationS) break;
    at.push({ timeS, to: random.uniform() });
  }
  return (timeS) => {
    let value = 0;
    for (const turn of at)
      value += Math.min(1, Math.max(0, (timeS - turn.timeS) / 4)) * (turn.to - value);
    return value;
  };
}

/** Waves of fibrillation (some 6 a second, never the same) and flutter (like the teeth of a saw). */
function addAtrialWaves(
  signal: Float64Array,
  { rateHz, atrialUv }: EcgRecordSpec,
  { fibrillation, flutter }: EcgRhythm,
  random: Random,
): void {
  const each = (stretches: readonly Interval[], add: (i: number) => void) => {
    for (const { fromS, toS } of stretches) {
      const end = Math.min(signal.length, Math.floor(toS * rateHz));
      for (let i = Math.max(0, Math.ceil(fromS * rateHz)); i < end; i += 1) add(i);
    }
  };
  let [cycle, hz, size] = [0, 6, 1];
  each(fibrillation, (i) => {
    hz += 0.002 * (6 - hz) + 0.06 * random.gaussian();
    size += 0.002 * (1 - size) + 0.02 * random.gaussian();
    cycle += hz / rateHz;
    const angle = 2 * Math.PI * (cycle - Math.floor(cycle));
    signal[i] += atrialUv * size * (sin(angle) + 0.35 * sin(2 * angle));
  });
  each(flutter, (i) => {
    const angle = (2 * Math.PI * i) / (rateHz * FLUTTER_CYCLE_S);
    signal[i] += 1.5 * atrialUv * (sin(angle) + 0.5 * sin(2 * angle) + 0.25 * sin(3 * angle));
  });
}

/**
 * Makes an invented surface ECG with every beat known: rhythm, shapes, atrial waves and noise, rounded and clipped as a
 * digitiser does. Sums of Gaussian waves (the idea: McSharry et al. 2003, IEEE Trans Biomed Eng 50:289); all numbers are
 * invented. The same spec gives the same record everywhere. Throws RangeError where rate or duration leave no sample.
 */
export function ecgRecord(spec: EcgRecordSpec): EcgRecord {
  const { seed, durationS, rateHz } = spec;
  const samples = Math.round(durationS * rateHz);
  if (!(samples >= 1 && rateHz >= 1)) throw new RangeError('an ECG wants a rate and a duration');
  const stream = (number: number) => createRandom((Math.imul(number, 0x9e3779b1) + seed) >>> 0);
  const rhythm = ecgRhythm(spec.rhythm, durationS, stream(1));
  const random = stream(2);
  const heart = drawHeart(spec.family, spec.sign, spec.rhythm.foci, random);
  const signal = new Float64Array(samples);
  const drawing: Drawing = {
    signal,
    spec,
    heart,
    changes: new Map(),
    random,
    turnAt: turns(spec, random),
  };
  for (const beat of rhythm.beats) {
    addHeartbeat(drawing, beat);
    if (beat.prS !== null) addWaves(drawing, heart.p, beat.timeS - beat.prS, 1);
  }
  for (const timeS of rhythm.lonePS) addWaves(drawing, heart.p, timeS, 1);
  addAtrialWaves(signal, spec, rhythm, stream(3));
  addEcgNoise(signal, rateHz, spec.noise, stream(4));
  const { stepUv, railUv } = spec.digitiser;
  for (let i = 0; i < samples; i += 1)
    signal[i] = Math.max(-railUv, Math.min(railUv, Math.round(signal[i] / stepUv) * stepUv));
  return { rateHz, signal, beats: rhythm.beats };
}
