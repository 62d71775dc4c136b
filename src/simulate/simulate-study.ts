import { createRandom, type Random } from '../numeric/random';
import type { Hertz } from '../units/rate';
import { disturb, hold, type LeadDisturbance } from './artefacts';
import { addBeats } from './beat-shape';
import { beatTimes, type TrueBeat } from './beat-times';
import { addUpsampled, type CoarseGrid, coarseGrid } from './coarse-grid';
import { addBackground, addDrift, addFastNoise, addMains } from './noise';
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

/** What a lead is the sum of, before it is rounded and before flat and rail stretches. */
export const SOURCES = [
  'slow wave',
  'heartbeat',
  'breathing',
  'background',
  'drift',
  'artefacts',
  'hum',
  'noise',
] as const;
export type Source = (typeof SOURCES)[number];

/** Samples of each source in uV. */
export type LeadSources = Readonly<Record<Source, Float64Array>>;

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
  const samples = samplesOf(spec);
  const mixed = spec.leads.map(() => new Float64Array(samples));
  const truth = addSources(
    spec,
    mixed.map((signal) => () => signal),
  );
  mixed.forEach((signal, k) => {
    digitise(signal, spec, k);
  });
  return {
    rateHz: spec.rateHz,
    labels: spec.leads.map((lead) => lead.label),
    signals: mixed,
    truth,
  };
}

/**
 * The same study with its sources kept apart, one record a lead: their sum is what simulateStudy rounds (to 1e-9 of its
 * size), so that what a filter lets through of each can be measured and the best linear filter be computed. Throws as
 * simulateStudy does. Takes eight times its memory.
 */
export function simulateSources(spec: SimulationSpec): {
  readonly leads: readonly LeadSources[];
  readonly truth: StudyTruth;
} {
  const samples = samplesOf(spec);
  const leads = spec.leads.map(() => apart(samples));
  const truth = addSources(
    spec,
    leads.map((lead) => (source) => lead[source]),
  );
  return { leads, truth };
}

const apart = (samples: number): LeadSources => ({
  'slow wave': new Float64Array(samples),
  heartbeat: new Float64Array(samples),
  breathing: new Float64Array(samples),
  background: new Float64Array(samples),
  drift: new Float64Array(samples),
  artefacts: new Float64Array(samples),
  hum: new Float64Array(samples),
  noise: new Float64Array(samples),
});

/** Where the samples of a source go; the same array for all of them where a lead is to be mixed. */
type SignalOf = (source: Source) => Float64Array;

function samplesOf({ rateHz, leads, durationS }: SimulationSpec): number {
  const samples = Math.round(durationS * rateHz);
  if (!(rateHz >= 1 && rateHz <= 10_000) || leads.length === 0 || !(samples >= 1))
    throw new RangeError('simulateStudy wants 1-10000 Hz, a lead and a duration');
  return samples;
}

/** Adds every source of a study to where each lead wants it. */
function addSources(spec: SimulationSpec, signalsOf: readonly SignalOf[]): StudyTruth {
  const { seed, rateHz, leads } = spec;
  const samples = samplesOf(spec);
  const grid = coarseGrid(samples, rateHz);
  const slow = spec.slowWave && slowWave(spec.slowWave, grid, stream(seed, STREAMS.slow));
  const breath = spec.breathing && breathing(spec.breathing, grid, stream(seed, STREAMS.breath));
  const movement = breath?.movement ?? null;
  const slowUv = leads.map((lead) =>
    slow ? slowWaveOnLead(slow, lead) : new Float64Array(grid.points),
  );
  const disturbances = disturbancesOf(spec, grid);
  const beats = spec.heart
    ? beatTimes(spec.heart, grid, movement, stream(seed, STREAMS.heart))
    : [];
  const heartbeats = signalsOf.map((signalOf) => signalOf('heartbeat'));
  if (spec.heart) addBeats(heartbeats, leads, beats, { heart: spec.heart, rateHz, grid, movement });
  signalsOf.forEach((signalOf, k) => {
    const parts = { spec, grid, slowUv: slowUv[k], movement, disturbance: disturbances[k] };
    mixLead(signalOf, k, parts);
  });
  return {
    rateHz: 1 / grid.stepS,
    beats: beats.filter((beat) => beat.timeS * rateHz < samples),
    slowCpm: slow?.frequencyCpm ?? null,
    slowAmplitudeUv: leads.map((lead) => amplitudeOnLead(slow, lead, grid)),
    slowUv,
    breathsPerMin: breath?.ratePerMin ?? null,
    breathing: movement,
    spoiled: spec.artefacts,
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

/** Adds everything but the beats to a lead. */
function mixLead(signalOf: SignalOf, index: number, parts: LeadParts): void {
  const { spec, grid, slowUv, movement, disturbance } = parts;
  const { noise, rateHz } = spec;
  const lead = spec.leads[index];
  const random = stream(spec.seed, STREAMS.lead + index);
  const slow = slowSums(signalOf, grid);
  addTo(slow.of('slow wave'), slowUv, 1);
  addTo(slow.of('artefacts'), disturbance.slowUv, 1);
  if (movement) addTo(slow.of('breathing'), movement, lead.breathingUv);
  addBackground(slow.of('background'), noise, grid, random);
  addDrift(slow.of('drift'), noise, lead, grid);
  slow.finish();
  const cycles = random.uniform();
  addMains(signalOf('hum'), disturbance.mainsUv, grid.every, {
    hz: noise.mainsHz,
    rateHz,
    cycles,
  });
  addFastNoise(signalOf('noise'), noise.whiteUv, disturbance.muscleUv, grid.every, random);
}

/** Sums of slow sources on the coarse grid, one a signal; `finish` adds each to its signal. */
function slowSums(signalOf: SignalOf, grid: CoarseGrid) {
  const sums = new Map<Float64Array, Float64Array>();
  return {
    of(source: Source): Float64Array {
      const signal = signalOf(source);
      const sum = sums.get(signal) ?? new Float64Array(grid.points);
      sums.set(signal, sum);
      return sum;
    },
    finish(): void {
      for (const [signal, sum] of sums) addUpsampled(signal, sum, grid.every);
    },
  };
}

function addTo(sum: Float64Array, values: Float64Array, gain: number): void {
  for (let i = 0; i < sum.length; i += 1) sum[i] += gain * values[i];
}

/** Rounds and clips a lead as the digitiser does, then lays flat and rail stretches on it. */
function digitise(signal: Float64Array, spec: SimulationSpec, index: number): void {
  const { digitiser, rateHz } = spec;
  if (digitiser) round(signal, digitiser.stepUv, digitiser.railUv);
  for (const artefact of spec.artefacts)
    if (actsOn(artefact, index)) hold(signal, artefact, rateHz, digitiser?.railUv ?? 3276.7);
}

function round(signal: Float64Array, stepUv: number, railUv: number): void {
  const most = Math.round(railUv / stepUv);
  const perUv = 1 / stepUv;
  for (let n = 0; n < signal.length; n += 1) {
    const steps = Math.round(signal[n] * perUv);
    signal[n] = Math.max(-most, Math.min(most, steps)) * stepUv;
  }
}
