import type { Seconds } from '../units/time';
import type { Channel } from './channel';

/** Who and when, as the file's header says; nothing here is verified. */
export interface Identity {
  readonly code: string | null;
  readonly name: string | null;
  readonly sex: string | null;
  readonly birthYear: number | null;
  /** The header's free text about the recording. */
  readonly recordingText: string;
}

/** Local date and time of the first sample, as written in the file. */
export type StartTime =
  | { readonly kind: 'known'; readonly local: string }
  | { readonly kind: 'unknown'; readonly raw: string };

export interface Annotation {
  readonly onsetS: Seconds;
  readonly durationS: Seconds | null;
  readonly text: string;
}

/** Something about the file that the person should know before the first figure. */
export interface FoundInFile {
  readonly severity: 'note' | 'warning';
  readonly what: string;
  readonly place: string | null;
}

/** A stretch without samples, on one channel or (null) on all. */
export interface Gap {
  readonly channel: number | null;
  readonly fromS: Seconds;
  readonly toS: Seconds;
}

/** One recording of one person on one occasion, without its samples. */
export interface Recording {
  /** Name of the format as the table of formats has it. */
  readonly format: string;
  readonly fileName: string;
  readonly sizeBytes: number;
  readonly identity: Identity;
  readonly start: StartTime;
  readonly durationS: Seconds;
  readonly channels: readonly Channel[];
  readonly annotations: readonly Annotation[];
  readonly found: readonly FoundInFile[];
  readonly gaps: readonly Gap[];
  /** True for a study the program made up; said wherever the study is shown. */
  readonly invented: boolean;
}

/** Samples of some channels over the same stretch of time, in the order of the request; NaN inside gaps. */
export interface SignalBlock {
  readonly fromS: Seconds;
  readonly firstSamples: readonly number[];
  readonly samples: readonly Float64Array[];
  /** How much of the file has been read, 0 to 1. */
  readonly done: number;
}

/** A recording with a way to its samples. Samples are in uV (channels of unknown unit: in that unit), NaN in gaps. */
export interface SignalSource {
  readonly recording: Recording;
  /** Samples [from, to) of one channel, clipped to what exists. Throws a Refusal when the file cannot be read. */
  read(channel: number, from: number, to: number): Promise<Float64Array>;
  /** All samples of the channels, in order, in blocks of a few megabytes of file. */
  blocks(channels: readonly number[]): AsyncIterable<SignalBlock>;
}
