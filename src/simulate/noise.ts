import { cos, exp, sin } from '../numeric/elementary';
import type { Random } from '../numeric/random';
import type { Hertz } from '../units/rate';
import { addWander, type CoarseGrid } from './coarse-grid';
import { quickNormal } from './quick-normal';
import type { LeadSpec, NoiseSpec } from './spec';

/** Correlation times of the processes whose sum falls about as 1/f from 0.002 to 0.2 Hz, in s. */
const BACKGROUND_TIMES_S = [1, 4, 16, 64];

/** Adds the background like 1/f to the coarse values of a lead. */
export function addBackground(
  coarse: Float64Array,
  spec: NoiseSpec,
  grid: CoarseGrid,
  random: Random,
): void {
  const each = spec.backgroundUv / Math.sqrt(BACKGROUND_TIMES_S.length);
  for (const timeS of BACKGROUND_TIMES_S) addWander(coarse, random, each, timeS, grid.stepS);
}

/** Adds the electrodes' drift, which settles, to the coarse values of a lead. */
export function addDrift(
  coarse: Float64Array,
  spec: NoiseSpec,
  lead: LeadSpec,
  grid: CoarseGrid,
): void {
  if (lead.driftUv === 0) return;
  for (let i = 0; i < grid.points; i += 1)
    coarse[i] += lead.driftUv * exp((-i * grid.stepS) / spec.driftS);
}

/** Adds white and muscle noise to samples; `muscleUv` is the root mean square of the latter at each coarse point. */
export function addFastNoise(
  samples: Float64Array,
  whiteUv: number,
  muscleUv: Float64Array,
  every: number,
  random: Random,
): void {
  let before = quickNormal(random);
  for (let i = 0, n = 0; n < samples.length; i += 1) {
    const muscle = muscleUv[i] * Math.SQRT1_2;
    const to = Math.min(samples.length, n + every);
    for (; n < to; n += 1) {
      const value = quickNormal(random);
      samples[n] += whiteUv * value + muscle * (value - before);
      before = value;
    }
  }
}

/** Coarse points after which the turning phasor is set anew, so that rounding does not grow. */
const RESET_POINTS = 100;

/** Adds mains hum to samples; `peakUv` is its peak at each coarse point, `cycles` its phase at the start. */
export function addMains(
  samples: Float64Array,
  peakUv: Float64Array,
  every: number,
  mains: { readonly hz: Hertz; readonly rateHz: Hertz; readonly cycles: number },
): void {
  const step = (2 * Math.PI * mains.hz) / mains.rateHz;
  const turnCos = cos(step);
  const turnSin = sin(step);
  let re = 0;
  let im = 0;
  for (let i = 0, n = 0; n < samples.length; i += 1) {
    if (i % RESET_POINTS === 0) {
      const cycles = (mains.hz / mains.rateHz) * n + mains.cycles;
      const angle = 2 * Math.PI * (cycles - Math.floor(cycles));
      re = cos(angle);
      im = sin(angle);
    }
    const peak = peakUv[i];
    const to = Math.min(samples.length, n + every);
    for (; n < to; n += 1) {
      samples[n] += peak * im;
      const nextRe = re * turnCos - im * turnSin;
      im = re * turnSin + im * turnCos;
      re = nextRe;
    }
  }
}
