import type { Hertz } from '../units/rate';

/** The level on either side of a hole is the mean of so much. */
const EDGE_S = 1;

/**
 * x with a straight line across each stretch that is not kept, from the mean of the second before it
 * to that of the second after it; a stretch at an end goes on level.
 */
export function bridged(x: Float64Array, kept: Uint8Array, rateHz: Hertz): Float64Array {
  const out = Float64Array.from(x);
  const reach = Math.max(1, Math.round(EDGE_S * rateHz));
  const edge = (from: number, step: 1 | -1): number | null => {
    let [sum, count] = [0, 0];
    for (let i = from; kept[i] === 1 && count < reach; i += step) {
      sum += x[i];
      count += 1;
    }
    return count > 0 ? sum / count : null;
  };
  for (let from = 0; from < x.length; from += 1) {
    if (kept[from] === 1) continue;
    let to = from;
    while (to < x.length && kept[to] !== 1) to += 1;
    const [before, after] = [edge(from - 1, -1), edge(to, 1)];
    const first = before ?? after ?? 0;
    const last = after ?? first;
    const steps = to - from + 1;
    for (let i = from; i < to; i += 1) out[i] = first + ((last - first) * (i - from + 1)) / steps;
    from = to;
  }
  return out;
}
