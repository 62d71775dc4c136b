import type { Cpm, Hertz } from '../units/rate';
import type { Seconds } from '../units/time';

/** The heartbeat has no route `beat-average`: the beats that are averaged have to be found in it first. */
export const HEART_ROUTES = ['band', 'fractional'] as const;
export type HeartRouteName = (typeof HEART_ROUTES)[number];
export const SLOW_ROUTES = ['band', 'beat-average', 'fractional'] as const;
export type RouteName = (typeof SLOW_ROUTES)[number];

/** How the average heartbeat is made that route `beat-average` takes out. */
export interface BeatAverageSettings {
  /** How far it reaches at most before and after R; less where beats come close. */
  readonly beforeMs: number;
  readonly afterMs: number;
  /** Beats of the same class nearby that it is the mean of. */
  readonly beats: number;
}

/** How route `band` weighs the frequencies inside its band: all alike, or by how far each stands out of the lead's own background. */
export const SLOW_GAINS = ['fitted', 'even'] as const;
export type SlowGain = (typeof SLOW_GAINS)[number];

/** Whether breathing is taken out of the drawn slow wave: where a reference for it measurably helps, or never. */
export const BREATHING_OUT = ['where-it-helps', 'never'] as const;
export type BreathingOut = (typeof BREATHING_OUT)[number];

/** Limits of the rhythm bands, half-open: brady [low, normoLow), normo [normoLow, normoHigh), tachy [normoHigh, high). */
export interface RhythmBands {
  readonly lowCpm: Cpm;
  readonly normoLowCpm: Cpm;
  readonly normoHighCpm: Cpm;
  readonly highCpm: Cpm;
}

/** Everything that changes a figure and that a person may choose; stored with the session and printed with the report. */
export interface Settings {
  readonly slowRoute: RouteName;
  readonly heartRoute: HeartRouteName;
  readonly slowBandCpm: readonly [low: Cpm, high: Cpm];
  readonly slowGain: SlowGain;
  readonly breathingOut: BreathingOut;
  readonly heartBandHz: readonly [low: Hertz, high: Hertz];
  readonly fractional: {
    /** Derivative order, 0 to 1. */
    readonly order: number;
    readonly memoryS: Seconds;
    readonly slowWindowMs: number;
    readonly heartWindowMs: number;
    /** Polynomial order of the smoothing, 1 to 4. */
    readonly polynomialOrder: number;
    /** Shift the drawn slow wave back by the lead in time that the derivative gives it at DF. */
    readonly undoLead: boolean;
  };
  readonly beatAverage: BeatAverageSettings;
  readonly rhythmBands: RhythmBands;
  readonly epoch: {
    readonly lengthS: Seconds;
    readonly stepS: Seconds;
    /** Largest spoiled fraction, weighted by the taper, of a kept epoch. */
    readonly maxSpoiled: number;
    /** False-alarm rate of the peak test per epoch. */
    readonly falseAlarm: number;
  };
  readonly variability: {
    readonly segmentS: Seconds;
    readonly lfHz: readonly [low: Hertz, high: Hertz];
    readonly hfHz: readonly [low: Hertz, high: Hertz];
    /** Smallest share of NN intervals of a segment that carries spectral figures. */
    readonly minNnShare: number;
  };
}

export const DEFAULT_SETTINGS: Settings = {
  slowRoute: 'band',
  heartRoute: 'band',
  slowBandCpm: [0.8, 10],
  slowGain: 'fitted',
  breathingOut: 'where-it-helps',
  heartBandHz: [0.5, 40],
  fractional: {
    order: 0.5,
    memoryS: 60,
    slowWindowMs: 1000,
    heartWindowMs: 40,
    polynomialOrder: 2,
    undoLead: false,
  },
  beatAverage: { beforeMs: 300, afterMs: 500, beats: 60 },
  rhythmBands: { lowCpm: 1, normoLowCpm: 2, normoHighCpm: 4, highCpm: 9 },
  epoch: { lengthS: 240, stepS: 60, maxSpoiled: 0.25, falseAlarm: 0.05 },
  variability: { segmentS: 300, lfHz: [0.04, 0.15], hfHz: [0.15, 0.4], minNnShare: 0.9 },
};

/**
 * Published and usual variants of the band limits, named by their limits. Sources: half-open [2, 4) is the most used;
 * 2.5-3.75 (Koch & Stern 2004, brady range; rest from memory); 2.4-3.7 (from memory); 2.5-3.5 (paediatric practice).
 */
export const BAND_PRESETS: readonly RhythmBands[] = [
  { lowCpm: 1, normoLowCpm: 2, normoHighCpm: 4, highCpm: 9 },
  { lowCpm: 0.5, normoLowCpm: 2, normoHighCpm: 4, highCpm: 9 },
  { lowCpm: 1, normoLowCpm: 2.5, normoHighCpm: 3.75, highCpm: 10 },
  { lowCpm: 0.5, normoLowCpm: 2.4, normoHighCpm: 3.7, highCpm: 9 },
  { lowCpm: 1, normoLowCpm: 2.5, normoHighCpm: 3.5, highCpm: 9 },
];

/** A set of band limits by its limits: "1-2-4-9 cpm". */
export function bandsName(bands: RhythmBands): string {
  return `${bands.lowCpm}-${bands.normoLowCpm}-${bands.normoHighCpm}-${bands.highCpm} cpm`;
}
