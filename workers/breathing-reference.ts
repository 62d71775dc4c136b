import type { BreathingSeries } from '../src/recording/heart-series';
import type { Cpm, Hertz } from '../src/units/rate';
import type { BeatHeights } from './pipeline-results';
import { identity } from './remember';

/** Longest time between two values across which a reference goes on by a straight line. */
const LONGEST_S = 3;

/** A course through values at ascending times, by straight lines, on an even grid; NaN where values lie too far apart. */
function onGrid(
  timesS: Float64Array,
  values: Float64Array,
  rateHz: Hertz,
  length: number,
): Float64Array {
  const out = new Float64Array(length).fill(Number.NaN);
  let next = 0;
  for (let i = 0; i < length; i += 1) {
    const timeS = i / rateHz;
    while (next < timesS.length && timesS[next] <= timeS) next += 1;
    if (next === 0 || next === timesS.length) continue;
    const [from, to] = [timesS[next - 1], timesS[next]];
    if (to - from > LONGEST_S) continue;
    const part = (timeS - from) / (to - from);
    out[i] = values[next - 1] + part * (values[next] - values[next - 1]);
  }
  return out;
}

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
  if (breath) {
    const timesS = breath.samples.map((_, i) => i / breath.rateHz);
    return onGrid(timesS, breath.samples, rateHz, length);
  }
  if (!heights) return null;
  const isThere = (_: number, i: number) => !Number.isNaN(heights.heightsUv[i]);
  return onGrid(heights.timesS.filter(isThere), heights.heightsUv.filter(isThere), rateHz, length);
}

/** Breathing in more windows than this below the band's upper limit lies inside it. */
const FEW_WINDOWS = 3;

/** Whether breathing, where its rate is known, comes to lie inside the band of the drawn wave. */
export function breathesWithin(breathing: BreathingSeries | null, highCpm: Cpm): boolean {
  if (!breathing) return false;
  return breathing.perMinute.filter((rate) => rate < highCpm).length > FEW_WINDOWS;
}
