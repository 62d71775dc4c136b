import { cos, sin } from './elementary';
import { isPowerOfTwo, nextPowerOfTwo, sharedFft } from './fft';

/**
 * The discrete Fourier transform of any number of complex values, interleaved re, im:
 * X[k] = sum x[n] e^(-2 pi i k n / size). Powers of two go straight through; other sizes by the
 * chirp transform (Bluestein 1970).
 */
export function dft(complexIn: Float64Array): Float64Array {
  const size = complexIn.length / 2;
  if (!Number.isInteger(size) || size < 1)
    throw new Error(`interleaved complex values come in pairs, not ${complexIn.length} numbers`);
  if (size === 1) return complexIn.slice();
  if (isPowerOfTwo(size)) {
    const out = new Float64Array(2 * size);
    sharedFft(size).forward(complexIn, out);
    return out;
  }
  return chirpTransform(complexIn, size);
}

/** x[n] = (1/size) sum X[k] e^(2 pi i k n / size), any size. */
export function inverseDft(complexIn: Float64Array): Float64Array {
  const size = complexIn.length / 2;
  const out = dft(exchanged(complexIn));
  for (let i = 0; i < out.length; i++) out[i] /= size;
  return exchanged(out);
}

/** re and im exchanged: turns a forward transform into an inverse one. */
function exchanged(complex: Float64Array): Float64Array {
  const out = new Float64Array(complex.length);
  for (let i = 0; i < out.length; i += 2) {
    out[i] = complex[i + 1];
    out[i + 1] = complex[i];
  }
  return out;
}

/** e^(-i pi n^2 / size); n^2 is taken modulo 2 size so that the angle stays small. */
function chirp(size: number): Float64Array {
  const table = new Float64Array(2 * size);
  for (let n = 0; n < size; n++) {
    const angle = (Math.PI * ((n * n) % (2 * size))) / size;
    table[2 * n] = cos(angle);
    table[2 * n + 1] = -sin(angle);
  }
  return table;
}

function multiplyInto(target: Float64Array, factor: Float64Array): void {
  for (let i = 0; i < factor.length; i += 2) {
    const re = target[i] * factor[i] - target[i + 1] * factor[i + 1];
    target[i + 1] = target[i] * factor[i + 1] + target[i + 1] * factor[i];
    target[i] = re;
  }
}

function chirpTransform(complexIn: Float64Array, size: number): Float64Array {
  const table = chirp(size);
  const fft = sharedFft(nextPowerOfTwo(2 * size - 1));
  const a = new Float64Array(2 * fft.size);
  a.set(complexIn);
  multiplyInto(a, table);
  const b = new Float64Array(2 * fft.size);
  for (let n = 0; n < size; n++) {
    for (const at of n === 0 ? [0] : [n, fft.size - n]) {
      b[2 * at] = table[2 * n];
      b[2 * at + 1] = -table[2 * n + 1];
    }
  }
  const spectrumA = new Float64Array(2 * fft.size);
  const spectrumB = new Float64Array(2 * fft.size);
  fft.forward(a, spectrumA);
  fft.forward(b, spectrumB);
  multiplyInto(spectrumA, spectrumB);
  fft.inverse(spectrumA, a);
  const out = a.slice(0, 2 * size);
  multiplyInto(out, table);
  return out;
}
