import { type Growing, rms } from './beat-rows';

/** Where P and T waves have their middles, beside that of their QRS complex (common practice, no source). */
const P_S = [-0.3, -0.13] as const;
const T_S = [0.15, 0.5] as const;
/** Half of the window each is known by: a P wave is short, and near its QRS complex. */
const P_HALF_S = 0.055;
const T_HALF_S = 0.09;
/** A side wave below this part of its beat's own size is no rival. */
const LEAST_PART = 0.08;
/** A side wave is of usual size within these multiples of it. */
const USUAL_SIZE = [0.5, 1.6] as const;
const STEP = 2;

/** A P or T wave in the shape band, its mean and slope taken out. */
export interface SideWave {
  readonly kind: 'P' | 'T';
  /** uV about its middle, weighted by `taper`, which falls to 0 at both ends. */
  readonly weights: Float64Array;
  readonly taper: Float64Array;
  /** Root of the weighted sum of squares. */
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
  for (const { kind, within, halfS } of [
    { kind: 'P', within: P_S, halfS: P_HALF_S },
    { kind: 'T', within: T_S, halfS: T_HALF_S },
  ] as const) {
    const [fromS, toS] = within;
    const reach = Math.round(halfS * rateHz);
    const from = Math.max(reach, centre + Math.round(fromS * rateHz));
    const to = Math.min(sum.length - 1 - reach, centre + Math.round(toS * rateHz));
    const stretches: SideWave[] = [];
    for (let at = from; at <= to; at += STEP)
      stretches.push(sideWaveOf(kind, sum.subarray(at - reach, at + reach + 1), count));
    const best = greatestCrest(stretches.map(({ norm }) => norm / Math.sqrt(2 * reach + 1)));
    if (best.value > LEAST_PART * own) waves.push(stretches[best.at]);
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

/** Mean and slope are taken out: the slow feet of the QRS complex beside a wave tilt it. */
function sideWaveOf(kind: SideWave['kind'], x: Float64Array, count: number): SideWave {
  const half = (x.length - 1) / 2;
  const taper = x.map((_, i) => (1 - ((i - half) / (half + 1)) ** 2) ** 2);
  let [level, tilt, mass, spread] = [0, 0, 0, 0];
  x.forEach((value, i) => {
    level += (taper[i] * value) / count;
    tilt += (taper[i] * (i - half) * value) / count;
    mass += taper[i];
    spread += taper[i] * (i - half) ** 2;
  });
  let power = 0;
  const weights = x.map((value, i) => {
    const rest = value / count - level / mass - ((i - half) * tilt) / spread;
    power += taper[i] * rest * rest;
    return taper[i] * rest;
  });
  return { kind, weights, taper, norm: Math.sqrt(power) };
}

/** How much a place is like a side wave of usual size, 0 to 1: likeness within `lag` samples, less where size is far off. */
export function likeSideWave(
  band: Float64Array,
  at: number,
  lag: number,
  waves: readonly SideWave[],
): number {
  let most = 0;
  for (const { weights, taper, norm } of waves) {
    const reach = (weights.length - 1) / 2;
    const from = Math.max(reach, at - lag);
    const to = Math.min(band.length - 1 - reach, at + lag);
    for (let place = from; place <= to; place += STEP) {
      let [product, power, level, tilt, mass, spread] = [0, 1e-30, 0, 0, 0, 0];
      for (let i = 0, j = place - reach; i < weights.length; i += STEP, j += STEP) {
        const w = taper[i];
        const wx = w * band[j];
        const t = i - reach;
        product += weights[i] * band[j];
        power += wx * band[j];
        level += wx;
        tilt += t * wx;
        mass += w;
        spread += w * t * t;
      }
      power -= (level * level) / mass + (tilt * tilt) / spread;
      const size = (STEP * product) / norm ** 2;
      const alike = product / Math.sqrt((Math.max(power, 1e-12) * norm ** 2) / STEP);
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
