import type { Cpm } from '../units/rate';
import type { Seconds } from '../units/time';

export const RHYTHMS = ['brady', 'normo', 'tachy', 'none', 'mixed', 'undecided'] as const;
export type Rhythm = (typeof RHYTHMS)[number];

export type EpochFlag = 'harmonic' | 'half' | 'breathing' | 'drift' | 'filled';

/** One analysis window of the slow wave of one lead; rhythm figures are null where the epoch is not kept. */
export interface Epoch {
  readonly lead: string;
  readonly phase: string;
  readonly fromS: Seconds;
  readonly toS: Seconds;
  readonly kept: boolean;
  /** Weighted by the taper, 0 to 1. */
  readonly spoiledFraction: number;
  readonly dfCpm: Cpm | null;
  readonly dpDb: number | null;
  /** Power within 0.5 cpm of DF over power in the search band, 0 to 1. */
  readonly peakShare: number | null;
  readonly rhythm: Rhythm | null;
  readonly flags: readonly EpochFlag[];
}

/** A running spectrum for the eye: dB re 1 uV2/Hz, one column a centre time, column after column. */
export interface Spectrogram {
  readonly centresS: Float64Array;
  readonly firstCpm: Cpm;
  readonly stepCpm: Cpm;
  readonly binCount: number;
  /** centresS.length * binCount values; NaN where the column is not kept. */
  readonly levelDb: Float32Array;
}

/** The slow wave of one lead as the stomach step leaves it. */
export interface SlowWaveRhythm {
  readonly lead: string;
  readonly epochs: readonly Epoch[];
  readonly spectrogram: Spectrogram;
  /** Times of the crests of the drawn slow wave. */
  readonly crestsS: Float64Array;
}
