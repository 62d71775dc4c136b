import type { Cpm } from '../../units/rate';
import type { Seconds } from '../../units/time';
import type { Microvolts } from '../../units/voltage';

/** Middle value and the least and greatest over the stretches of the study; null where no stretch has a value. */
export interface OverStretches {
  readonly median: number;
  readonly least: number;
  readonly most: number;
}

/** A part of the check that could not be made, and why. */
export interface NotPlanted {
  readonly kind: 'not-planted';
  readonly reason: string;
}

/** What is planted: a wave of one rate, or one that drifts through all of them. */
export type PlantedRate =
  | { readonly kind: 'steady'; readonly cpm: Cpm }
  | { readonly kind: 'drift' };

/** The scores of one planted wave; those over stretches are of the value of each stretch. */
export interface PlantedWave {
  readonly rate: PlantedRate;
  /** Peak of the planted wave. */
  readonly uv: Microvolts;
  /** Epochs it was looked for in, and those given its rhythm. */
  readonly epochs: number;
  readonly right: number;
  readonly rightPct: OverStretches | null;
  /** Over the epochs given the right rhythm: size of the error of DF, error of DP. */
  readonly dfErrorCpm: OverStretches | null;
  readonly dpErrorDb: OverStretches | null;
  readonly snrDb: OverStretches | null;
  /** Height of the drawn wave over the planted one, and how much later it is drawn. */
  readonly scale: OverStretches | null;
  readonly delayS: OverStretches | null;
  readonly picture: PlantedWavePicture;
}

/** A few minutes of a planted wave and of what was drawn of it, and the spectra; for the eye. */
export interface PlantedWavePicture {
  readonly fromS: Seconds;
  readonly stepS: Seconds;
  readonly plantedUv: Float32Array;
  /** NaN where nothing is drawn. */
  readonly drawnUv: Float32Array;
  /** Mean power density over the epochs, dB re 1 uV2/Hz, by bins of PlantedSlow.binCpm, of leftover and planted wave. */
  readonly spectrumDb: Float32Array;
}

/** The smallest wave of one rate that this recording could show. */
export interface SmallestWave {
  readonly cpm: Cpm;
  /** Peak of the wave found in 95 % of epochs; null where no wave up to `upToUv` is. */
  readonly uv: Microvolts | null;
  readonly upToUv: Microvolts;
  /** Percent of epochs in which the largest wave tried was found. */
  readonly mostPct: number;
}

export interface PlantedSlow {
  readonly kind: 'planted';
  /** Key of the lead. */
  readonly lead: string;
  /** Median height of the study's own wave, and what it was read from: epochs with a rhythm, or highest peaks where none has one. */
  readonly ownUv: Microvolts;
  readonly ownFrom: 'rhythm' | 'peaks';
  readonly stretches: number;
  readonly stretchS: Seconds;
  readonly epochs: number;
  /** Power left at the study's own lines over that of the neighbouring bands, dB; null where it has none. */
  readonly restDb: number | null;
  readonly waves: readonly PlantedWave[];
  readonly smallest: readonly SmallestWave[];
  readonly binCpm: Cpm;
  /** Mean spectrum of the leftover alone. */
  readonly leftoverDb: Float32Array;
}

/** The scores of planted heartbeats of one height. */
export interface PlantedBeats {
  /** Height over the study's own average. */
  readonly share: number;
  readonly planted: number;
  readonly sensitivityPct: OverStretches | null;
  readonly predictivityPct: OverStretches | null;
  /** Standard deviation of the time found less the time planted, a constant delay left out. */
  readonly timingMs: OverStretches | null;
  /** RMSSD found less RMSSD planted over the same intervals. */
  readonly rmssdErrorMs: OverStretches | null;
}

export interface PlantedHeart {
  readonly kind: 'planted';
  readonly lead: string;
  readonly stretches: number;
  readonly stretchS: Seconds;
  /** Height of the study's own average beat, from trough to crest of its QRS complex. */
  readonly ownUv: Microvolts;
  /** Beats that the average was made of. */
  readonly averaged: number;
  readonly rmssdMs: number;
  readonly meanRrMs: number;
  readonly beats: readonly PlantedBeats[];
  readonly picture: PlantedBeatsPicture;
}

/** Ten seconds of planted beats in the leftover, and the average; for the eye. */
export interface PlantedBeatsPicture {
  readonly fromS: Seconds;
  readonly stepS: Seconds;
  /** The heartbeat signal with the planted beats. */
  readonly heartbeatUv: Float32Array;
  readonly plantedS: readonly Seconds[];
  readonly foundS: readonly Seconds[];
  readonly leftOutS: readonly Seconds[];
}

/** Known waves and heartbeats planted in this recording's own noise, and what came back. */
export interface PlantedEvidence {
  readonly slow: PlantedSlow | NotPlanted;
  readonly heart: PlantedHeart | NotPlanted;
}
