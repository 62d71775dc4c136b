import { pow } from './elementary';

/**
 * The coherence that unrelated Gaussian signals stay under with a probability of 1 - falseAlarm when it is averaged over so
 * many independent segments, 1 - falseAlarm^(1 / (averages - 1)) (Carter, Knapp & Nuttall 1973). `averages` need not be
 * whole; 1 where it is 1 or less, since the coherence of one segment alone is always 1.
 */
export function coherenceLevel(averages: number, falseAlarm: number): number {
  return averages > 1 ? 1 - pow(falseAlarm, 1 / (averages - 1)) : 1;
}

/**
 * Standard deviation in radians of a cross-spectrum's phase, sqrt((1 - c) / (2 c averages)) for a coherence c above 0 over so
 * many independent segments (Bendat & Piersol 1980); good where it comes out small.
 */
export function crossPhaseSd(coherence: number, averages: number): number {
  return Math.sqrt((1 - coherence) / (2 * coherence * averages));
}
