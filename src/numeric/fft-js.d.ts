/** The part of fft.js 4.0 that fft.ts uses, typed; the declarations it ships are made of `any`. */
declare module 'fft.js' {
  export default class FFT {
    constructor(size: number);
    readonly size: number;
    /** Twiddle factors cos, -sin of pi i / size, interleaved. */
    table: number[] | Float64Array;
    transform(out: Float64Array, complexIn: Float64Array): void;
    realTransform(out: Float64Array, realIn: Float64Array): void;
    completeSpectrum(spectrum: Float64Array): void;
    inverseTransform(out: Float64Array, complexIn: Float64Array): void;
  }
}
