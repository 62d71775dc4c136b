import type { Hertz } from '../units/rate';
import type { Microvolts } from '../units/voltage';

/** A unit the program can turn into microvolts, or one it cannot. */
export type ChannelUnit =
  | { readonly kind: 'voltage'; readonly text: string; readonly microvoltsPerUnit: number }
  | { readonly kind: 'unknown'; readonly text: string };

/** What the file says of the filters a channel went through. */
export type Prefilter =
  | {
      readonly kind: 'stated';
      readonly text: string;
      readonly highPassHz: Hertz | null;
      readonly lowPassHz: Hertz | null;
    }
  | { readonly kind: 'unknown'; readonly text: string };

/** One stored signal of the file. Samples of a channel with an unknown unit are read in that unit. */
export interface Channel {
  /** Place among the file's ordinary signals, from 0; people see it from 1 ("#1"). */
  readonly index: number;
  /** Unique within the recording. */
  readonly label: string;
  readonly rateHz: Hertz;
  readonly sampleCount: number;
  readonly unit: ChannelUnit;
  /** One digital step in uV, 0 where not known. */
  readonly stepUv: Microvolts;
  /** The two ends of the digitiser's range in uV; null where not known. */
  readonly railsUv: readonly [low: Microvolts, high: Microvolts] | null;
  readonly transducer: string;
  readonly prefilter: Prefilter;
}
