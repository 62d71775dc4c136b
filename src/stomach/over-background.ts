import { exp, log } from '../numeric/elementary';
import { EULER, type SmoothLevel } from './smooth-level';

/** Bins so far above the line (natural logarithm) are lines, not background. */
const LINE_LOG = 3;

/** A window's density over its own background line, by bin; bin 0 says nothing. */
export interface OverBackground {
  /** Noise of a colour that the line follows has the mean 1. */
  readonly times: Float64Array;
  /** Its natural logarithm. */
  readonly log: Float64Array;
}

/** A window's density over the 1/f^b line through all of it (least squares of logarithms). */
export function overBackground(density: Float64Array, smooth: SmoothLevel): OverBackground {
  const floor = 1e-12 * density.reduce((most, value) => Math.max(most, value), 1e-280);
  const over = density.map((value) => log(Math.max(floor, value)));
  const line = smooth.through(over, 1, LINE_LOG);
  over[0] = 0;
  for (let k = 1; k < over.length; k += 1) over[k] -= line[k] + EULER;
  return { log: over, times: over.map(exp) };
}
