/** A library that is part of the page, and the licence it is used under. */
export interface Library {
  readonly name: string;
  readonly licence: string;
  readonly use: string;
}

/** Every library that ships with the page. */
export const LIBRARIES: readonly Library[] = [
  { name: '@stdlib/math-base-special-atan2', licence: 'Apache-2.0', use: 'arctangent' },
  { name: '@stdlib/math-base-special-cos', licence: 'Apache-2.0', use: 'cosine' },
  { name: '@stdlib/math-base-special-exp', licence: 'Apache-2.0', use: 'exponential' },
  { name: '@stdlib/math-base-special-ln', licence: 'Apache-2.0', use: 'logarithm' },
  { name: '@stdlib/math-base-special-pow', licence: 'Apache-2.0', use: 'power' },
  { name: '@stdlib/math-base-special-sin', licence: 'Apache-2.0', use: 'sine' },
  { name: 'comlink', licence: 'Apache-2.0', use: 'calls between page and worker' },
  { name: 'fft.js', licence: 'MIT', use: 'fast Fourier transform' },
  { name: 'hash-wasm', licence: 'MIT', use: 'SHA-256 of study files' },
  { name: 'react', licence: 'MIT', use: 'the page' },
  { name: 'react-dom', licence: 'MIT', use: 'the page' },
  { name: 'uplot', licence: 'MIT', use: 'traces' },
  { name: 'valibot', licence: 'MIT', use: 'check of session files' },
  { name: 'zustand', licence: 'MIT', use: 'state of the page' },
];
