import { atan2, pow, sin } from '../numeric/elementary';
import { firResponse, lowPassTaps } from '../numeric/fir';
import { grunwaldLetnikovResponse, grunwaldLetnikovWeights } from '../numeric/grunwald-letnikov';
import { cascadeKernels, centredKernel, type Kernel } from '../numeric/kernel';
import { savitzkyGolayWeights } from '../numeric/savitzky-golay';
import type { Settings } from '../recording/settings';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';
import { heartDecimation } from './heart-rate';

type FractionalSettings = Settings['fractional'];

/** Frequencies at which the outputs are scaled back to uV: 3 cpm, and the middle of a QRS. */
export const SLOW_SCALE_HZ: Hertz = 0.05;
export const HEART_SCALE_HZ: Hertz = 10;

/** Both filters of the route at a lead's rate. */
export interface FractionalKernels {
  /** Derivative, then smoothing; to uV at 3 cpm. */
  readonly slow: Kernel;
  /** Smoothing, then derivative; to uV at 10 Hz (0.2 of the rate where that is lower). */
  readonly heart: Kernel;
  readonly decimation: number;
  readonly slowWindow: number;
  readonly heartWindow: number;
  /** uV of the drawn slow wave for one uV s^-order of the derivative. */
  readonly slowScale: number;
  readonly slowResponse: (frequencyHz: Hertz) => {
    readonly power: number;
    readonly leadS: Seconds;
  };
}

/** A window in ms as an odd number of samples that a polynomial of the order fits into. */
export function windowSamples(windowMs: number, rateHz: Hertz, polynomialOrder: number): number {
  const odd = 2 * Math.floor((windowMs * rateHz) / 2000 + 1e-9) + 1;
  const least = 2 * Math.floor((polynomialOrder + 2) / 2) - 1;
  return Math.max(odd, least > polynomialOrder ? least : least + 2);
}

function scaled(kernel: Kernel, factor: number): Kernel {
  return { taps: kernel.taps.map((tap) => tap * factor), origin: kernel.origin };
}

/** Weights of the derivative in units per second^order over the memory: a causal kernel. */
export function derivativeKernel(order: number, memoryS: Seconds, rateHz: Hertz): Kernel {
  const taps = grunwaldLetnikovWeights(order, memorySamples(memoryS, rateHz) + 1);
  const scale = pow(rateHz, order);
  for (let k = 0; k < taps.length; k++) taps[k] *= scale;
  return { taps, origin: 0 };
}

const memorySamples = (memoryS: Seconds, rateHz: Hertz) => Math.round(memoryS * rateHz);

/** Gain of smoothing weights, which are symmetric; the response of one tap is 1. */
function smoothingGain(weights: Float64Array, frequencyHz: Hertz, rateHz: Hertz): number {
  return firResponse(weights, frequencyHz, rateHz).re;
}

/** Low-pass before folding to the heartbeat's rate; one tap of 1 where nothing is folded. */
export function foldingTaps(rateHz: Hertz, decimation: number): Float64Array {
  if (decimation === 1) return Float64Array.of(1);
  const outputRateHz = rateHz / decimation;
  return lowPassTaps({
    rateHz,
    passHz: 0.32 * outputRateHz,
    stopHz: 0.5 * outputRateHz,
    attenuationDb: 60,
  });
}

/** Keeps a function's values by argument. */
function remembered<T>(compute: (argument: number) => T): (argument: number) => T {
  const known = new Map<number, T>();
  return (argument) => {
    const before = known.get(argument);
    if (before !== undefined) return before;
    const value = compute(argument);
    known.set(argument, value);
    return value;
  };
}

/**
 * Gain of the heartbeat's filter at the frequency it is scaled at; by the derivative's closed form
 * for an unlimited memory, which differs by less than 1e-3 there.
 */
function heartGain(order: number, smoothing: Float64Array, rateHz: Hertz): number {
  const at = Math.min(HEART_SCALE_HZ, 0.2 * rateHz);
  const derivative = pow(2 * sin((Math.PI * at) / rateHz) * rateHz, order);
  return derivative * smoothingGain(smoothing, at, rateHz);
}

/**
 * Kernels of a Gruenwald-Letnikov derivative (Podlubny 1999) of order 0 to 1 with fixed memory and
 * of Savitzky-Golay smoothing (1964), joined; both low-passed where they are to be folded.
 */
export function fractionalKernels(settings: FractionalSettings, rateHz: Hertz): FractionalKernels {
  const { order, memoryS, slowWindowMs, heartWindowMs, polynomialOrder } = settings;
  if (!(order >= 0 && order <= 1) || !(memoryS > 0))
    throw new Error(`derivative of order ${order} over ${memoryS} s: want 0 to 1, above 0 s`);
  const decimation = heartDecimation(rateHz);
  const slowWindow = windowSamples(slowWindowMs, rateHz, polynomialOrder);
  const heartWindow = windowSamples(heartWindowMs, rateHz, polynomialOrder);
  const slowSmoothing = savitzkyGolayWeights(slowWindow, polynomialOrder);
  const heartSmoothing = savitzkyGolayWeights(heartWindow, polynomialOrder);
  const derivative = derivativeKernel(order, memoryS, rateHz);
  const folding = centredKernel(foldingTaps(rateHz, decimation));
  const respond = (frequencyHz: Hertz) => {
    const past = memorySamples(memoryS, rateHz);
    const { re, im } = grunwaldLetnikovResponse(order, 1 / rateHz, past, frequencyHz);
    const gain = smoothingGain(slowSmoothing, frequencyHz, rateHz);
    return {
      gain: Math.hypot(re, im) * Math.abs(gain),
      leadS: frequencyHz > 0 ? atan2(im, re) / (2 * Math.PI * frequencyHz) : 0,
    };
  };
  const slowScale = 1 / respond(SLOW_SCALE_HZ).gain;
  const part = (smoothing: Float64Array, scale: number) => {
    const short = cascadeKernels(centredKernel(smoothing), folding);
    return scaled(cascadeKernels(derivative, short), scale);
  };
  return {
    slow: part(slowSmoothing, slowScale),
    heart: part(heartSmoothing, 1 / heartGain(order, heartSmoothing, rateHz)),
    decimation,
    slowWindow,
    heartWindow,
    slowScale,
    slowResponse: remembered((frequencyHz) => {
      const { gain, leadS } = respond(frequencyHz);
      return { power: (gain * slowScale) ** 2, leadS };
    }),
  };
}
