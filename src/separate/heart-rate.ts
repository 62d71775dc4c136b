import type { Hertz } from '../units/rate';

const LEAST_HEART_RATE_HZ = 250;

/** The largest whole number by which a rate can be divided and stay at 250 Hz or more; 1 below 500 Hz. */
export function heartDecimation(rateHz: Hertz): number {
  return Math.max(1, Math.floor(rateHz / LEAST_HEART_RATE_HZ + 1e-9));
}
