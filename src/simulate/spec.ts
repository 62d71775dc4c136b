import type { SpanCause } from '../recording/span';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import type { Microvolts } from '../units/voltage';

/** A quantity over time: constant, or straight lines between points (ascending in time, at least one), held outside them. */
export type Track = number | readonly TrackPoint[];

export interface TrackPoint {
  readonly atS: Seconds;
  readonly value: number;
}

/** How one lead sees the sources. */
export interface LeadSpec {
  readonly label: string;
  /** Slow wave on this lead: amplitude relative to SlowWaveSpec.amplitudeUv, and how much later it arrives. */
  readonly slowGain: number;
  readonly slowDelayS: Seconds;
  /** Height of the R wave on a lead that points along it. */
  readonly heartUv: Microvolts;
  /** Angle between the lead and the R wave in degrees: 0 upright, 90 biphasic and small, 180 inverted. */
  readonly heartAxisDeg: number;
  /** Peak of the breathing wave. */
  readonly breathingUv: Microvolts;
  /** Level at the start that settles to 0 with NoiseSpec.driftS. */
  readonly driftUv: Microvolts;
}

export interface SlowWaveSpec {
  /** Frequency in cpm; a constant gives exactly this frequency when wanderCpm is 0. */
  readonly frequencyCpm: Track;
  /** Standard deviation of a slow random drift of the frequency, and its correlation time. */
  readonly wanderCpm: number;
  readonly wanderS: Seconds;
  /** Peak of the fundamental on a lead of gain 1. */
  readonly amplitudeUv: Track;
  /** Standard deviation of a slow random change of amplitude, as a share of it. */
  readonly amplitudeWander: number;
  /**
   * Amplitudes of the second, third ... harmonic as shares of the fundamental; empty for a sine. 1/2, 1/3, 1/4 ... is a
   * sawtooth.
   */
  readonly harmonics: readonly number[];
}

export interface HeartSpec {
  readonly rateBpm: Track;
  /** Peak of the RR modulation by breathing, and near 0.1 Hz, in ms. */
  readonly respiratoryMs: Track;
  readonly lowFrequencyMs: Track;
  /** Standard deviation of what is random from beat to beat, in ms. */
  readonly jitterMs: number;
  /** Early V beats with a compensatory pause, and early S beats without, an hour. */
  readonly ventricularPerHour: number;
  readonly supraventricularPerHour: number;
  /** Height of the T wave as a share of the R wave. */
  readonly tWave: number;
  /** Share by which breathing changes the height of beats. */
  readonly respiratoryHeight: number;
}

export interface BreathingSpec {
  readonly ratePerMin: Track;
  readonly wanderPerMin: number;
}

export interface NoiseSpec {
  /** White noise, root mean square. */
  readonly whiteUv: Microvolts;
  /** Muscle noise (rises with frequency), root mean square. */
  readonly muscleUv: Microvolts;
  /** Noise like 1/f from about 0.002 to 0.2 Hz, root mean square. */
  readonly backgroundUv: Microvolts;
  /** Peak of the mains hum. */
  readonly mainsUv: Microvolts;
  readonly mainsHz: Hertz;
  readonly driftS: Seconds;
}

/**
 * A spoiled stretch. `sizeUv` is its usual size: the root mean square of talk, move, eat and burst, the height of step, cough
 * and electrode; flat holds the last value and rail the digitiser's end (the lower one where sizeUv is negative).
 */
export interface ArtefactSpec {
  readonly cause: Exclude<SpanCause, 'gap' | 'other'>;
  readonly fromS: Seconds;
  readonly toS: Seconds;
  /** Indexes of the leads it spoils; null: all. */
  readonly leads: readonly number[] | null;
  readonly sizeUv: Microvolts;
}

/** Everything that decides an invented study; the same spec gives the same study everywhere. */
export interface SimulationSpec {
  /** Whole number from 0 to 2^32 - 1. Each source has random numbers of its own, so changing one leaves the others. */
  readonly seed: number;
  readonly durationS: Seconds;
  /** 1 to 10000 Hz. */
  readonly rateHz: Hertz;
  readonly leads: readonly LeadSpec[];
  /** Null: no slow wave, no heart, no breathing. */
  readonly slowWave: SlowWaveSpec | null;
  readonly heart: HeartSpec | null;
  readonly breathing: BreathingSpec | null;
  readonly noise: NoiseSpec;
  readonly artefacts: readonly ArtefactSpec[];
  /** Rounding to steps and clipping at the ends; null: neither. */
  readonly digitiser: { readonly stepUv: Microvolts; readonly railUv: Microvolts } | null;
}

export const PLAIN_LEAD: LeadSpec = {
  label: 'EGG 1',
  slowGain: 1,
  slowDelayS: 0,
  heartUv: 150,
  heartAxisDeg: 0,
  breathingUv: 40,
  driftUv: 0,
};

/** Ten quiet minutes on one lead: a start for specs that change what they need. */
export const PLAIN_STUDY: SimulationSpec = {
  seed: 1,
  durationS: 600,
  rateHz: 250,
  leads: [PLAIN_LEAD],
  slowWave: {
    frequencyCpm: 3,
    wanderCpm: 0,
    wanderS: 120,
    amplitudeUv: 150,
    amplitudeWander: 0,
    harmonics: [0.15],
  },
  heart: {
    rateBpm: 66,
    respiratoryMs: 30,
    lowFrequencyMs: 20,
    jitterMs: 5,
    ventricularPerHour: 0,
    supraventricularPerHour: 0,
    tWave: 0.28,
    respiratoryHeight: 0.08,
  },
  breathing: { ratePerMin: 15, wanderPerMin: 0.5 },
  noise: { whiteUv: 1, muscleUv: 2, backgroundUv: 15, mainsUv: 2, mainsHz: 50, driftS: 400 },
  artefacts: [],
  digitiser: { stepUv: 0.1, railUv: 3276.7 },
};

/** Value of a track at a time. */
export function trackAt(track: Track, timeS: Seconds): number {
  if (typeof track === 'number') return track;
  const next = track.findIndex((point) => point.atS > timeS);
  return trackBetween(track, next < 0 ? track.length : next, timeS);
}

/** Value of a track at a time before point `next` and not before the one in front of it. */
export function trackBetween(track: readonly TrackPoint[], next: number, timeS: Seconds): number {
  if (next === 0) return track[0].value;
  if (next === track.length) return track[next - 1].value;
  const a = track[next - 1];
  const b = track[next];
  return a.value + ((b.value - a.value) * (timeS - a.atS)) / (b.atS - a.atS);
}
