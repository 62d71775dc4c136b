import { cos, sin } from './elementary';
import { nextPowerOfTwo, sharedFft } from './fft';
import { eigenvectorOf, largestEigenvalues, type Tridiagonal } from './tridiagonal';

/** Discrete prolate spheroidal sequences of one length and bandwidth, the best concentrated first. */
export interface Dpss {
  /** Each of unit energy; even ones with a positive sum, odd ones with a positive sum of (n - 1 - 2 i) v[i]. */
  readonly tapers: readonly Float64Array[];
  /** Share of each taper's energy within the half bandwidth, 0 to 1. */
  readonly concentrations: Float64Array;
}

/** The matrix that has the sequences as eigenvectors and well-spaced eigenvalues (Slepian 1978). */
function commutingMatrix(length: number, halfBandwidthBins: number): Tridiagonal {
  const inside = cos((2 * Math.PI * halfBandwidthBins) / length);
  const main = Float64Array.from({ length }, (_, i) => ((length - 1 - 2 * i) / 2) ** 2 * inside);
  const beside = Float64Array.from(
    { length: length - 1 },
    (_, i) => ((i + 1) * (length - 1 - i)) / 2,
  );
  return { main, beside };
}

/** Sum of x[i] x[i + lag] for every lag from 0 to below the length. */
function autocorrelation(x: Float64Array): Float64Array {
  const fft = sharedFft(nextPowerOfTwo(2 * x.length));
  const packed = new Float64Array(2 * fft.size);
  for (let i = 0; i < x.length; i++) packed[2 * i] = x[i];
  const spectrum = new Float64Array(2 * fft.size);
  fft.forward(packed, spectrum);
  for (let i = 0; i < spectrum.length; i += 2) {
    packed[i] = spectrum[i] * spectrum[i] + spectrum[i + 1] * spectrum[i + 1];
    packed[i + 1] = 0;
  }
  fft.inverse(packed, spectrum);
  return Float64Array.from(x, (_, lag) => spectrum[2 * lag]);
}

/** Energy of a taper of unit energy within the half bandwidth, from its autocorrelation. */
function concentrationOf(taper: Float64Array, halfBandwidthBins: number): number {
  const width = (2 * halfBandwidthBins) / taper.length;
  const r = autocorrelation(taper);
  let share = width * r[0];
  for (let lag = 1; lag < r.length; lag++)
    share += (2 * r[lag] * sin(Math.PI * width * lag)) / (Math.PI * lag);
  return share;
}

/** Turns a taper to the sign that Percival & Walden 1993 give it. */
function signed(taper: Float64Array, order: number): Float64Array {
  const centre = (taper.length - 1) / 2;
  let side = 0;
  for (let i = 0; i < taper.length; i++)
    side += order % 2 === 0 ? taper[i] : (centre - i) * taper[i];
  return side < 0 ? taper.map((value) => -value) : taper;
}

/**
 * The first `count` discrete prolate spheroidal sequences (Slepian 1978), by the tridiagonal method
 * (Percival & Walden 1993, chapter 8): length samples, half bandwidth in bins of rate / length (the
 * product NW, above 0 and below length / 2). Good tapers are the first 2 NW - 1; O(length) each.
 * Throws where the numbers do not fit.
 */
export function dpss(length: number, halfBandwidthBins: number, count: number): Dpss {
  if (!Number.isInteger(length) || length < 2)
    throw new Error(`a taper has two samples or more, not ${length}`);
  if (!(halfBandwidthBins > 0 && halfBandwidthBins < length / 2))
    throw new Error(`half a bandwidth of ${halfBandwidthBins} bins does not fit ${length} samples`);
  const matrix = commutingMatrix(length, halfBandwidthBins);
  const tapers = Array.from(largestEigenvalues(matrix, count), (eigenvalue, order) =>
    signed(eigenvectorOf(matrix, eigenvalue), order),
  );
  const concentrations = Float64Array.from(tapers, (taper) =>
    concentrationOf(taper, halfBandwidthBins),
  );
  return { tapers, concentrations };
}
