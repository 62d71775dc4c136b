/**
 * The only source in the project of functions whose last bit differs between engines.
 * They are made of arithmetic alone (@stdlib), so Node and browsers give the same digits.
 */
import atan2 from '@stdlib/math-base-special-atan2';
import cos from '@stdlib/math-base-special-cos';
import exp from '@stdlib/math-base-special-exp';
import log from '@stdlib/math-base-special-ln';
import pow from '@stdlib/math-base-special-pow';
import sin from '@stdlib/math-base-special-sin';

export { atan2, cos, exp, log, pow, sin };

/** Logarithm to base 10, as ln(x)/ln(10); NaN below 0, -Infinity at 0. */
export function log10(x: number): number {
  return log(x) / Math.LN10;
}

/** sin(pi x)/(pi x), 1 at x = 0. */
export function sinc(x: number): number {
  if (x === 0) return 1;
  const angle = Math.PI * x;
  return sin(angle) / angle;
}
