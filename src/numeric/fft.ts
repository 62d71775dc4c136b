/// <reference path="./fft-js.d.ts" />
import FFT from 'fft.js';
import { cos, sin } from './elementary';

/** A discrete Fourier transform of one size; complex arrays are interleaved re, im. */
export interface Fft {
  readonly size: number;
  /** X[k] = sum x[n] e^(-2 pi i k n / size); both arrays hold 2 size numbers and differ. */
  forward(complexIn: Float64Array, out: Float64Array): void;
  /** The same of `size` real numbers; `out` takes the full spectrum, 2 size numbers. */
  forwardReal(realIn: Float64Array, out: Float64Array): void;
  /** x[n] = (1/size) sum X[k] e^(2 pi i k n / size); both arrays hold 2 size numbers and differ. */
  inverse(complexIn: Float64Array, out: Float64Array): void;
}

/** True for 1, 2, 4, 8 ... up to 2^30. */
export function isPowerOfTwo(n: number): boolean {
  return Number.isInteger(n) && n >= 1 && n <= 0x40000000 && (n & (n - 1)) === 0;
}

/** The smallest power of two that is at least n (n from 0 to 2^30; at least 1). */
export function nextPowerOfTwo(n: number): number {
  if (!(n <= 0x40000000)) throw new Error(`no power of two up to 2^30 reaches ${n}`);
  let size = 1;
  while (size < n) size *= 2;
  return size;
}

/** cos, -sin of pi i / size for even i, interleaved: the layout fft.js expects. */
function twiddles(size: number): Float64Array {
  const table = new Float64Array(2 * size);
  for (let i = 0; i < table.length; i += 2) {
    const angle = (Math.PI * i) / size;
    table[i] = cos(angle);
    table[i + 1] = -sin(angle);
  }
  return table;
}

function checkLengths(input: Float64Array, wanted: number, out: Float64Array, size: number): void {
  if (input.length !== wanted || out.length !== 2 * size)
    throw new Error(
      `transform of size ${size} takes ${wanted} numbers into ${2 * size}, not ${input.length} into ${out.length}`,
    );
}

/**
 * Plans a transform of `size` points, a power of two of at least 2 (radix 4, Cooley & Tukey 1965,
 * by fft.js). Its trigonometric table is replaced by one made from elementary.ts, so that the
 * digits are the same in every engine. Calls allocate nothing.
 * Throws where the size is no power of two or an array has the wrong length.
 */
export function createFft(size: number): Fft {
  if (!isPowerOfTwo(size) || size < 2)
    throw new Error(`transform size must be a power of two from 2 on, not ${size}`);
  const plan = new FFT(size);
  plan.table = twiddles(size);
  return {
    size,
    forward(complexIn, out) {
      checkLengths(complexIn, 2 * size, out, size);
      plan.transform(out, complexIn);
    },
    forwardReal(realIn, out) {
      checkLengths(realIn, size, out, size);
      plan.realTransform(out, realIn);
      plan.completeSpectrum(out);
    },
    inverse(complexIn, out) {
      checkLengths(complexIn, 2 * size, out, size);
      plan.inverseTransform(out, complexIn);
    },
  };
}

const shared = new Map<number, Fft>();
const LARGEST_SHARED = 262_144;

/** The plan for a size, made once and kept (up to 262 144 points; larger ones are made anew). */
export function sharedFft(size: number): Fft {
  const known = shared.get(size);
  if (known) return known;
  const fft = createFft(size);
  if (size <= LARGEST_SHARED) shared.set(size, fft);
  return fft;
}
