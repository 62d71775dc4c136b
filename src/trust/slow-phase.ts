import { hilbertPhase } from '../numeric/analytic-signal';
import { removeLine } from '../numeric/detrend';
import { convolveSame } from '../numeric/fir';
import { gaussianBandSpreadS, gaussianBandTaps, gaussianEnvelope } from '../numeric/gaussian-band';
import { inPieces } from '../numeric/in-pieces';
import { type Cpm, cpmToHz, type Hertz } from '../units/rate';

/** Half width of the band about DF, where its gain is one half. */
export const HALF_WIDTH_CPM: Cpm = 0.5;
/** Largest part of what a phase stands on, weighted by the filter's reach, that may be spoiled. */
const MOST_SPOILED = 0.25;

/** A lead about one stretch, its band and its phase; all arrays are as long as the samples given. */
export interface SlowPhase {
  /** The lead within HALF_WIDTH_CPM of DF, uV. */
  readonly band: Float64Array;
  /** Radians, -pi to pi, 0 at crests, rising with time. */
  readonly phase: Float64Array;
  /** 1 where the phase can be believed: the sample and most of what the filter reaches are kept. */
  readonly usable: Uint8Array;
}

/** Samples that are not kept replaced by straight lines between the kept ones beside them; the ends are held. */
function filled(x: Float64Array, kept: Uint8Array): Float64Array {
  const out = x.slice();
  let before = -1;
  for (let i = 0; i <= x.length; i += 1) {
    if (i < x.length && kept[i] === 0) continue;
    const [left, right] = [before, i];
    for (let k = left + 1; k < right; k += 1) {
      if (left < 0) out[k] = right < x.length ? x[right] : 0;
      else if (right === x.length) out[k] = x[left];
      else out[k] = x[left] + ((x[right] - x[left]) * (k - left)) / (right - left);
    }
    before = i;
  }
  return out;
}

/** Longest piece worked on at once, and what is worked on beside it: twice the filter's reach of about 90 s. */
const PIECE_S = 600;
const BESIDE_S = 180;

/**
 * The phase of the slow wave over a stretch: the lead band-passed about DF (Gaussian, half the gain at +-0.5 cpm) and the
 * angle of its analytic signal (Gabor 1946). `samples` may hold NaN where `kept` is 0. Samples before and after the stretch
 * that is asked about keep its ends clean; about 70 s on either side do. Yields the part that is done.
 */
export function* slowPhase(
  samples: Float64Array,
  kept: Uint8Array,
  rateHz: Hertz,
  dfCpm: Cpm,
): Generator<number, SlowPhase> {
  const { length } = samples;
  const band = new Float64Array(length);
  const phase = new Float64Array(length);
  const usable = new Uint8Array(length);
  const [core, margin] = [PIECE_S, BESIDE_S].map((seconds) => Math.ceil(seconds * rateHz));
  yield* inPieces(length, core, margin, ({ from, to, coreFrom, coreTo }) => {
    const one = phaseOfPiece(samples.subarray(from, to), kept.subarray(from, to), rateHz, dfCpm);
    band.set(one.band.subarray(coreFrom - from, coreTo - from), coreFrom);
    phase.set(one.phase.subarray(coreFrom - from, coreTo - from), coreFrom);
    usable.set(one.usable.subarray(coreFrom - from, coreTo - from), coreFrom);
  });
  return { band, phase, usable };
}

function phaseOfPiece(
  samples: Float64Array,
  kept: Uint8Array,
  rateHz: Hertz,
  dfCpm: Cpm,
): SlowPhase {
  const halfWidthHz = cpmToHz(HALF_WIDTH_CPM);
  const whole = removeLine(filled(samples, kept));
  const taps = gaussianBandTaps({ rateHz, centreHz: cpmToHz(dfCpm), halfWidthHz });
  const band = convolveSame(whole, taps, 'reflect-odd');
  const envelope = gaussianEnvelope(rateHz, gaussianBandSpreadS(halfWidthHz));
  const share = convolveSame(Float64Array.from(kept), envelope, 'zero');
  const usable = Uint8Array.from(kept, (one, i) =>
    one === 1 && share[i] >= 1 - MOST_SPOILED ? 1 : 0,
  );
  return { band, phase: hilbertPhase(band), usable };
}

/** Whole turns of the phase over the usable samples. */
export function cyclesOf({ phase, usable }: SlowPhase, from: number, to: number): number {
  let turned = 0;
  for (let i = from + 1; i < to; i += 1) {
    if (usable[i] === 0 || usable[i - 1] === 0) continue;
    let step = phase[i] - phase[i - 1];
    if (step < -Math.PI) step += 2 * Math.PI;
    if (step > Math.PI) step -= 2 * Math.PI;
    turned += step;
  }
  return turned / (2 * Math.PI);
}

/** Amplitude in uV of what is in the band where it is usable: root two times its root mean square; NaN of nothing. */
export function bandAmplitude(
  band: Float64Array,
  usable: Uint8Array,
  from: number,
  to: number,
): number {
  let [squares, count] = [0, 0];
  for (let i = from; i < to; i += 1) {
    if (usable[i] === 0) continue;
    squares += band[i] * band[i];
    count += 1;
  }
  return Math.sqrt((2 * squares) / count);
}
