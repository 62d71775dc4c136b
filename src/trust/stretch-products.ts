import { cos } from '../numeric/elementary';
import { nextPowerOfTwo, sharedFft } from '../numeric/fft';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';

/**
 * What a linear route's score on one stretch needs of the stretch: by group of neighbouring bins, the power of the lead and
 * its product with the known target. The route itself comes in as a response at the groups' frequencies.
 */
export interface StretchProducts {
  /** Centre of each group's power, ascending. */
  readonly freqsHz: Float64Array;
  /** sum |X|^2 of the lead. */
  readonly power: Float64Array;
  /** sum conj(S) X of target and lead. */
  readonly crossRe: Float64Array;
  readonly crossIm: Float64Array;
  /** sum |S|^2 of the target over all groups. */
  readonly targetPower: number;
}

/** Length of the ramps by which a stretch begins and ends: what a derivative's memory of a minute feels of its ends. */
const RAMP_S: Seconds = 60;
/** Bins stay single up to here, where a wave is told by its phase over minutes. */
const SINGLE_TO_HZ = 0.2;
/** Groups are this share of their frequency wide, and no wider than this. */
const SHARE = 0.02;
const WIDEST_HZ = 0.2;

/** Weights of a stretch: cosine ramps (Tukey 1967) of a minute, a quarter of the stretch at most, at both ends. */
function stretchTaper(length: number, rateHz: Hertz): Float64Array {
  const ramp = Math.min(Math.round(RAMP_S * rateHz), Math.floor(length / 4));
  const taper = new Float64Array(length).fill(1);
  for (let i = 0; i < ramp; i += 1) {
    const weight = 0.5 - 0.5 * cos((Math.PI * (i + 0.5)) / ramp);
    taper[i] = weight;
    taper[length - 1 - i] = weight;
  }
  return taper;
}

/** A signal less its mean, both weighted. */
function weighted(signal: Float64Array, taper: Float64Array): Float64Array {
  let [sum, weights] = [0, 0];
  for (let i = 0; i < signal.length; i += 1) {
    sum += taper[i] * signal[i];
    weights += taper[i];
  }
  const level = weights > 0 ? sum / weights : 0;
  return signal.map((value, i) => taper[i] * (value - level));
}

const widthAt = (hz: Hertz): Hertz => (hz < SINGLE_TO_HZ ? 0 : Math.min(WIDEST_HZ, SHARE * hz));

/** First bin of each group, and the bin after the last: single bins, then runs that widen with frequency. */
function groupEdges(binHz: Hertz, bins: number): readonly number[] {
  const edges = [1];
  for (let from = 1; from < bins; ) {
    from = Math.min(bins, from + Math.max(1, Math.round(widthAt(from * binHz) / binHz)));
    edges.push(from);
  }
  return edges;
}

/**
 * Products of a known target and a lead that holds it, as long as each other and without holes, at one rate. One transform
 * does both (real and imaginary part). Frequencies from above 0 to half the rate; a constant counts as neither.
 * Throws where the lengths differ.
 */
export function stretchProducts(
  target: Float64Array,
  lead: Float64Array,
  rateHz: Hertz,
): StretchProducts {
  if (target.length !== lead.length)
    throw new Error(`${target.length} samples of a target, ${lead.length} of its lead`);
  const taper = stretchTaper(lead.length, rateHz);
  const fft = sharedFft(nextPowerOfTwo(Math.max(2, lead.length)));
  const packed = new Float64Array(2 * fft.size);
  const [x, s] = [weighted(lead, taper), weighted(target, taper)];
  for (let i = 0; i < x.length; i += 1) {
    packed[2 * i] = x[i];
    packed[2 * i + 1] = s[i];
  }
  const z = new Float64Array(2 * fft.size);
  fft.forward(packed, z);
  return grouped(z, rateHz / fft.size, fft.size);
}

/** Groups from the spectrum of lead + i target: X[k] = (Z[k] + conj Z[-k]) / 2, S[k] = (Z[k] - conj Z[-k]) / 2i. */
function grouped(z: Float64Array, binHz: Hertz, size: number): StretchProducts {
  const edges = groupEdges(binHz, size / 2);
  const count = edges.length - 1;
  const freqsHz = new Float64Array(count);
  const power = new Float64Array(count);
  const crossRe = new Float64Array(count);
  const crossIm = new Float64Array(count);
  let targetPower = 0;
  for (let g = 0; g < count; g += 1) {
    let centre = 0;
    for (let k = edges[g]; k < edges[g + 1]; k += 1) {
      const [aRe, aIm] = [z[2 * k], z[2 * k + 1]];
      const [bRe, bIm] = [z[2 * (size - k)], -z[2 * (size - k) + 1]];
      const [xRe, xIm] = [(aRe + bRe) / 2, (aIm + bIm) / 2];
      const [sRe, sIm] = [(aIm - bIm) / 2, (bRe - aRe) / 2];
      const xx = xRe * xRe + xIm * xIm;
      power[g] += xx;
      centre += xx * k;
      crossRe[g] += sRe * xRe + sIm * xIm;
      crossIm[g] += sRe * xIm - sIm * xRe;
      targetPower += sRe * sRe + sIm * sIm;
    }
    freqsHz[g] = binHz * (power[g] > 0 ? centre / power[g] : (edges[g] + edges[g + 1] - 1) / 2);
  }
  return { freqsHz, power, crossRe, crossIm, targetPower };
}
