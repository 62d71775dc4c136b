import type { Cpm } from '../units/rate';
import { backgroundAt, type Spectrum } from './background';

/** A line fills so much to each side of its place in another window, which may have wandered. */
const NEAR_CPM = 0.2;
/** What a window lends of its own excess over the background, what chance alone would lend, and the most that is lent. */
const SHARE = 0.5;
const CHANCE = 1.5;
const MOST = 4;
const FEWEST_WINDOWS = 2;

/** Mean density about a place over the background of a window there; 1 where it cannot be told. */
function excess({ density, binCpm, lengthS }: Spectrum, cpm: Cpm): number {
  const background = backgroundAt(density, binCpm, cpm, lengthS);
  if (!background) return 1;
  const from = Math.ceil((cpm - NEAR_CPM) / binCpm);
  const to = Math.floor((cpm + NEAR_CPM) / binCpm);
  let sum = 0;
  for (let k = from; k <= to; k += 1) sum += density[k];
  return sum / Math.max(1, to - from + 1) / background.density;
}

/**
 * What independent windows beside an epoch lend to a peak of it, as a multiple of the background: half of what stands there
 * above it, less what chance lends, at most four times. A steady weak wave stands in all of them at one place, noise does
 * not; an epoch whose own peak is no more than twice the background is never lifted.
 */
export function lentSupport(beside: readonly Spectrum[], cpm: Cpm): number {
  if (beside.length < FEWEST_WINDOWS) return 0;
  const above = beside.reduce((sum, one) => sum + excess(one, cpm) - 1, 0);
  return Math.min(MOST, Math.max(0, SHARE * above - CHANCE));
}
