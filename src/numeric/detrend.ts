/** A line fitted by least squares: mean and slope per sample about the mean index of the kept. */
export interface Line {
  readonly mean: number;
  readonly slope: number;
  readonly centre: number;
}

/**
 * Fits a line to the samples of x whose weight is not 0 (all, unless weights are given, one a
 * sample). One kept sample gives slope 0, none gives mean 0.
 */
export function fitLine(x: Float64Array, weights?: Uint8Array): Line {
  if (weights && weights.length !== x.length)
    throw new Error(`${weights.length} weights do not fit ${x.length} samples`);
  let count = 0;
  let sum = 0;
  let indexSum = 0;
  for (let i = 0; i < x.length; i++) {
    if (weights && weights[i] === 0) continue;
    count += 1;
    sum += x[i];
    indexSum += i;
  }
  if (count === 0) return { mean: 0, slope: 0, centre: 0 };
  const mean = sum / count;
  const centre = indexSum / count;
  let across = 0;
  let along = 0;
  for (let i = 0; i < x.length; i++) {
    if (weights && weights[i] === 0) continue;
    const offset = i - centre;
    across += offset * (x[i] - mean);
    along += offset * offset;
  }
  return { mean, slope: along > 0 ? across / along : 0, centre };
}

/**
 * x less the line fitted to its kept samples (weight not 0; all unless weights are given);
 * every sample has the line taken off, kept or not.
 */
export function removeLine(x: Float64Array, weights?: Uint8Array): Float64Array {
  const { mean, slope, centre } = fitLine(x, weights);
  const residual = new Float64Array(x.length);
  for (let i = 0; i < x.length; i++) residual[i] = x[i] - mean - slope * (i - centre);
  return residual;
}
