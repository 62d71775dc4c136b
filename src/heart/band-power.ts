import type { Hertz } from '../units/rate';

export type Band = readonly [low: Hertz, high: Hertz];

/**
 * Integral of a density over a band. Value k stands for the cell of one step about firstHz + k stepHz; a cell that lies
 * partly in the band counts by that part, so that neighbouring bands share nothing and lose nothing.
 */
export function bandPower(
  density: ArrayLike<number>,
  firstHz: Hertz,
  stepHz: Hertz,
  [low, high]: Band,
): number {
  let power = 0;
  for (let k = 0; k < density.length; k += 1) {
    const centre = firstHz + k * stepHz;
    const width = Math.min(high, centre + stepHz / 2) - Math.max(low, centre - stepHz / 2);
    if (width > 0) power += density[k] * width;
  }
  return power;
}
