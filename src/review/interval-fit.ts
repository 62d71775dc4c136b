/** Share of the neighbours' median by which an interval may differ and still fit. */
export const FIT_TOLERANCE = 0.2;
const NEIGHBOURS = 3;

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
}

/**
 * Whether interval `index` of a row of RR intervals (ms) differs by at most 20 % from the median of its neighbours, up to
 * three on each side. True where it has none. The limit is common practice, without one source.
 */
export function intervalFits(rrMs: ArrayLike<number>, index: number): boolean {
  const neighbours: number[] = [];
  const last = Math.min(rrMs.length - 1, index + NEIGHBOURS);
  for (let i = Math.max(0, index - NEIGHBOURS); i <= last; i += 1)
    if (i !== index && Number.isFinite(rrMs[i])) neighbours.push(rrMs[i]);
  if (neighbours.length === 0) return true;
  const usual = median(neighbours);
  return Math.abs(rrMs[index] - usual) <= FIT_TOLERANCE * usual;
}
