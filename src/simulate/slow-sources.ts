import { sin } from '../numeric/elementary';
import type { Random } from '../numeric/random';
import { addWander, type CoarseGrid, cyclesOf, trackOnGrid } from './coarse-grid';
import type { BreathingSpec, LeadSpec, SlowWaveSpec } from './spec';

const TWO_PI = 2 * Math.PI;
/** Phase of the second harmonic at the fundamental's rising zero, in cycles: the wave falls faster than it rises. */
const HARMONIC_CYCLES = 0.1;
const LEAST_CPM = 0.2;

/** The slow wave at its source, on the coarse grid. */
export interface SlowWave {
  readonly frequencyCpm: Float64Array;
  readonly cycles: Float64Array;
  readonly amplitudeUv: Float64Array;
  readonly secondHarmonic: number;
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
    cycles: cyclesOf(
      frequencyCpm.map((cpm) => cpm / 60),
      grid,
    ),
    amplitudeUv,
    secondHarmonic: spec.secondHarmonic,
  };
}

/** The slow wave as a lead sees it: its gain, and later by its delay at the frequency of the moment. */
export function slowWaveOnLead(wave: SlowWave, lead: LeadSpec): Float64Array {
  return wave.cycles.map((cycles, i) => {
    const place = cycles - (wave.frequencyCpm[i] / 60) * lead.slowDelayS;
    const shape =
      sineOf(place) +
      (wave.secondHarmonic === 0 ? 0 : wave.secondHarmonic * sineOf(2 * place + HARMONIC_CYCLES));
    return lead.slowGain * wave.amplitudeUv[i] * shape;
  });
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
  const cycles = cyclesOf(
    ratePerMin.map((rate) => rate / 60),
    grid,
  );
  const movement = cycles.map((place) => sineOf(place) + 0.15 * sineOf(2 * place + 0.2));
  return { ratePerMin, movement };
}

/** sin(2 pi cycles), with whole cycles taken off first. */
export function sineOf(cycles: number): number {
  return sin(TWO_PI * (cycles - Math.floor(cycles)));
}
