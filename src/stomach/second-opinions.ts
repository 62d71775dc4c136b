import { autoregressiveDensity, burg } from '../numeric/burg';
import { dpss } from '../numeric/dpss';
import { log } from '../numeric/elementary';
import { nextPowerOfTwo } from '../numeric/fft';
import { multitaperDensity } from '../numeric/multitaper';
import { type Cpm, type Hertz, hzToCpm } from '../units/rate';
import type { Seconds } from '../units/time';
import { bridged } from './bridged';
import { type Band, bandPeaks, highestPeak, type SpectrumPeak } from './dominant-peak';
import type { PreparedWindow } from './window-spectrum';

/** Rate that autoregressive models are fitted at: the lead at 4 Hz holds nothing from 0.8 Hz on. */
const MODEL_RATE_HZ: Hertz = 2;
/** Highest order, as a part of the samples (Kay & Marple 1981 on short records). */
const MOST_ORDER = 1 / 3;
/** Finest step of a model's spectrum: its peaks are narrower than an epoch's resolution. */
const MODEL_STEP_CPM = 0.01;
/** Half bandwidth of the tapers in resolution cells, and how many of them (2 NW - 1). */
const HALF_BANDWIDTH = 2.5;
const TAPERS = 4;

/** What two other methods take for the dominant frequency of one window. */
export interface SecondOpinion {
  /** Strongest peak of the autoregressive spectrum (Burg 1975); null where there is none in the band. */
  readonly burgCpm: Cpm | null;
  readonly burgOrder: number;
  /** Middle of the highest hump of the multitaper spectrum (Thomson 1982); null where there is none in the band. */
  readonly multitaperCpm: Cpm | null;
}

export interface SecondOpinionOptions {
  readonly rateHz: Hertz;
  readonly lengthS: Seconds;
  readonly band: Band;
  /** |H|2 of the signal against the recorded lead; null where it is 1. */
  readonly powerResponse: ((frequencyHz: Hertz) => number) | null;
}

/**
 * The order from 1 to `most` with the least Akaike criterion n log(variance) + 2 order (Akaike 1974), of the models whose
 * last coefficients are `reflections`.
 */
export function akaikeOrder(reflections: Float64Array, n: number): number {
  let [best, order, logVariance] = [Number.POSITIVE_INFINITY, 1, 0];
  reflections.forEach((reflection, i) => {
    logVariance += log(Math.max(1e-300, 1 - reflection * reflection));
    const criterion = n * logVariance + 2 * (i + 1);
    if (criterion < best) [best, order] = [criterion, i + 1];
  });
  return order;
}

/** A density with the response of the signal against the recorded lead divided out, in place. */
function unresponded(
  density: Float64Array,
  binHz: Hertz,
  powerResponse: SecondOpinionOptions['powerResponse'],
): Float64Array {
  if (powerResponse)
    for (let k = 1; k < density.length; k += 1) density[k] /= powerResponse(k * binHz);
  return density;
}

/**
 * The peak with the most power from the low beside it to the next: the height of an autoregressive peak says how narrow it
 * is, its area how strong (Lacoss 1971). Null of none.
 */
function strongestPeak(density: Float64Array, peaks: readonly SpectrumPeak[]): SpectrumPeak | null {
  let strongest: SpectrumPeak | null = null;
  let most = 0;
  for (const peak of peaks) {
    let power = density[peak.bin];
    for (const step of [-1, 1])
      for (let k = peak.bin + step; k > 0 && density[k] < density[k - step]; k += step)
        power += density[k];
    if (power > most) [strongest, most] = [peak, power];
  }
  return strongest;
}

function burgOpinion(
  samples: Float64Array,
  { rateHz, band, powerResponse }: SecondOpinionOptions,
): Pick<SecondOpinion, 'burgCpm' | 'burgOrder'> {
  const every = Math.max(1, Math.round(rateHz / MODEL_RATE_HZ));
  const modelHz = rateHz / every;
  const x = samples.filter((_, i) => i % every === 0);
  const { reflections } = burg(x, Math.floor(MOST_ORDER * x.length));
  const burgOrder = akaikeOrder(reflections, x.length);
  const size = nextPowerOfTwo(
    Math.max(2 * burgOrder, Math.ceil(hzToCpm(modelHz) / MODEL_STEP_CPM)),
  );
  const density = autoregressiveDensity(burg(x, burgOrder), modelHz, size);
  const binHz = modelHz / size;
  const peaks = bandPeaks(unresponded(density, binHz, powerResponse), hzToCpm(binHz), band);
  return { burgCpm: strongestPeak(density, peaks)?.cpm ?? null, burgOrder };
}

/** Means over `half` values on either side; 0 where there are not so many. */
function smoothed(x: Float64Array, half: number): Float64Array {
  const sums = new Float64Array(x.length + 1);
  x.forEach((value, i) => {
    sums[i + 1] = sums[i] + value;
  });
  return x.map((_, i) =>
    i >= half && i + half < x.length ? (sums[i + half + 1] - sums[i - half]) / (2 * half + 1) : 0,
  );
}

/**
 * A line is spread evenly over twice the half bandwidth, so its flat top has no place of its own: the place of the highest
 * mean over that width, then the centroid there of what stands above the lower of its two ends.
 */
function middleOfHump(density: Float64Array, binCpm: Cpm, half: number, band: Band): Cpm | null {
  const top = highestPeak(bandPeaks(smoothed(density, half), binCpm, band));
  if (!top) return null;
  const floor = Math.min(density[top.bin - half], density[top.bin + half]);
  let [moment, weight] = [0, 0];
  for (let k = top.bin - half; k <= top.bin + half; k += 1) {
    const above = Math.max(0, density[k] - floor);
    moment += above * k;
    weight += above;
  }
  return weight > 0 ? (moment / weight) * binCpm : top.cpm;
}

/**
 * Second opinions on the dominant frequency of windows of one length: Burg's on the window at 2 Hz, its order the one of
 * least Akaike criterion up to a third of the samples, and Thomson's under four prolate spheroidal tapers of half bandwidth
 * 2.5 cells. Both look for the strongest in the band by themselves; neither knows what the epoch's rhythm was taken for. Holes
 * are bridged by straight lines. Throws where a window is too short for the tapers.
 */
export function secondOpinions(
  options: SecondOpinionOptions,
): (window: PreparedWindow) => SecondOpinion {
  const { rateHz, lengthS, band, powerResponse } = options;
  const length = Math.max(2, Math.round(lengthS * rateHz));
  const tapers = dpss(length, HALF_BANDWIDTH, TAPERS);
  const size = nextPowerOfTwo(4 * length);
  const binHz = rateHz / size;
  const half = Math.round((HALF_BANDWIDTH * size) / length);
  return ({ samples, kept }) => {
    const whole = kept.includes(0) ? bridged(samples, kept, rateHz) : samples;
    const density = multitaperDensity(whole, tapers, rateHz, size);
    return {
      ...burgOpinion(whole, options),
      multitaperCpm: middleOfHump(
        unresponded(density, binHz, powerResponse),
        hzToCpm(binHz),
        half,
        band,
      ),
    };
  };
}
