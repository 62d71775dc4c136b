import { log } from '../numeric/elementary';
import { mean, median, quantile } from '../numeric/statistics';

/** A jump from one interval to the next (logarithm of their ratio) that is no usual breath's. */
const JUMP = 0.2;
/** Where so many of the steps are jumps, and a quarter of the steps is far below them, something breaks a calm rhythm. */
const LEAST_JUMPS = 0.31;
const CALM_SHARE = 0.2;

/** Intervals that are looked at together for a pattern that repeats, and how far one look is from the next. */
const WINDOW = 24;
const HOP = 12;
const PERIODS = [2, 3, 4];
/** The pattern's largest difference over the mean interval, and the spread within each of its places over that difference. */
const LEAST_CONTRAST = 0.2;
const MOST_SPREAD = 0.15;
/** A pattern of four is no sine: breathing at a quarter of the heart rate is one. */
const LEAST_UNLIKE_SINE = 0.25;
/** In a pattern of three, the interval that is neither short nor long is this near to their middle, over their difference. */
const MIDDLE_WITHIN = 0.15;
const LEAST_PATTERNED = 0.4;

/**
 * True where abrupt jumps break an otherwise calm rhythm: early beats in number, groups with pauses, pacemakers that take
 * over. The steps of a respiratory arrhythmia, however strong, are of all sizes up to the largest.
 */
export function isBrokenByJumps(rrMs: Float64Array): boolean {
  const steps = new Float64Array(Math.max(0, rrMs.length - 1));
  for (let i = 0; i < steps.length; i += 1) steps[i] = Math.abs(log(rrMs[i + 1] / rrMs[i]));
  const jumps = steps.filter((step) => step > JUMP);
  if (jumps.length === 0 || jumps.length < LEAST_JUMPS * steps.length) return false;
  return quantile(steps, 0.25) < CALM_SHARE * median(jumps);
}

/** Part of the swing of a pattern of four that no sine of its period has: every second value against the others. */
function unlikeSine(places: readonly number[]): number {
  const [a, b, c, d] = places;
  const sine = Math.sqrt((a - c) ** 2 + (b - d) ** 2);
  return Math.abs(a - b + c - d) / (sine + Math.abs(a - b + c - d));
}

/** Whether three values are short, long and one between, in this order: an early beat, its pause, and a usual one. */
function isEarlyPauseUsual(places: readonly number[]): boolean {
  const short = places.indexOf(Math.min(...places));
  const [long, usual] = [places[(short + 1) % 3], places[(short + 2) % 3]];
  const off = Math.abs(usual - (places[short] + long) / 2);
  return long > usual && off < MIDDLE_WITHIN * (long - places[short]);
}

function repeats(rr: Float64Array, period: number): boolean {
  const places = Array.from({ length: period }, (_, k) =>
    mean(rr.filter((__, i) => i % period === k)),
  );
  const contrast = Math.max(...places) - Math.min(...places);
  if (contrast < LEAST_CONTRAST * mean(rr)) return false;
  if (period === 3 && !isEarlyPauseUsual(places)) return false;
  if (period === 4 && unlikeSine(places) < LEAST_UNLIKE_SINE) return false;
  const spread = Math.sqrt(mean(rr.map((one, i) => (one - places[i % period]) ** 2)));
  return spread < MOST_SPREAD * contrast;
}

/**
 * True where two fifths of the stretch repeat one pattern of two, three or four intervals beat for beat, as regular early
 * beats do; breathing keeps in step with the beats of the heart for moments only.
 */
export function isPatterned(rrMs: Float64Array): boolean {
  let [looks, patterned] = [0, 0];
  for (let from = 0; from + WINDOW <= rrMs.length; from += HOP) {
    const rr = rrMs.subarray(from, from + WINDOW);
    looks += 1;
    if (PERIODS.some((period) => repeats(rr, period))) patterned += 1;
  }
  return patterned > 0 && patterned >= LEAST_PATTERNED * looks;
}
