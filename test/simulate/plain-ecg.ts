import type { EcgNoiseSpec } from '../../src/simulate/ecg-noise';
import type { EcgRhythmSpec } from '../../src/simulate/ecg-rhythm';

/** A sinus rhythm of 75 a minute in which nothing happens. */
export const PLAIN_SINUS: EcgRhythmSpec = {
  base: 'sinus',
  rateBpm: 75,
  breathing: 0,
  wander: 0,
  jitter: 0.01,
  breathsPerMin: 15,
  chances: { ventricular: 0, atrial: 0, pause: 0 },
  aberrant: 0,
  blocked: 0,
  again: 0,
  foci: 1,
  episodes: [],
};

/** No noise of any kind. */
export const QUIET: EcgNoiseSpec = {
  wanderUv: 0,
  muscleUv: 0,
  burstsPerMin: 0,
  burstUv: 0,
  burstS: 1,
  motionPerMin: 0,
  motionUv: 0,
  humUv: 0,
  humHz: 50,
  stepsPerHour: 0,
  stepUv: 0,
  popsPerHour: 0,
  popUv: 0,
};
