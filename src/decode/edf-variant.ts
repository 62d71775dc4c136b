import type { SampleBytes } from './digital-numbers';

/** One of the formats that share the layout of EDF (Kemp 1992; Kemp & Olivan 2003). */
export interface EdfVariant {
  readonly name: 'EDF' | 'EDF+C' | 'EDF+D' | 'BDF' | 'BDF+C' | 'BDF+D';
  readonly sampleBytes: SampleBytes;
  /** Whether records follow one another (C) or may leave gaps (D), as the file says; plain files say nothing. */
  readonly plus: 'none' | 'C' | 'D';
}
