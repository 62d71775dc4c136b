import { cos, exp, log, pow, sin } from './elementary';
import { grunwaldLetnikovWeights } from './grunwald-letnikov';

/** A frequency response at many frequencies: one value a frequency. */
export interface Responses {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** From this angle times memory on, what the memory drops is summed by parts; below, lump by lump. */
const FAR = 30;
const TERMS = 10;
/** Samples of a lump turn by at most FAR / LUMPS radians, so that its first three moments say all of it. */
const LUMPS = 1000;

interface Complex {
  readonly re: number;
  readonly im: number;
}

const times = (a: Complex, b: Complex): Complex => ({
  re: a.re * b.re - a.im * b.im,
  im: a.re * b.im + a.im * b.re,
});

/** (1 - e^(-i angle))^order, what an unlimited memory gives; 0 at angle 0 for orders above 0. */
function unlimited(order: number, angle: number): Complex {
  const chord = 2 * sin(angle / 2);
  if (chord === 0) return { re: order === 0 ? 1 : 0, im: 0 };
  const gain = exp(order * log(chord));
  const phase = order * (Math.PI / 2 - angle / 2);
  return { re: gain * cos(phase), im: gain * sin(phase) };
}

/**
 * Sum of w[k] z^k from k = n on, z = e^(-i angle), by parts: differences of weights are weights of the next order, so
 * each term is the one before times -(order + j + 1) / (n + j + 1) z / (1 - z). Falls off while n angle is above the order.
 */
function beyond(order: number, n: number, weight: number, angle: number): Complex {
  const z = { re: cos(angle), im: -sin(angle) };
  const norm = (1 - z.re) ** 2 + z.im ** 2;
  const inverse = { re: (1 - z.re) / norm, im: z.im / norm };
  const step = times(z, inverse);
  const start = times({ re: weight * cos(n * angle), im: -weight * sin(n * angle) }, inverse);
  let [term, re, im] = [start, 0, 0];
  for (let j = 0; j < TERMS; j += 1) {
    re += term.re;
    im += term.im;
    const factor = -(order + j + 1) / (n + j + 1);
    const next = times(term, step);
    term = { re: factor * next.re, im: factor * next.im };
  }
  return { re, im };
}

/** Sums of the weights of equal runs of lags, with their first and second moments about the middle of each. */
function lumpsOf(weights: Float64Array, width: number) {
  const count = Math.ceil(weights.length / width);
  const moments = new Float64Array(3 * count);
  for (let k = 0; k < weights.length; k += 1) {
    const lump = Math.floor(k / width);
    const off = k - lump * width - (width - 1) / 2;
    moments[3 * lump] += weights[k];
    moments[3 * lump + 1] += weights[k] * off;
    moments[3 * lump + 2] += (weights[k] * off * off) / 2;
  }
  return { count, moments };
}

/** sum w[k] e^(-i k angle): the first lump's lags, which nearly cancel, one by one, the others from their moments. */
function lumpSum(
  weights: Float64Array,
  { count, moments }: ReturnType<typeof lumpsOf>,
  width: number,
  angle: number,
): Complex {
  let [re, im] = [0, 0];
  for (let k = 0; k < Math.min(width, weights.length); k += 1) {
    re += weights[k] * cos(k * angle);
    im -= weights[k] * sin(k * angle);
  }
  const turn = { re: cos(width * angle), im: -sin(width * angle) };
  const middle = (width + (width - 1) / 2) * angle;
  let at: Complex = { re: cos(middle), im: -sin(middle) };
  for (let lump = 1; lump < count; lump += 1) {
    const even = moments[3 * lump] - angle * angle * moments[3 * lump + 2];
    const odd = -angle * moments[3 * lump + 1];
    re += at.re * even - at.im * odd;
    im += at.re * odd + at.im * even;
    at = times(at, turn);
  }
  return { re, im };
}

/**
 * Frequency responses of a Gruenwald-Letnikov derivative (Podlubny 1999) of order 0 to 1 with steps of stepS seconds and a
 * memory of `memorySamples` past samples, as grunwaldLetnikovResponse gives one by one, to 1e-6 of its size: the closed
 * form of the unlimited memory less what the limit drops. Frequencies from 0 to half of 1 / stepS.
 */
export function grunwaldLetnikovResponses(
  order: number,
  stepS: number,
  memorySamples: number,
  freqsHz: Float64Array,
): Responses {
  const past = Math.floor(memorySamples);
  const weights = grunwaldLetnikovWeights(order, past + 1);
  const next = weights[past] * (1 - (order + 1) / (past + 1));
  const width = Math.max(1, Math.floor(past / LUMPS));
  const lumps = lumpsOf(weights, width);
  const scale = pow(stepS, -order);
  const re = new Float64Array(freqsHz.length);
  const im = new Float64Array(freqsHz.length);
  freqsHz.forEach((hz, k) => {
    const angle = 2 * Math.PI * hz * stepS;
    let one: Complex;
    if (past * angle < FAR) one = lumpSum(weights, lumps, width, angle);
    else {
      const dropped = beyond(order, past + 1, next, angle);
      const whole = unlimited(order, angle);
      one = { re: whole.re - dropped.re, im: whole.im - dropped.im };
    }
    re[k] = scale * one.re;
    im[k] = scale * one.im;
  });
  return { re, im };
}
