import { cos, log10, pow, sinc } from './elementary';
import { besselI0 } from './special';

/** Periodic Hann taper of n points (n >= 1), for spectra: 0.5 - 0.5 cos(2 pi i / n) (Harris 1978). */
export function hannPeriodic(n: number): Float64Array {
  const taper = new Float64Array(n);
  for (let i = 0; i < n; i++) taper[i] = 0.5 - 0.5 * cos((2 * Math.PI * i) / n);
  return taper;
}

/** Symmetric Kaiser window of n points with shape beta >= 0; the centre is 1 (Kaiser 1974). */
export function kaiser(n: number, beta: number): Float64Array {
  const window = new Float64Array(n).fill(1);
  if (n < 2) return window;
  const centre = (n - 1) / 2;
  for (let i = 0; i < n; i++) window[i] = kaiserAt((i - centre) / centre, beta);
  return window;
}

/** Kaiser window at u in -1..1 (0 the centre, where it is 1); 0 outside. */
export function kaiserAt(u: number, beta: number): number {
  const rest = 1 - u * u;
  return rest < 0 ? 0 : besselI0(beta * Math.sqrt(rest)) / besselI0(beta);
}

/** Kaiser's beta for a stop-band attenuation in dB (Kaiser 1974; Oppenheim & Schafer). */
export function kaiserBeta(attenuationDb: number): number {
  if (attenuationDb > 50) return 0.1102 * (attenuationDb - 8.7);
  if (attenuationDb <= 21) return 0;
  const over = attenuationDb - 21;
  return 0.5842 * pow(over, 0.4) + 0.07886 * over;
}

/**
 * Odd number of taps a Kaiser windowed-sinc filter needs (Kaiser 1974) for a stop-band attenuation
 * in dB (at least 8) and a transition of `transitionHz` at the rate `rateHz`.
 * Throws outside those ranges.
 */
export function kaiserTaps(attenuationDb: number, transitionHz: number, rateHz: number): number {
  if (!(attenuationDb >= 8)) throw new Error(`attenuation must be 8 dB or more: ${attenuationDb}`);
  if (!(transitionHz > 0) || !(rateHz > 0))
    throw new Error(`transition ${transitionHz} Hz and rate ${rateHz} Hz must be above 0`);
  const width = (2 * Math.PI * transitionHz) / rateHz;
  const taps = Math.ceil((attenuationDb - 7.95) / (2.285 * width) + 1);
  return taps % 2 === 1 ? taps : taps + 1;
}

/** Equivalent noise bandwidth of a taper in bins: n sum w^2 / (sum w)^2 (Harris 1978). */
export function noiseBandwidthBins(taper: Float64Array): number {
  let sum = 0;
  let squares = 0;
  for (let i = 0; i < taper.length; i++) {
    sum += taper[i];
    squares += taper[i] * taper[i];
  }
  return (taper.length * squares) / (sum * sum);
}

/** Correlation of a taper with itself `shift` samples later, 1 at shift 0 (Harris 1978). */
export function overlapCorrelation(taper: Float64Array, shift: number): number {
  let product = 0;
  let squares = 0;
  for (let i = 0; i < taper.length; i++) {
    squares += taper[i] * taper[i];
    if (i + shift < taper.length) product += taper[i] * taper[i + shift];
  }
  return product / squares;
}

/**
 * The number of independent spectra that `count` overlapping ones are worth, for noise
 * (Welch 1967): count / (1 + 2 sum (1 - j/count) rho_j^2), `step` samples from one to the next.
 */
export function effectiveAverages(count: number, taper: Float64Array, step: number): number {
  let excess = 0;
  for (let j = 1; j < count && j * step < taper.length; j++)
    excess += (1 - j / count) * overlapCorrelation(taper, j * step) ** 2;
  return count / (1 + 2 * excess);
}

/**
 * The number of independent looks at a steady wave in noise that `count` overlapping tapered stretches are worth: a mean of
 * values correlated like the tapers, count / (1 + 2 sum (1 - j/count) rho_j). Fewer than for their powers (effectiveAverages).
 */
export function effectiveLooks(count: number, taper: Float64Array, step: number): number {
  let excess = 0;
  for (let j = 1; j < count && j * step < taper.length; j++)
    excess += (1 - j / count) * overlapCorrelation(taper, j * step);
  return count / (1 + 2 * excess);
}

/** Impulse response of an ideal low-pass at time `atS`, seconds from its centre: 2 f sinc(2 f t). */
export function idealLowPass(cutoffHz: number, atS: number): number {
  return 2 * cutoffHz * sinc(2 * cutoffHz * atS);
}

/** 20 log10 of a ratio of amplitudes. */
export function amplitudeDb(ratio: number): number {
  return 20 * log10(Math.abs(ratio));
}
