import { cos, exp, log, pow, sin } from './elementary';
import { grunwaldLetnikovWeights } from './grunwald-letnikov';

/** A frequency response at many frequencies: one value a frequency. */
export interface Responses {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** From this angle times memory on, what the memory drops is summed by parts; below, lump by lump. */
const FAR = 30;
const TERMS = 8;
/** Samples of a lump turn by at most FAR / LUMPS radians, so that its first three moments say all of it. */
const LUMPS = 1000;

/** What a frequency brings to the responses of all orders. */
interface Turn {
  readonly angle: number;
  /** Logarithm of |1 - z| and angle of 1 - z, z = e^(-i angle). */
  readonly logChord: number;
  readonly phase: number;
  /** z^(past + 1) / (1 - z) and z / (1 - z). */
  readonly lastRe: number;
  readonly lastIm: number;
  readonly stepRe: number;
  readonly stepIm: number;
}

function turnOf(angle: number, past: number): Turn {
  const chord = 2 * sin(angle / 2);
  const phase = Math.PI / 2 - angle / 2;
  const at = (turn: number) => ({ re: cos(turn) / chord, im: sin(turn) / chord });
  const last = at(-(past + 1) * angle - phase);
  const step = at(-angle - phase);
  return {
    angle,
    logChord: log(chord),
    phase,
    lastRe: last.re,
    lastIm: last.im,
    stepRe: step.re,
    stepIm: step.im,
  };
}

/** Sums of the weights of equal runs of lags, with their first and second moments about the middle of each. */
function lumpsOf(weights: Float64Array, width: number): Float64Array {
  const moments = new Float64Array(3 * Math.ceil(weights.length / width));
  for (let k = 0; k < weights.length; k += 1) {
    const lump = Math.floor(k / width);
    const off = k - lump * width - (width - 1) / 2;
    moments[3 * lump] += weights[k];
    moments[3 * lump + 1] += weights[k] * off;
    moments[3 * lump + 2] += (weights[k] * off * off) / 2;
  }
  return moments;
}

/** One order at work: its weights, the next one beyond the memory, and its lumps. */
interface Order {
  readonly order: number;
  readonly weights: Float64Array;
  readonly next: number;
  readonly width: number;
  readonly moments: Float64Array;
}

function orderOf(order: number, past: number): Order {
  const weights = grunwaldLetnikovWeights(order, past + 1);
  const width = Math.max(1, Math.floor(past / LUMPS));
  return {
    order,
    weights,
    next: weights[past] * (1 - (order + 1) / (past + 1)),
    width,
    moments: lumpsOf(weights, width),
  };
}

type Put = (re: number, im: number) => void;

/**
 * sum w[k] z^k up to the memory as the unlimited (1 - z)^order less what lies beyond. Beyond n it is summed by parts:
 * differences of weights are weights of the next order, so that each term is the one before times
 * -(order + j + 1) / (n + j + 1) z / (1 - z); they fall off while n angle is above the order.
 */
function byParts({ order, weights, next }: Order, turn: Turn, put: Put): void {
  const gain = exp(order * turn.logChord);
  let re = gain * cos(order * turn.phase);
  let im = gain * sin(order * turn.phase);
  let [termRe, termIm] = [next * turn.lastRe, next * turn.lastIm];
  for (let j = 0; j < TERMS; j += 1) {
    re -= termRe;
    im -= termIm;
    const factor = -(order + j + 1) / (weights.length + j + 1);
    const was = termRe;
    termRe = factor * (was * turn.stepRe - termIm * turn.stepIm);
    termIm = factor * (was * turn.stepIm + termIm * turn.stepRe);
  }
  put(re, im);
}

/** sum w[k] z^k: the first lump's lags, which nearly cancel, one by one, the others from their moments. */
function byLumps({ weights, width, moments }: Order, angle: number, put: Put): void {
  let [re, im] = [0, 0];
  for (let k = 0; k < Math.min(width, weights.length); k += 1) {
    re += weights[k] * cos(k * angle);
    im -= weights[k] * sin(k * angle);
  }
  const [turnRe, turnIm] = [cos(width * angle), -sin(width * angle)];
  const middle = (width + (width - 1) / 2) * angle;
  let [atRe, atIm] = [cos(middle), -sin(middle)];
  for (let m = 3; m < moments.length; m += 3) {
    const even = moments[m] - angle * angle * moments[m + 2];
    const odd = -angle * moments[m + 1];
    re += atRe * even - atIm * odd;
    im += atRe * odd + atIm * even;
    const was = atRe;
    atRe = was * turnRe - atIm * turnIm;
    atIm = was * turnIm + atIm * turnRe;
  }
  put(re, im);
}

/**
 * Frequency responses of Gruenwald-Letnikov derivatives (Podlubny 1999) by order, 0 to 1, with steps of stepS seconds and a
 * memory of `memorySamples` past samples, as grunwaldLetnikovResponse gives one by one, to 2e-6 of their size: the closed
 * form of the unlimited memory less what the limit drops. Frequencies from 0 to half of 1 / stepS.
 */
export function grunwaldLetnikovResponses(
  stepS: number,
  memorySamples: number,
  freqsHz: Float64Array,
): (order: number) => Responses {
  const past = Math.floor(memorySamples);
  const angles = freqsHz.map((hz) => 2 * Math.PI * hz * stepS);
  const turns = Array.from(angles, (angle) => (past * angle < FAR ? null : turnOf(angle, past)));
  return (order) => {
    const one = orderOf(order, past);
    const scale = pow(stepS, -order);
    const re = new Float64Array(freqsHz.length);
    const im = new Float64Array(freqsHz.length);
    turns.forEach((turn, k) => {
      const put: Put = (a, b) => {
        re[k] = scale * a;
        im[k] = scale * b;
      };
      if (turn) byParts(one, turn, put);
      else byLumps(one, angles[k], put);
    });
    return { re, im };
  };
}
