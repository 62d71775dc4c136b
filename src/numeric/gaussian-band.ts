import { cos, exp } from './elementary';

export interface GaussianBand {
  readonly rateHz: number;
  readonly centreHz: number;
  /** Distance from the centre at which the gain is one half. */
  readonly halfWidthHz: number;
}

/** Standard deviations of the envelope that the taps reach to either side; beyond them it is under 0.04 %. */
const REACH = 4;

/**
 * Standard deviation in seconds of the envelope in time of a band that is Gaussian in frequency (Gabor 1946):
 * sqrt(2 ln 2) / (2 pi halfWidthHz), 22.5 s for 0.5 cpm.
 */
export function gaussianBandSpreadS(halfWidthHz: number): number {
  return Math.sqrt(2 * Math.LN2) / (2 * Math.PI * halfWidthHz);
}

/** Envelope in time, its centre in the middle, its sum 1: 2 n + 1 values that reach four standard deviations. */
export function gaussianEnvelope(rateHz: number, spreadS: number): Float64Array {
  const half = Math.ceil(REACH * spreadS * rateHz);
  const weights = new Float64Array(2 * half + 1);
  let sum = 0;
  for (let i = 0; i < weights.length; i++) {
    const u = (i - half) / (rateHz * spreadS);
    weights[i] = exp(-0.5 * u * u);
    sum += weights[i];
  }
  for (let i = 0; i < weights.length; i++) weights[i] /= sum;
  return weights;
}

/**
 * Taps, symmetric and odd in number, of a zero-phase band-pass whose gain falls off like a Gaussian about centreHz, where it
 * is 1; 0 at 0 Hz. It rings least of all for its width. Throws where the centre is not above 0 and below half the rate.
 */
export function gaussianBandTaps({ rateHz, centreHz, halfWidthHz }: GaussianBand): Float64Array {
  if (!(centreHz > 0 && 2 * centreHz < rateHz && halfWidthHz > 0))
    throw new Error(`no band about ${centreHz} Hz at ${rateHz} Hz`);
  const envelope = gaussianEnvelope(rateHz, gaussianBandSpreadS(halfWidthHz));
  const half = (envelope.length - 1) / 2;
  const wave = envelope.map((_, i) => cos((2 * Math.PI * centreHz * (i - half)) / rateHz));
  let level = 0;
  for (let i = 0; i < wave.length; i++) level += envelope[i] * wave[i];
  let gain = 0;
  const taps = wave.map((value, i) => envelope[i] * (value - level));
  for (let i = 0; i < taps.length; i++) gain += taps[i] * wave[i];
  return taps.map((value) => value / gain);
}
