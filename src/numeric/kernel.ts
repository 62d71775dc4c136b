import { cos, sin } from './elementary';
import { nextPowerOfTwo, sharedFft } from './fft';

/** One value of a frequency response. */
export interface Response {
  readonly re: number;
  readonly im: number;
}

/**
 * A linear filter of finite length: y[n] = sum taps[j] x[n - (j - origin)]. Origin 0 is causal,
 * (length - 1) / 2 with symmetric taps is zero-phase.
 */
export interface Kernel {
  readonly taps: Float64Array;
  readonly origin: number;
}

/** Odd-length taps about their centre. Throws where their number is even. */
export function centredKernel(taps: Float64Array): Kernel {
  if (taps.length % 2 !== 1) throw new Error(`taps must be odd in number, not ${taps.length}`);
  return { taps, origin: (taps.length - 1) / 2 };
}

/** The one kernel that does what `first` and then `second` do. */
export function cascadeKernels(first: Kernel, second: Kernel): Kernel {
  const length = first.taps.length + second.taps.length - 1;
  const fft = sharedFft(nextPowerOfTwo(Math.max(2, length)));
  const packed = new Float64Array(2 * fft.size);
  for (let i = 0; i < first.taps.length; i++) packed[2 * i] = first.taps[i];
  const a = new Float64Array(2 * fft.size);
  fft.forward(packed, a);
  packed.fill(0);
  for (let i = 0; i < second.taps.length; i++) packed[2 * i] = second.taps[i];
  const b = new Float64Array(2 * fft.size);
  fft.forward(packed, b);
  for (let i = 0; i < a.length; i += 2) {
    packed[i] = a[i] * b[i] - a[i + 1] * b[i + 1];
    packed[i + 1] = a[i] * b[i + 1] + a[i + 1] * b[i];
  }
  fft.inverse(packed, a);
  const taps = new Float64Array(length);
  for (let i = 0; i < length; i++) taps[i] = a[2 * i];
  return { taps, origin: first.origin + second.origin };
}

/** Frequency response of a kernel about its origin: sum taps[j] e^(-2 pi i f (j - origin) / rate). */
export function kernelResponse(kernel: Kernel, freqHz: number, rateHz: number): Response {
  const step = (2 * Math.PI * freqHz) / rateHz;
  let re = 0;
  let im = 0;
  for (let j = 0; j < kernel.taps.length; j++) {
    const angle = step * (j - kernel.origin);
    re += kernel.taps[j] * cos(angle);
    im -= kernel.taps[j] * sin(angle);
  }
  return { re, im };
}
