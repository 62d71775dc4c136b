import { cos } from './elementary';

/**
 * Frequency response of symmetric taps about their middle, which is real: one value a frequency from 0 to half the rate.
 * By Clenshaw's recurrence (1955), four frequencies at a time, each with one multiplication a tap; rounding grows with
 * the square of the length, to about 1e-10 of the taps' sum at 2000 taps. Throws where the taps are even in number.
 */
export function symmetricResponses(
  taps: Float64Array,
  rateHz: number,
  freqsHz: Float64Array,
): Float64Array {
  if (taps.length % 2 !== 1) throw new Error(`taps must be odd in number, not ${taps.length}`);
  const out = new Float64Array(freqsHz.length);
  const turn = (k: number) =>
    2 * cos((2 * Math.PI * (k < freqsHz.length ? freqsHz[k] : 0)) / rateHz);
  for (let k = 0; k < out.length; k += 4) {
    const four = clenshaw(taps, turn(k), turn(k + 1), turn(k + 2), turn(k + 3));
    for (let i = 0; i < 4 && k + i < out.length; i += 1) out[k + i] = four[i];
  }
  return out;
}

/** w[0] + 2 sum w[j] cos(j angle) for four angles, each given as twice its cosine. */
function clenshaw(
  taps: Float64Array,
  a: number,
  b: number,
  c: number,
  d: number,
): readonly [number, number, number, number] {
  const half = (taps.length - 1) / 2;
  let [a1, a2, b1, b2, c1, c2, d1, d2] = [0, 0, 0, 0, 0, 0, 0, 0];
  for (let j = half; j >= 1; j -= 1) {
    const w = taps[half + j];
    const an = w + a * a1 - a2;
    const bn = w + b * b1 - b2;
    const cn = w + c * c1 - c2;
    const dn = w + d * d1 - d2;
    a2 = a1;
    b2 = b1;
    c2 = c1;
    d2 = d1;
    a1 = an;
    b1 = bn;
    c1 = cn;
    d1 = dn;
  }
  const w = taps[half];
  return [w + a * a1 - 2 * a2, w + b * b1 - 2 * b2, w + c * c1 - 2 * c2, w + d * d1 - 2 * d2];
}
