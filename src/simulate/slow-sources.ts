import { sin } from '../numeric/elementary';
import type { Random } from '../numeric/random';
import { addWander, type CoarseGrid, cyclesOf, trackOnGrid } from './coarse-grid';
import type { BreathingSpec, LeadSpec, SlowWaveSpec } from './spec';

const TWO_PI = 2 * Math.PI;
/** Phase of harmonic k at the fundamental's rising zero, in cycles for each of k - 1: the wave falls faster than it rises. */
const HARMONIC_CYCLES = 0.1;
const LEAST_CPM = 0.2;

/** The slow wave at its source, on the coarse grid. */
export interface SlowWave {
  readonly frequencyCpm: Float64Array;
  readonly cycles: Float64Array;
  readonly amplitudeUv: Float64Array;
  readonly harmonics: readonly number[];
}

/** Frequency, phase and amplitude of a slow wave over time. */
export function slowWave(spec: SlowWaveSpec, grid: CoarseGrid, random: Random): SlowWave {
  const frequencyCpm = trackOnGrid(spec.frequencyCpm, grid);
  addWander(frequencyCpm, random, spec.wanderCpm, spec.wanderS, grid.stepS);
  for (let i = 0; i < grid.points; i += 1) frequencyCpm[i] = Math.max(LEAST_CPM, frequencyCpm[i]);
  const change = new Float64Array(grid.points).fill(1);
  addWander(change, random, spec.amplitudeWander, spec.wanderS, grid.stepS);
  const amplitudeUv = trackOnGrid(spec.amplitudeUv, grid);
  for (let i = 0; i < grid.points; i += 1) amplitudeUv[i] *= Math.max(0.1, change[i]);
  return {
    frequencyCpm,
    cycles: cyclesOf(frequencyCpm, grid),
    amplitudeUv,
    harmonics: spec.harmonics,
  };
}

/** The slow wave as a lead sees it: its gain, and later by its delay at the frequency of the moment. */
export function slowWaveOnLead(wave: SlowWave, lead: LeadSpec): Float64Array {
  const { cycles, frequencyCpm, amplitudeUv, harmonics } = wave;
  const values = new Float64Array(cycles.length);
  for (let i = 0; i < values.length; i += 1) {
    const place = cycles[i] - (frequencyCpm[i] / 60) * lead.slowDelayS;
    let shape = sineOf(place);
    for (let k = 0; k < harmonics.length; k += 1)
      shape += harmonics[k] * sineOf((k + 2) * place + (k + 1) * HARMONIC_CYCLES);
    values[i] = lead.slowGain * amplitudeUv[i] * shape;
  }
  return values;
}

/** Breathing on the coarse grid: its rate, and its movement from -1 to 1 (somewhat more at the crests). */
export interface Breathing {
  readonly ratePerMin: Float64Array;
  readonly movement: Float64Array;
}

export function breathing(spec: BreathingSpec, grid: CoarseGrid, random: Random): Breathing {
  const ratePerMin = trackOnGrid(spec.ratePerMin, grid);
  addWander(ratePerMin, random, spec.wanderPerMin, 20, grid.stepS);
  for (let i = 0; i < grid.points; i += 1) ratePerMin[i] = Math.max(1, ratePerMin[i]);
  const cycles = cyclesOf(ratePerMin, grid);
  const movement = new Float64Array(grid.points);
  for (let i = 0; i < grid.points; i += 1)
    movement[i] = sineOf(cycles[i]) + 0.15 * sineOf(2 * cycles[i] + 0.2);
  return { ratePerMin, movement };
}

/** sin(2 pi cycles), with whole cycles taken off first. */
export function sineOf(cycles: number): number {
  return sin(TWO_PI * (cycles - Math.floor(cycles)));
}
