import { sin } from '../numeric/elementary';
import type { Band } from './band-power';

/** RMSSD in ms that the error of the R times alone gives: sqrt 6 times its standard deviation (independent errors). */
export function rmssdFloorMs(timingSdMs: number): number {
  return Math.sqrt(6) * timingSdMs;
}

/**
 * Power in ms^2 that independent errors of the R times of standard deviation timingSdMs give in a band at a mean interval
 * of meanMs. An interval's error is the difference of two, so its one-sided density is 8 s^2 T sin^2(pi f T), whose
 * integral is 4 s^2 (T f - sin(2 pi f T) / (2 pi)), taken up to half the beat rate at most; arithmetic.
 */
export function bandFloorMs2(timingSdMs: number, meanMs: number, [low, high]: Band): number {
  const meanS = meanMs / 1000;
  const upTo = (hz: number) => meanS * hz - sin(2 * Math.PI * hz * meanS) / (2 * Math.PI);
  const top = Math.min(high, 0.5 / meanS);
  return top > low ? 4 * timingSdMs ** 2 * (upTo(top) - upTo(low)) : 0;
}
