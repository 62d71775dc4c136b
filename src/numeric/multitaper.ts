import type { Dpss } from './dpss';
import { powerDensity } from './spectrum';

/**
 * One-sided multitaper density in units^2/Hz (Thomson 1982): the mean of the densities under each
 * taper, weighted by its concentration; bins and scale as powerDensity. x is as long as the tapers
 * and nothing of it is detrended. A line of amplitude A integrates to A^2 / 2 and is spread evenly
 * over twice the half bandwidth. Throws where there is no taper or the lengths do not fit.
 */
export function multitaperDensity(
  x: Float64Array,
  { tapers, concentrations }: Dpss,
  rateHz: number,
  size: number,
): Float64Array {
  if (tapers.length === 0) throw new Error('a multitaper spectrum needs a taper');
  const average = new Float64Array(Math.floor(size / 2) + 1);
  let weights = 0;
  tapers.forEach((taper, k) => {
    const density = powerDensity(x, taper, rateHz, size);
    for (let i = 0; i < average.length; i++) average[i] += concentrations[k] * density[i];
    weights += concentrations[k];
  });
  for (let i = 0; i < average.length; i++) average[i] /= weights;
  return average;
}
