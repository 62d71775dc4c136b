import type { Hertz } from './rate';
import type { Seconds } from './time';

/** Beats are kept in whole ticks, 1/64 of a sample of the heart lead's own rate. */
export const TICKS_PER_SAMPLE = 64;

export const ticksToSeconds = (ticks: number, rateHz: Hertz): Seconds =>
  ticks / (TICKS_PER_SAMPLE * rateHz);
export const secondsToTicks = (seconds: Seconds, rateHz: Hertz): number =>
  Math.round(seconds * TICKS_PER_SAMPLE * rateHz);
