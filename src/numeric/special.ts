import { exp, log, sin } from './elementary';

/** Modified Bessel function of the first kind and order 0, by its power series; x from 0 to 700. */
export function besselI0(x: number): number {
  const quarter = (x * x) / 4;
  let term = 1;
  let sum = 1;
  for (let k = 1; term > 1e-17 * sum; k++) {
    term *= quarter / (k * k);
    sum += term;
  }
  return sum;
}

/** B(2k) / (2k (2k - 1)) of Stirling's series (Abramowitz & Stegun 1964, 6.1.40). */
const STIRLING = [1 / 12, -1 / 360, 1 / 1260, -1 / 1680, 1 / 1188, -691 / 360360, 1 / 156];
const STIRLING_FROM = 12;

/** Natural logarithm of the gamma function, x > 0. */
export function logGamma(x: number): number {
  if (!(x > 0)) throw new Error(`the logarithm of gamma is given for x above 0, not ${x}`);
  let shifted = x;
  let product = 1;
  while (shifted < STIRLING_FROM) {
    product *= shifted;
    shifted += 1;
  }
  let series = 0;
  const inverse = 1 / shifted;
  for (let k = STIRLING.length - 1; k >= 0; k--) series = series * inverse * inverse + STIRLING[k];
  const stirling =
    (shifted - 0.5) * log(shifted) - shifted + 0.5 * log(2 * Math.PI) + series * inverse;
  return stirling - log(product);
}

/** 1 / gamma(x) for any real x; 0 at 0, -1, -2 ... */
export function reciprocalGamma(x: number): number {
  if (x > 0) return exp(-logGamma(x));
  if (Number.isInteger(x)) return 0;
  return (sin(Math.PI * x) * exp(logGamma(1 - x))) / Math.PI;
}
