import { createRandom, type Random } from '../numeric/random';
import type { Hertz } from '../units/rate';
import { disturb, hold, type LeadDisturbance } from './artefacts';
import { addBeats } from './beat-shape';
import { beatTimes, type TrueBeat } from './beat-times';
import { addUpsampled, type CoarseGrid, coarseGrid } from './coarse-grid';
import { addFastNoise, addMains, addSlowNoise } from './noise';
import { breathing, type SlowWave, slowWave, slowWaveOnLead } from './slow-sources';
import type { ArtefactSpec, LeadSpec, SimulationSpec } from './spec';

/** What is known about an invented study. Courses over time have one value a point: point i is at i / rateHz seconds. */
export interface StudyTruth {
  /** Points a second, near 25. */
  readonly rateHz: Hertz;
  readonly beats: readonly TrueBeat[];
  /** Frequency of the slow wave at its source; null without one. */
  readonly slowCpm: Float64Array | null;
  /** Peak of its fundamental, and the wave itself with its harmonic, one array a lead. */
  readonly slowAmplitudeUv: readonly Float64Array[];
  readonly slowUv: readonly Float64Array[];
  readonly breathsPerMin: Float64Array | null;
  /** Breathing movement, -1 to 1. */
  readonly breathing: Float64Array | null;
  readonly spoiled: readonly ArtefactSpec[];
}

export interface SimulatedStudy {
  readonly rateHz: Hertz;
  readonly labels: readonly string[];
  /** Samples in uV, one array a lead. */
  readonly signals: readonly Float64Array[];
  readonly truth: StudyTruth;
}

/** Sources of random numbers, each with its own stream. */
const STREAMS = { slow: 0, breath: 1, heart: 2, artefacts: 3, lead: 10 } as const;
const STREAM_STEP = 0x9e3779b1;

function stream(seed: number, number: number): Random {
  return createRandom((Math.imul(number, STREAM_STEP) + seed) >>> 0);
}

/**
 * Makes an invented study of known content: slow wave, beats, breathing, drift, hum, noise and spoiled stretches, mixed into
 * each lead. The same spec gives the same samples in every engine. Throws RangeError for a rate outside 1-10000 Hz, no lead,
 * or a duration of no sample. Time goes with samples times leads: about 0.1 us each.
 */
export function simulateStudy(spec: SimulationSpec): SimulatedStudy {
  const { seed, rateHz, leads } = spec;
  const samples = Math.round(spec.durationS * rateHz);
  if (!(rateHz >= 1 && rateHz <= 10_000) || leads.length === 0 || !(samples >= 1))
    throw new RangeError('simulateStudy wants 1-10000 Hz, a lead and a duration');
  const grid = coarseGrid(samples, rateHz);
  const slow = spec.slowWave && slowWave(spec.slowWave, grid, stream(seed, STREAMS.slow));
  const breath = spec.breathing && breathing(spec.breathing, grid, stream(seed, STREAMS.breath));
  const movement = breath?.movement ?? null;
  const slowUv = leads.map((lead) =>
    slow ? slowWaveOnLead(slow, lead) : new Float64Array(grid.points),
  );
  const signals = leads.map(() => new Float64Array(samples));
  const disturbances = disturbancesOf(spec, grid);
  const beats = spec.heart
    ? beatTimes(spec.heart, grid, movement, stream(seed, STREAMS.heart))
    : [];
  if (spec.heart) addBeats(signals, leads, beats, { heart: spec.heart, rateHz, grid, movement });
  signals.forEach((signal, k) => {
    mixLead(signal, k, { spec, grid, slowUv: slowUv[k], movement, disturbance: disturbances[k] });
  });
  return {
    rateHz,
    labels: leads.map((lead) => lead.label),
    signals,
    truth: {
      rateHz: 1 / grid.stepS,
      beats: beats.filter((beat) => beat.timeS * rateHz < samples),
      slowCpm: slow?.frequencyCpm ?? null,
      slowAmplitudeUv: leads.map((lead) => amplitudeOnLead(slow, lead, grid)),
      slowUv,
      breathsPerMin: breath?.ratePerMin ?? null,
      breathing: movement,
      spoiled: spec.artefacts,
    },
  };
}

function amplitudeOnLead(wave: SlowWave | null, lead: LeadSpec, grid: CoarseGrid): Float64Array {
  const amplitude = new Float64Array(grid.points);
  if (wave)
    for (let i = 0; i < grid.points; i += 1)
      amplitude[i] = wave.amplitudeUv[i] * Math.abs(lead.slowGain);
  return amplitude;
}

const actsOn = (artefact: ArtefactSpec, lead: number): boolean =>
  artefact.leads === null || artefact.leads.includes(lead);

function disturbancesOf(spec: SimulationSpec, grid: CoarseGrid): readonly LeadDisturbance[] {
  const random = stream(spec.seed, STREAMS.artefacts);
  const disturbances = spec.leads.map(() => ({
    slowUv: new Float64Array(grid.points),
    muscleUv: new Float64Array(grid.points).fill(spec.noise.muscleUv),
    mainsUv: new Float64Array(grid.points).fill(spec.noise.mainsUv),
  }));
  for (const artefact of spec.artefacts)
    disturbances.forEach((disturbance, lead) => {
      if (actsOn(artefact, lead)) disturb(disturbance, artefact, grid, random);
    });
  return disturbances;
}

interface LeadParts {
  readonly spec: SimulationSpec;
  readonly grid: CoarseGrid;
  readonly slowUv: Float64Array;
  readonly movement: Float64Array | null;
  readonly disturbance: LeadDisturbance;
}

/** Adds everything but the beats to a lead, then rounds and clips it as the digitiser does. */
function mixLead(signal: Float64Array, index: number, parts: LeadParts): void {
  const { spec, grid, slowUv, movement, disturbance } = parts;
  const { noise, rateHz, digitiser } = spec;
  const lead = spec.leads[index];
  const random = stream(spec.seed, STREAMS.lead + index);
  const coarse = slowUv.slice();
  for (let i = 0; i < grid.points; i += 1)
    coarse[i] += disturbance.slowUv[i] + (movement === null ? 0 : lead.breathingUv * movement[i]);
  addSlowNoise(coarse, noise, lead, grid, random);
  addUpsampled(signal, coarse, grid.every);
  const cycles = random.uniform();
  addMains(signal, disturbance.mainsUv, grid.every, { hz: noise.mainsHz, rateHz, cycles });
  addFastNoise(signal, noise.whiteUv, disturbance.muscleUv, grid.every, random);
  if (digitiser) digitise(signal, digitiser.stepUv, digitiser.railUv);
  for (const artefact of spec.artefacts)
    if (actsOn(artefact, index)) hold(signal, artefact, rateHz, digitiser?.railUv ?? 3276.7);
}

function digitise(signal: Float64Array, stepUv: number, railUv: number): void {
  const most = Math.round(railUv / stepUv);
  const perUv = 1 / stepUv;
  for (let n = 0; n < signal.length; n += 1) {
    const steps = Math.round(signal[n] * perUv);
    signal[n] = Math.max(-most, Math.min(most, steps)) * stepUv;
  }
}
