import { nextPowerOfTwo } from '../numeric/fft';
import { powerDensity } from '../numeric/spectrum';
import { hannPeriodic } from '../numeric/windows';
import { zeroedWindow } from '../numeric/zeroed-window';
import { type Cpm, type Hertz, hzToCpm } from '../units/rate';
import { bridged } from './bridged';
import { withoutLines } from './without-lines';

/** Frequencies beyond this are not needed by any stomach figure: breathing whose half lies in the band is below. */
const HIGHEST_CPM = 19;

/** One stretch of a lead made ready for a spectrum. */
export interface PreparedWindow {
  /** Mean and line of the kept samples taken off, spoiled samples 0. */
  readonly samples: Float64Array;
  /** 1 where a sample is kept. */
  readonly kept: Uint8Array;
  /** Sum of the taper over spoiled samples over the sum of the taper, 0 to 1. */
  readonly spoiledFraction: number;
}

/** Spectra of windows of one length of one lead. */
export interface WindowSpectra {
  readonly taper: Float64Array;
  readonly binCpm: number;
  /** Bins 0 .. binCount - 1 are given, up to 19 cpm or half the rate. */
  readonly binCount: number;
  prepare(first: number): PreparedWindow;
  /** One-sided density in uV2/Hz of the recorded lead, corrected for what was spoiled. */
  density(window: PreparedWindow): Float64Array;
  /** The same of what is left when lines at these frequencies are fitted to the kept samples and taken off. */
  densityWithout(window: PreparedWindow, frequenciesCpm: readonly Cpm[]): Float64Array;
  /** Density with straight lines across what was spoiled: no leak of a drift, but less power of a wave. */
  densityBridged(window: PreparedWindow): Float64Array;
}

export interface WindowSpectraOptions {
  readonly signal: Float64Array;
  /** 1 where a sample is kept, 0 where it is spoiled or missing. */
  readonly kept: Uint8Array;
  readonly rateHz: Hertz;
  readonly lengthS: number;
  /** |H|2 of the signal against the recorded lead; null where it is 1. */
  readonly powerResponse: ((frequencyHz: Hertz) => number) | null;
}

/** Factor that turns a density into that of the recorded lead, bin by bin; 1 at 0 Hz. */
function unresponse(
  powerResponse: WindowSpectraOptions['powerResponse'],
  binHz: number,
  binCount: number,
): Float64Array | null {
  if (!powerResponse) return null;
  return Float64Array.from({ length: binCount }, (_, k) =>
    k === 0 ? 1 : 1 / powerResponse(k * binHz),
  );
}

/**
 * Periodograms of a lead with a periodic Hann taper, padded with zeros to the next power of two of
 * at least four times the length (240 s at 4 Hz: 4096 points), scaled as a density (Welch 1967).
 * Spoiled samples are set to zero after mean and line are fitted to the kept ones, and the power of
 * a line is made whole by (sum of kept taper / sum of taper)2.
 */
export function windowSpectra(options: WindowSpectraOptions): WindowSpectra {
  const { signal, kept, rateHz, lengthS, powerResponse } = options;
  const length = Math.max(2, Math.round(lengthS * rateHz));
  const taper = hannPeriodic(length);
  const taperSum = taper.reduce((sum, weight) => sum + weight, 0);
  const size = nextPowerOfTwo(4 * length);
  const binHz = rateHz / size;
  const binCount = Math.min(size / 2 + 1, Math.ceil(HIGHEST_CPM / hzToCpm(binHz)) + 1);
  const factor = unresponse(powerResponse, binHz, binCount);
  const densityOf = (samples: Float64Array, spoiledFraction: number) => {
    const density = powerDensity(samples, taper, rateHz, size).slice(0, binCount);
    const whole = 1 / (1 - spoiledFraction) ** 2;
    for (let k = 0; k < binCount; k++) density[k] *= whole * (factor ? factor[k] : 1);
    return density;
  };
  return {
    taper,
    binCpm: hzToCpm(binHz),
    binCount,
    prepare(first) {
      const raw = signal.subarray(first, first + length);
      const weights = kept.subarray(first, first + length);
      if (raw.length < length) throw new Error(`no ${length} samples from ${first} on`);
      const { samples, keptTaper } = zeroedWindow(raw, weights, taper);
      const spoiledFraction = Math.min(1, Math.max(0, 1 - keptTaper / taperSum));
      return {
        samples,
        kept: weights,
        spoiledFraction: spoiledFraction < 1e-12 ? 0 : spoiledFraction,
      };
    },
    density: ({ samples, spoiledFraction }) => densityOf(samples, spoiledFraction),
    densityBridged: ({ samples, kept: there }) => densityOf(bridged(samples, there, rateHz), 0),
    densityWithout({ samples, kept: there, spoiledFraction }, frequenciesCpm) {
      const weights = taper.map((value, i) => (there[i] === 0 ? 0 : value));
      return densityOf(withoutLines(samples, weights, frequenciesCpm, rateHz), spoiledFraction);
    },
  };
}
