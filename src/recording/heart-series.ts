import type { Seconds } from '../units/time';

/** RR intervals of the study, one an interval, at the time of the beat that ends it. */
export interface RrSeries {
  readonly timesS: Float64Array;
  readonly rrMs: Float64Array;
  /** 1 where the interval enters the variability figures. */
  readonly nn: Uint8Array;
}

/** One 5 min segment of a phase; irregular segments are shown and withheld. */
export interface HeartSegment {
  readonly phase: string;
  readonly fromS: Seconds;
  readonly toS: Seconds;
  readonly nnShare: number;
  readonly state: 'used' | 'irregular' | 'too-few-nn' | 'too-short';
  readonly sdnnMs: number | null;
  readonly lfMs2: number | null;
  readonly hfMs2: number | null;
}

/** Breathing rate over time, one value a window centre; NaN where it cannot be told. */
export interface BreathingSeries {
  readonly centresS: Float64Array;
  readonly perMinute: Float64Array;
  readonly from: 'lead' | 'derived' | 'none';
}
