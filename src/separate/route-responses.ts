import { convolveSame, lowPassTaps } from '../numeric/fir';
import { grunwaldLetnikovResponses, type Responses } from '../numeric/grunwald-letnikov-responses';
import { centredKernel } from '../numeric/kernel';
import { blockSizeFor, createOverlapSave } from '../numeric/overlap-save';
import type { Random } from '../numeric/random';
import { savitzkyGolayWeights } from '../numeric/savitzky-golay';
import { symmetricResponses } from '../numeric/symmetric-response';
import type { Settings } from '../recording/settings';
import type { Hertz } from '../units/rate';
import { foldingTaps, windowSamples } from './fractional-kernels';
import { heartBandAt, heartBandKernel } from './heart-band';
import { heartDecimation } from './heart-rate';
import { createSlowSampler, SLOW_LOW_PASS, slowRateHz } from './slow-rate';

export type Organ = 'slow' | 'heart';

/** A lead at a rate at which all that its route's output can hold is still there. */
export interface FoldedLead {
  readonly samples: Float64Array;
  readonly rateHz: Hertz;
}

/** Least rate a slow wave's stretch is folded to: beyond half of it nothing passes the low-pass before 4 Hz. */
const LEAST_SLOW_HZ = 25;
const SLOW_ATTENUATION_DB = 80;
/** Where the route's low-pass before the heartbeat's rate begins to fall, as a share of that rate. */
const FOLDED_PASS = 0.32;

const slowDecimation = (rateHz: Hertz): number => Math.max(1, Math.floor(rateHz / LEAST_SLOW_HZ));

function slowFoldingTaps(rateHz: Hertz, decimation: number): Float64Array {
  if (decimation === 1) return Float64Array.of(1);
  const outputHz = rateHz / decimation;
  return lowPassTaps({
    rateHz,
    passHz: 0.25 * outputHz,
    stopHz: 0.5 * outputHz,
    attenuationDb: SLOW_ATTENUATION_DB,
  });
}

/** Samples folded between one rest and the next. */
const PIECE = 65_536;

/**
 * A lead's samples folded as the routes fold them: for the heart to the heartbeat's own rate by the route's own low-pass,
 * for the slow wave to 25 Hz or more. Ends are turned about their end values; NaN is not allowed.
 */
export function* foldedLead(
  organ: Organ,
  samples: Float64Array,
  rateHz: Hertz,
): Generator<void, FoldedLead> {
  const decimate = organ === 'heart' ? heartDecimation(rateHz) : slowDecimation(rateHz);
  if (decimate === 1) return { samples, rateHz };
  const taps =
    organ === 'heart' ? foldingTaps(rateHz, decimate) : slowFoldingTaps(rateHz, decimate);
  const kernel = centredKernel(taps);
  const filter = createOverlapSave({
    blockSize: blockSizeFor([kernel], PIECE, decimate),
    kernels: [kernel],
    decimate,
    ends: 'reflect-odd',
  });
  const parts: Float64Array[] = [];
  for (let from = 0; from < samples.length; from += PIECE) {
    parts.push(filter.push(samples.subarray(from, from + PIECE))[0]);
    yield;
  }
  parts.push(filter.finish()[0]);
  const folded = new Float64Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    folded.set(part, at);
    at += part.length;
  }
  return { samples: folded, rateHz: rateHz / decimate };
}

/** Where and for what responses are wanted. */
export interface ResponseAsk {
  readonly organ: Organ;
  /** The lead's own rate, at which the route filters. */
  readonly rateHz: Hertz;
  readonly freqsHz: Float64Array;
}

/** The two factors of route `fractional`: any cell of a map is the product of one of each. */
export interface FractionalResponses {
  /** By order; the low-pass before 4 Hz included for the slow wave. Scaled as they come. */
  readonly derivative: (order: number) => Responses;
  /** By window, real. */
  readonly smoothing: (windowMs: number) => Float64Array;
}

/** Responses of the very kernels that route `fractional` convolves with. */
export function fractionalResponses(
  { memoryS, polynomialOrder }: Pick<Settings['fractional'], 'memoryS' | 'polynomialOrder'>,
  { organ, rateHz, freqsHz }: ResponseAsk,
): FractionalResponses {
  const passed = organ === 'slow' ? slowSamplerResponses(rateHz, freqsHz) : null;
  const bare = grunwaldLetnikovResponses(1 / rateHz, Math.round(memoryS * rateHz), freqsHz);
  return {
    derivative(order) {
      const { re, im } = bare(order);
      if (!passed) return { re, im };
      const times = (part: Float64Array) => part.map((value, k) => value * passed[k]);
      return { re: times(re), im: times(im) };
    },
    smoothing(windowMs) {
      const window = windowSamples(windowMs, rateHz, polynomialOrder);
      return symmetricResponses(savitzkyGolayWeights(window, polynomialOrder), rateHz, freqsHz);
    },
  };
}

/** Gain of the low-pass before 4 Hz on a lead of that rate; 1 where the lead is taken as it is. */
function slowSamplerResponses(rateHz: Hertz, freqsHz: Float64Array): Float64Array {
  if (slowRateHz(rateHz) === rateHz) return new Float64Array(freqsHz.length).fill(1);
  return symmetricResponses(lowPassTaps({ rateHz, ...SLOW_LOW_PASS }), rateHz, freqsHz);
}

/** Response of route `band` for the heartbeat, which is real; null where the rate leaves no band. */
export function heartBandResponses(
  { heartBandHz }: Pick<Settings, 'heartBandHz'>,
  { rateHz, freqsHz }: Pick<ResponseAsk, 'rateHz' | 'freqsHz'>,
): Float64Array | null {
  const outputHz = rateHz / heartDecimation(rateHz);
  const band = heartBandAt(outputHz, heartBandHz);
  if (!band) return null;
  return symmetricResponses(heartBandKernel(rateHz, outputHz, band).taps, rateHz, freqsHz);
}

/** A folded lead at the slow rate. */
export function slowLead({ samples, rateHz }: FoldedLead): FoldedLead {
  const sampler = createSlowSampler(rateHz);
  sampler.push(samples);
  return { samples: sampler.finish(), rateHz: slowRateHz(rateHz) };
}

/**
 * White noise of root mean square 1 up to half of the heartbeat's rate of a lead of `rateHz`, low-passed as what is folded to
 * it is.
 */
export function heartNoise(length: number, rateHz: Hertz, random: Random): Float64Array {
  const noise = Float64Array.from({ length }, () => random.gaussian());
  if (heartDecimation(rateHz) === 1) return noise;
  const outputHz = rateHz / heartDecimation(rateHz);
  const taps = lowPassTaps({
    rateHz: outputHz,
    passHz: FOLDED_PASS * outputHz,
    stopHz: 0.5 * outputHz,
    attenuationDb: 60,
  });
  return convolveSame(noise, taps, 'zero');
}
