import { extend } from './ends';
import { centredKernel, kernelResponse, type Response } from './kernel';
import { blockSizeFor, overlapSave } from './overlap-save';
import { amplitudeDb, idealLowPass, kaiser, kaiserBeta, kaiserTaps } from './windows';

export interface LowPassSpec {
  readonly rateHz: number;
  readonly passHz: number;
  readonly stopHz: number;
  readonly attenuationDb: number;
}

export interface HighPassSpec {
  readonly rateHz: number;
  readonly stopHz: number;
  readonly passHz: number;
  readonly attenuationDb: number;
}

export interface BandPassSpec {
  readonly rateHz: number;
  readonly lowStopHz: number;
  readonly lowPassHz: number;
  readonly highPassHz: number;
  readonly highStopHz: number;
  readonly attenuationDb: number;
}

/** Edges must rise from 0 to half the rate. */
function checkEdges(rateHz: number, edgesHz: readonly number[]): void {
  let before = 0;
  for (const edge of edgesHz) {
    if (!(edge > before))
      throw new Error(`filter edges must rise from above 0 Hz: ${edgesHz.join(', ')}`);
    before = edge;
  }
  if (before > rateHz / 2)
    throw new Error(`filter edge ${before} Hz lies above half the rate of ${rateHz} Hz`);
}

/** Windowed sinc with -6 dB at cutoffHz, scaled to a gain of exactly 1 at 0 Hz. */
function windowedSinc(window: Float64Array, cutoffHz: number, rateHz: number): Float64Array {
  const taps = new Float64Array(window.length);
  const centre = (window.length - 1) / 2;
  let sum = 0;
  for (let i = 0; i < taps.length; i++) {
    taps[i] = window[i] * idealLowPass(cutoffHz, (i - centre) / rateHz);
    sum += taps[i];
  }
  for (let i = 0; i < taps.length; i++) taps[i] /= sum;
  return taps;
}

/**
 * Taps of a zero-phase low-pass: symmetric, odd in number, Kaiser windowed sinc (Kaiser 1974) with
 * its -6 dB point midway between passHz and stopHz; gain 1 at 0 Hz.
 * Throws where the edges do not rise or lie above half the rate.
 */
export function lowPassTaps(spec: LowPassSpec): Float64Array {
  const { rateHz, passHz, stopHz, attenuationDb } = spec;
  checkEdges(rateHz, [passHz, stopHz]);
  const window = kaiser(
    kaiserTaps(attenuationDb, stopHz - passHz, rateHz),
    kaiserBeta(attenuationDb),
  );
  return windowedSinc(window, (passHz + stopHz) / 2, rateHz);
}

/** Taps of the matching zero-phase high-pass: the unit impulse less a low-pass; gain 0 at 0 Hz. */
export function highPassTaps(spec: HighPassSpec): Float64Array {
  const { rateHz, stopHz, passHz, attenuationDb } = spec;
  const taps = lowPassTaps({ rateHz, passHz: stopHz, stopHz: passHz, attenuationDb });
  for (let i = 0; i < taps.length; i++) taps[i] = -taps[i];
  taps[(taps.length - 1) / 2] += 1;
  return taps;
}

/** What two ripples of one size can add up to. */
const TWO_RIPPLES_DB = amplitudeDb(2);

/**
 * Taps of a zero-phase band-pass: the difference of two low-passes of one length, set by the
 * narrower transition, each 6 dB better than asked since their ripples add; gain exactly 0 at 0 Hz, 1 inside the band within the ripple.
 * Throws where the edges do not rise or lie above half the rate.
 */
export function bandPassTaps(spec: BandPassSpec): Float64Array {
  const { rateHz, lowStopHz, lowPassHz, highPassHz, highStopHz, attenuationDb } = spec;
  checkEdges(rateHz, [lowStopHz, lowPassHz, highPassHz, highStopHz]);
  const transitionHz = Math.min(lowPassHz - lowStopHz, highStopHz - highPassHz);
  const eachDb = attenuationDb + TWO_RIPPLES_DB;
  const window = kaiser(kaiserTaps(eachDb, transitionHz, rateHz), kaiserBeta(eachDb));
  const taps = windowedSinc(window, (highPassHz + highStopHz) / 2, rateHz);
  const below = windowedSinc(window, (lowStopHz + lowPassHz) / 2, rateHz);
  for (let i = 0; i < taps.length; i++) taps[i] -= below[i];
  return taps;
}

/**
 * Frequency response of odd-length taps at freqHz, relative to their centre:
 * sum taps[i] e^(-2 pi i f (i - centre) / rate). Real for symmetric taps.
 */
export function firResponse(taps: Float64Array, freqHz: number, rateHz: number): Response {
  return kernelResponse(centredKernel(taps), freqHz, rateHz);
}

/** Below this many multiplications a direct sum is quicker than planning transforms. */
const DIRECT_WORK = 40_000;
const DIRECT_TAPS = 48;

/**
 * Convolution of x with odd-length taps about their centre, as long as x. Outside x counts as
 * zero, or as x turned about its first and last value ('reflect-odd', which keeps a line a line).
 * Summed directly where that is quicker, else by overlap-save.
 */
export function convolveSame(
  x: Float64Array,
  taps: Float64Array,
  ends: 'reflect-odd' | 'zero',
): Float64Array {
  const kernel = centredKernel(taps);
  if (taps.length <= DIRECT_TAPS || taps.length * x.length <= DIRECT_WORK)
    return convolveDirect(x, taps, ends);
  const blockSize = blockSizeFor([kernel], x.length);
  return overlapSave(x, { blockSize, kernels: [kernel], decimate: 1, ends })[0];
}

function convolveDirect(
  x: Float64Array,
  taps: Float64Array,
  ends: 'reflect-odd' | 'zero',
): Float64Array {
  const half = (taps.length - 1) / 2;
  const padded = extend(x, half, half, ends);
  const y = new Float64Array(x.length);
  const last = taps.length - 1;
  for (let n = 0; n < y.length; n++) {
    let sum = 0;
    for (let j = 0; j <= last; j++) sum += taps[j] * padded[n + last - j];
    y[n] = sum;
  }
  return y;
}
