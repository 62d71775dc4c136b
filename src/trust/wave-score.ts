import { log10 } from '../numeric/elementary';
import type { Hertz } from '../units/rate';
import type { Seconds } from '../units/time';

/** Farthest that a drawn wave may lie beside the planted one. */
export const MOST_DELAY_S: Seconds = 5;
/** Nothing in common, or all of it, is not written beyond these. */
const LIMITS_DB = [-20, 60] as const;
/** Fewer samples than these seconds tell no delay. */
const LEAST_S: Seconds = 60;

/** How a drawn wave follows a planted one. */
export interface WaveScore {
  /** Power of what follows the planted wave over power of the rest, in the drawn wave, dB. */
  readonly snrDb: number;
  /** Height of the drawn wave, the planted one's being 1. */
  readonly scale: number;
  /** How much later it is drawn. */
  readonly delayS: Seconds;
}

interface Fit {
  readonly correlation: number;
  readonly scale: number;
}

/** Samples that are compared: those of [from, to) whose `counts` is 1. */
export interface Compared {
  readonly counts: Uint8Array;
  readonly from: number;
  readonly to: number;
}

/** Correlation, means taken out, of what is drawn with what was planted `lag` samples before. */
function fitAt(
  drawn: Float64Array,
  planted: Float64Array,
  { counts, from, to }: Compared,
  lag: number,
): Fit {
  let [n, sumD, sumP, dd, pp, dp] = [0, 0, 0, 0, 0, 0];
  const end = Math.min(to, drawn.length, planted.length + lag);
  for (let i = Math.max(from, lag, 0); i < end; i += 1) {
    if (counts[i] === 0) continue;
    const [d, p] = [drawn[i], planted[i - lag]];
    n += 1;
    sumD += d;
    sumP += p;
    dd += d * d;
    pp += p * p;
    dp += d * p;
  }
  const [varD, varP, both] = [dd - sumD ** 2 / n, pp - sumP ** 2 / n, dp - (sumD * sumP) / n];
  if (!(varD > 0 && varP > 0)) return { correlation: 0, scale: 0 };
  return { correlation: both / Math.sqrt(varD * varP), scale: both / varP };
}

/** The crest of correlations by lag, read between lags by a parabola. */
function crestOf(fits: readonly Fit[]): { readonly place: number; readonly correlation: number } {
  let best = 0;
  fits.forEach((fit, k) => {
    if (fit.correlation > fits[best].correlation) best = k;
  });
  const { correlation } = fits[best];
  const [before, after] = [fits[best - 1], fits[best + 1]];
  if (!before || !after) return { place: best, correlation };
  const bend = before.correlation - 2 * correlation + after.correlation;
  if (!(bend < 0)) return { place: best, correlation };
  const tilt = (before.correlation - after.correlation) / 2;
  return { place: best + tilt / bend, correlation: correlation - (tilt * tilt) / (2 * bend) };
}

/**
 * How a drawn wave follows the planted one: after the best scale and the best delay within 5 s, read between samples by a
 * parabola through the correlations. Null of less than a minute of samples.
 */
export function waveScore(
  drawn: Float64Array,
  planted: Float64Array,
  compared: Compared,
  rateHz: Hertz,
): WaveScore | null {
  const there = compared.counts.subarray(compared.from, compared.to).reduce((n, one) => n + one, 0);
  if (there < LEAST_S * rateHz) return null;
  const most = Math.floor(MOST_DELAY_S * rateHz);
  const fits = Array.from({ length: 2 * most + 1 }, (_, k) =>
    fitAt(drawn, planted, compared, k - most),
  );
  const { place, correlation } = crestOf(fits);
  const square = Math.min(1 - 1e-12, Math.max(0, correlation) ** 2);
  const snrDb = square > 0 ? 10 * log10(square / (1 - square)) : LIMITS_DB[0];
  return {
    snrDb: Math.max(LIMITS_DB[0], Math.min(LIMITS_DB[1], snrDb)),
    scale: Math.max(0, fits[Math.round(place)].scale),
    delayS: (place - most) / rateHz,
  };
}
