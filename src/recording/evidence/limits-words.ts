import type { LimitsRange } from './ranges';

/** "73 under 1-2-4-9 cpm, epochs of 4 min; 81 under ..."; empty where limits change nothing. */
export function byWords({ low, high, lowBy, highBy }: LimitsRange, decimals: number): string {
  const [least, most] = [low, high].map((value) => value.toFixed(decimals));
  return least === most ? '' : `${least} under ${lowBy}; ${most} under ${highBy}`;
}
