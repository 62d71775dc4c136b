import { cos, sin } from '../numeric/elementary';
import { type Cpm, cpmToHz, type Hertz } from '../units/rate';

/** cos and sin of k steps of an angle, turned on from one to the next. */
function wavesOf(step: number, count: number): readonly [Float64Array, Float64Array] {
  const [turnRe, turnIm] = [cos(step), sin(step)];
  const [re, im] = [new Float64Array(count), new Float64Array(count)];
  let [a, b] = [1, 0];
  for (let k = 0; k < count; k++) {
    re[k] = a;
    im[k] = b;
    const next = a * turnRe - b * turnIm;
    b = b * turnRe + a * turnIm;
    a = next;
  }
  return [re, im];
}

/** Part of a wave's energy below which what is left of it by the waves before is rounding. */
const NOTHING_NEW = 1e-9;

/**
 * x less its best fit by lines at the frequencies given (0 for a constant), by least squares under
 * the weights, wave after wave (Gram-Schmidt). A sample of weight 0 has no say and stays as it is.
 */
export function withoutLines(
  x: Float64Array,
  weights: Float64Array,
  frequenciesCpm: readonly Cpm[],
  rateHz: Hertz,
): Float64Array {
  const rest = Float64Array.from(x);
  const made: Float64Array[] = [];
  const product = (a: Float64Array, b: Float64Array) => {
    let sum = 0;
    for (let i = 0; i < a.length; i++) sum += weights[i] * a[i] * b[i];
    return sum;
  };
  const takeOff = (from: Float64Array, wave: Float64Array) => {
    const share = product(from, wave);
    for (let i = 0; i < from.length; i++) if (weights[i] > 0) from[i] -= share * wave[i];
  };
  for (const cpm of frequenciesCpm) {
    const step = (2 * Math.PI * cpmToHz(cpm)) / rateHz;
    for (const wave of wavesOf(step, x.length)) {
      const before = product(wave, wave);
      for (const earlier of made) takeOff(wave, earlier);
      const energy = product(wave, wave);
      if (!(energy > NOTHING_NEW * before)) continue;
      const norm = 1 / Math.sqrt(energy);
      for (let i = 0; i < wave.length; i++) wave[i] *= norm;
      made.push(wave);
      takeOff(rest, wave);
    }
  }
  return rest;
}
