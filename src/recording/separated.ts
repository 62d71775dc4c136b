import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import type { Interval } from './span';

/** Rate of the slow wave and of the lead that rhythm is computed on. */
export const SLOW_RATE_HZ: Hertz = 4;

/** The slow-wave side of one lead; arrays are uV, NaN inside gaps. */
export interface SlowOutput {
  readonly lead: string;
  /** 4 Hz unless the recording's rate is lower. */
  readonly rateHz: Hertz;
  /** The anti-aliased lead before any band-pass: what spectra are computed on under route `band`. */
  readonly recorded: Float64Array;
  /** The drawn slow wave of the chosen route. */
  readonly slowWave: Float64Array;
  /** What spectra are computed on, and the power response |H|2 to divide out of them; null where it is 1 (route `band`). */
  readonly forSpectra: Float64Array;
  readonly powerResponse: ((frequencyHz: Hertz) => number) | null;
  /** Stretches that the filter cannot fill cleanly: shaded. */
  readonly unclean: readonly Interval[];
  /** Seconds by which the drawn wave leads the recorded one at a frequency (route `fractional`); 0 under `band`. */
  readonly leadSAt: (frequencyHz: Hertz) => Seconds;
  readonly notes: readonly string[];
}

/** The heart side of one lead: uV, NaN inside gaps. */
export interface HeartOutput {
  readonly lead: string;
  readonly rateHz: Hertz;
  readonly heartbeat: Float32Array;
  /** The recording's own rate of the lead over rateHz. */
  readonly decimation: number;
  readonly unclean: readonly Interval[];
  readonly notes: readonly string[];
}
