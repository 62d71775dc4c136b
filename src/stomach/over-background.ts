import { log } from '../numeric/elementary';
import type { SmoothLevel } from './smooth-level';

/** Bins so far above the line (natural logarithm) are lines, not background. */
const LINE_LOG = 3;
/** Mean of the logarithm of an exponential variable of mean 1 is minus this (Euler's constant). */
const EULER = 0.5772156649015329;

/**
 * Natural logarithm of a window's density over the 1/f^b line through all of it: of noise of that
 * colour exp of it has the mean 1. Bin 0 is 0.
 */
export function overBackground(density: Float64Array, smooth: SmoothLevel): Float64Array {
  const floor = 1e-12 * density.reduce((most, value) => Math.max(most, value), 1e-280);
  const y = density.map((value) => log(Math.max(floor, value)));
  const line = smooth.through(y, 1, LINE_LOG);
  for (let k = 1; k < y.length; k += 1) y[k] -= line[k] + EULER;
  y[0] = 0;
  return y;
}
