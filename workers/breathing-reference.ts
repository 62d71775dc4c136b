import { onGrid } from '../src/numeric/on-grid';
import type { BreathingSeries } from '../src/recording/heart-series';
import type { Cpm, Hertz } from '../src/units/rate';
import type { BeatHeights } from './pipeline-results';
import { identity } from './remember';

/** Longest time between two values across which a reference goes on by a straight line. */
const LONGEST_S = 3;

/** What a reference for breathing is made of: the breathing lead, else the heights of the beats. */
export interface ReferenceInputs {
  readonly breath: { readonly samples: Float64Array; readonly rateHz: Hertz } | null;
  readonly heights: BeatHeights | null;
  /** The slow wave's grid. */
  readonly rateHz: Hertz;
  readonly length: number;
}

export const referenceKey = ({ breath, heights, rateHz, length }: ReferenceInputs): string =>
  JSON.stringify([identity(breath?.samples ?? null), identity(heights), rateHz, length]);

/** A reference for breathing on the slow wave's grid, NaN where it is not known (R heights: Moody 1985); null of nothing. */
export function breathingReference(from: ReferenceInputs): Float64Array | null {
  const { breath, heights, rateHz, length } = from;
  const grid = { firstS: 0, rateHz, length };
  if (breath) {
    const timesS = breath.samples.map((_, i) => i / breath.rateHz);
    return onGrid(timesS, breath.samples, grid, LONGEST_S);
  }
  if (!heights) return null;
  const isThere = (_: number, i: number) => !Number.isNaN(heights.heightsUv[i]);
  return onGrid(heights.timesS.filter(isThere), heights.heightsUv.filter(isThere), grid, LONGEST_S);
}

/** Breathing in more windows than this below the band's upper limit lies inside it. */
const FEW_WINDOWS = 3;

/** Whether breathing, where its rate is known, comes to lie inside the band of the drawn wave. */
export function breathesWithin(breathing: BreathingSeries | null, highCpm: Cpm): boolean {
  if (!breathing) return false;
  return breathing.perMinute.filter((rate) => rate < highCpm).length > FEW_WINDOWS;
}
