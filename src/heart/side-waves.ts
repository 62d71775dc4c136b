import { type Growing, rms } from './beat-rows';

/** Where P and T waves have their middles, beside that of their QRS complex (common practice, no source). */
const P_S = [-0.3, -0.13] as const;
const T_S = [0.15, 0.5] as const;
/** Half of the window each is known by: a P wave is short, and near its QRS complex. */
const P_HALF_S = 0.055;
const T_HALF_S = 0.09;
/** A side wave below this part of its beat's own size is no rival. */
const LEAST_PART = 0.12;
/** A side wave is of usual size within these multiples of it. */
const USUAL_SIZE = [0.5, 1.6] as const;
const STEP = 2;

/** A P or T wave in the shape band: uV about its middle, falling to 0 at both ends. */
export interface SideWave {
  readonly samples: Float64Array;
  /** Root of the sum of squares. */
  readonly norm: number;
}

/**
 * The P and the T wave that the beats of a shape carry with them: the strongest stretch of the average row before and after
 * the complex. A lone P wave, or a T wave where none is expected, is known by them. `centre` is the complex's middle in the
 * row, `half` half of its window, all in samples.
 */
export function sideWaves(
  { sum, count }: Growing,
  centre: number,
  half: number,
  rateHz: number,
): SideWave[] {
  const own = rms(sum.subarray(centre - half, centre + half + 1)) / count;
  const waves: SideWave[] = [];
  for (const { within, halfS } of [
    { within: P_S, halfS: P_HALF_S },
    { within: T_S, halfS: T_HALF_S },
  ]) {
    const [fromS, toS] = within;
    const reach = Math.round(halfS * rateHz);
    const from = Math.max(reach, centre + Math.round(fromS * rateHz));
    const to = Math.min(sum.length - 1 - reach, centre + Math.round(toS * rateHz));
    const stretches: Float64Array[] = [];
    for (let at = from; at <= to; at += STEP)
      stretches.push(tapered(sum.subarray(at - reach, at + reach + 1), count));
    const best = greatestCrest(stretches.map(rms));
    if (best.value > LEAST_PART * own) {
      const samples = stretches[best.at];
      waves.push({ samples, norm: best.value * Math.sqrt(samples.length) });
    }
  }
  return waves;
}

/** The greatest value with smaller ones to both sides: the foot of the QRS complex is none. */
function greatestCrest(x: readonly number[]): { at: number; value: number } {
  let best = { at: 0, value: 0 };
  for (let i = 1; i < x.length - 1; i += 1)
    if (x[i] > best.value && x[i] > x[i - 1] && x[i] >= x[i + 1]) best = { at: i, value: x[i] };
  return best;
}

/** A stretch over a count, weighted by a parabola that is 0 beyond its ends. */
function tapered(x: Float64Array, count: number): Float64Array {
  const half = (x.length + 1) / 2;
  return x.map((value, i) => (value / count) * (1 - ((i + 1 - half) / half) ** 2));
}

/** How much a place is like a side wave of usual size, 0 to 1: likeness within `lag` samples, less where size is far off. */
export function likeSideWave(
  band: Float64Array,
  at: number,
  lag: number,
  waves: readonly SideWave[],
): number {
  let most = 0;
  for (const { samples, norm } of waves) {
    const reach = (samples.length - 1) / 2;
    const from = Math.max(reach, at - lag);
    const to = Math.min(band.length - 1 - reach, at + lag);
    for (let place = from; place <= to; place += STEP) {
      let product = 0;
      let power = 1e-30;
      for (let i = 0, j = place - reach; i < samples.length; i += STEP, j += STEP) {
        const weight = 1 - ((i - reach) / (reach + 1)) ** 2;
        product += samples[i] * weight * band[j];
        power += (weight * band[j]) ** 2;
      }
      const size = (STEP * product) / norm ** 2;
      const alike = product / Math.sqrt((power * norm ** 2) / STEP);
      most = Math.max(most, alike * usualSize(size));
    }
  }
  return most;
}

/** 1 for a wave of about its usual size, falling to 0 where it is far smaller or larger. */
function usualSize(size: number): number {
  if (size < USUAL_SIZE[0]) return Math.max(0, 2 * (size / USUAL_SIZE[0]) - 1);
  return Math.max(0, Math.min(1, 2 - size / USUAL_SIZE[1]));
}
