import type { SignalSource } from '../recording/recording';
import type { TextReading } from './text-reading';

/** How sure a format is that bytes are its own. */
export type Recognition = 'certain' | 'possible' | 'no';

/** One format: how it is recognised by content, and how it is opened. */
export interface Format {
  readonly name: string;
  readonly extensions: readonly string[];
  /** `head` is the first 64 kB of the file, or all of it. */
  recognises(head: Uint8Array, fileName: string): Recognition;
  open(file: Blob, fileName: string, reading: TextReading | null): Promise<SignalSource>;
}
