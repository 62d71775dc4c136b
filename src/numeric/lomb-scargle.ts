import { atan2, cos, sin } from './elementary';
import { mean } from './statistics';

/** Angles are computed anew after so many steps of rotation. */
const RESYNC = 32;

/** Sums over the samples at one frequency: values with cosine and sine, and their products. */
interface Sums {
  xc: number;
  xs: number;
  cc: number;
  cs: number;
}

/** The step of an evenly spaced grid, or NaN where it is not even. */
function evenStep(freqsHz: Float64Array): number {
  if (freqsHz.length < 3) return Number.NaN;
  const last = freqsHz.length - 1;
  const step = (freqsHz[last] - freqsHz[0]) / last;
  const slack = 1e-12 * Math.max(Math.abs(freqsHz[0]), Math.abs(freqsHz[last]));
  for (let k = 1; k < last; k++)
    if (Math.abs(freqsHz[k] - freqsHz[0] - k * step) > slack) return Number.NaN;
  return step;
}

/** Scargle's periodogram |X|^2 / n from the sums (Scargle 1982; Townsend 2010 without tan). */
function periodogram({ xc, xs, cc, cs }: Sums, n: number): number {
  const ss = n - cc;
  const tau = 0.5 * atan2(2 * cs, cc - ss);
  const c = cos(tau);
  const s = sin(tau);
  const cosPower = c * c * cc + 2 * c * s * cs + s * s * ss;
  const sinPower = c * c * ss - 2 * c * s * cs + s * s * cc;
  const along = c * xc + s * xs;
  const across = c * xs - s * xc;
  const small = 1e-12 * n;
  const fromCos = cosPower > small ? (along * along) / cosPower : 0;
  const fromSin = sinPower > small ? (across * across) / sinPower : 0;
  return 0.5 * (fromCos + fromSin);
}

/**
 * Lomb-Scargle spectrum (Lomb 1976; Scargle 1982) of values at ascending times, their mean taken
 * off, as a one-sided density in units^2/Hz at freqsHz (above 0; 0 gives 0).
 * Scale: 2 T / n times Scargle's periodogram (scipy's lombscargle, not normalised), with
 * T = n / (n - 1) times the time from first to last. At equal spacing that is the one-sided
 * periodogram with a rectangular window, whose integral from 0 to half the rate is the variance
 * (with n); a sine of amplitude A integrates to A^2 / 2 across its line whatever the spacing.
 * Quickest for evenly spaced frequencies. Throws for fewer than two values or unequal lengths.
 */
export function lombScargle(
  timesS: Float64Array,
  values: Float64Array,
  freqsHz: Float64Array,
): Float64Array {
  const n = timesS.length;
  if (n !== values.length || n < 2)
    throw new Error(`a spectrum needs two values or more: ${n} times, ${values.length} values`);
  const level = mean(values);
  const centred = values.map((value) => value - level);
  const middle = (timesS[0] + timesS[n - 1]) / 2;
  const times = timesS.map((time) => time - middle);
  const scale = (2 * (timesS[n - 1] - timesS[0])) / (n - 1);
  const density = new Float64Array(freqsHz.length);
  const rotation = createRotation(times, evenStep(freqsHz));
  for (let k = 0; k < density.length; k++) {
    if (freqsHz[k] === 0) rotation.skip();
    else density[k] = scale * periodogram(rotation.sumsAt(freqsHz[k], centred), n);
  }
  return density;
}

/** Cosine and sine of every time's angle, turned from one frequency to the next. */
function createRotation(
  times: Float64Array,
  stepHz: number,
): { sumsAt: (freqHz: number, values: Float64Array) => Sums; skip: () => void } {
  const n = times.length;
  const c = new Float64Array(n);
  const s = new Float64Array(n);
  const stepCos = new Float64Array(n);
  const stepSin = new Float64Array(n);
  const even = !Number.isNaN(stepHz);
  let untilAnew = 0;
  for (let i = 0; even && i < n; i++) {
    stepCos[i] = cos(2 * Math.PI * stepHz * times[i]);
    stepSin[i] = sin(2 * Math.PI * stepHz * times[i]);
  }
  function anew(freqHz: number): void {
    for (let i = 0; i < n; i++) {
      const angle = 2 * Math.PI * freqHz * times[i];
      c[i] = cos(angle);
      s[i] = sin(angle);
    }
    untilAnew = even ? RESYNC : 1;
  }
  return {
    skip: () => {
      untilAnew = 0;
    },
    sumsAt: (freqHz, values) => {
      if (untilAnew === 0) anew(freqHz);
      untilAnew -= 1;
      let xc = 0;
      let xs = 0;
      let cc = 0;
      let cs = 0;
      for (let i = 0; i < n; i++) {
        const ci = c[i];
        const si = s[i];
        xc += values[i] * ci;
        xs += values[i] * si;
        cc += ci * ci;
        cs += ci * si;
        c[i] = ci * stepCos[i] - si * stepSin[i];
        s[i] = si * stepCos[i] + ci * stepSin[i];
      }
      return { xc, xs, cc, cs };
    },
  };
}
