/** Time-domain variability of the intervals that a mask lets in. Fields are NaN where there is too little for them. */
export interface TimeDomain {
  readonly nnCount: number;
  /** Pairs of neighbouring intervals, both let in: they share a beat. */
  readonly pairCount: number;
  readonly nnSeconds: number;
  readonly meanMs: number;
  readonly heartRateBpm: number;
  readonly sdnnMs: number;
  readonly rmssdMs: number;
  readonly sdsdMs: number;
  readonly pnn50Pct: number;
  readonly sd1Ms: number;
  readonly sd2Ms: number;
}

interface Spread {
  readonly count: number;
  readonly sum: number;
  readonly mean: number;
  /** With n - 1; NaN for fewer than two. */
  readonly sd: number;
}

/** Two passes over the values that a list of indexes gives, for a spread without cancellation. */
function spreadOf(count: number, valueAt: (i: number) => number): Spread {
  let sum = 0;
  for (let i = 0; i < count; i += 1) sum += valueAt(i);
  const mean = sum / count;
  let squares = 0;
  for (let i = 0; i < count; i += 1) squares += (valueAt(i) - mean) ** 2;
  return {
    count,
    sum,
    mean,
    sd: count > 1 ? Math.sqrt(squares / (count - 1)) : Number.NaN,
  };
}

function pairFigures(differences: Float64Array) {
  let squares = 0;
  let over50 = 0;
  for (const difference of differences) {
    squares += difference * difference;
    if (Math.abs(difference) > 50 + 1e-9) over50 += 1;
  }
  const count = differences.length;
  return {
    rmssdMs: count > 0 ? Math.sqrt(squares / count) : Number.NaN,
    pnn50Pct: count > 0 ? (100 * over50) / count : Number.NaN,
    sdsdMs: spreadOf(count, (i) => differences[i]).sd,
  };
}

/**
 * Mean, heart rate 60000 / mean, SDNN and SDSD (both n - 1), RMSSD and pNN50 (strictly over 50 ms; intervals made of
 * 1/64 samples are never exact, so a billionth of a millisecond is not "over") over the intervals [first, end) of rrMs
 * whose mask is 1; differences only between neighbours that are both let in (Task Force 1996). SD1 = SDSD / sqrt 2,
 * SD2 = sqrt(2 SDNN^2 - SDSD^2 / 2) (Brennan 2001); SD2 is NaN where the root has no value.
 */
export function timeDomain(
  rrMs: Float64Array,
  mask: Uint8Array,
  first = 0,
  end = rrMs.length,
): TimeDomain {
  const values = new Float64Array(end - first);
  const differences = new Float64Array(end - first);
  let [count, pairs] = [0, 0];
  for (let i = first; i < end; i += 1) {
    if (mask[i] !== 1) continue;
    values[count] = rrMs[i];
    count += 1;
    if (i === first || mask[i - 1] !== 1) continue;
    differences[pairs] = rrMs[i] - rrMs[i - 1];
    pairs += 1;
  }
  const spread = spreadOf(count, (i) => values[i]);
  const pair = pairFigures(differences.subarray(0, pairs));
  return {
    nnCount: count,
    pairCount: pairs,
    nnSeconds: spread.sum / 1000,
    meanMs: spread.mean,
    heartRateBpm: 60000 / spread.mean,
    sdnnMs: spread.sd,
    ...pair,
    sd1Ms: pair.sdsdMs / Math.SQRT2,
    sd2Ms: Math.sqrt(2 * spread.sd ** 2 - pair.sdsdMs ** 2 / 2),
  };
}

/** Width of the histogram's bins for the triangular index: 1/128 s (Task Force 1996). */
export const TRIANGULAR_BIN_MS = 1000 / 128;

/**
 * Triangular index: how many intervals the mask lets in over the count of the fullest bin, bins of 1/128 s from 0 on
 * (Task Force 1996). NaN where there is none.
 */
export function triangularIndex(
  rrMs: Float64Array,
  mask: Uint8Array,
  first = 0,
  end = rrMs.length,
): number {
  const bins = new Map<number, number>();
  let [count, fullest] = [0, 0];
  for (let i = first; i < end; i += 1) {
    if (mask[i] !== 1) continue;
    const bin = Math.floor(rrMs[i] / TRIANGULAR_BIN_MS);
    const held = (bins.get(bin) ?? 0) + 1;
    bins.set(bin, held);
    count += 1;
    if (held > fullest) fullest = held;
  }
  return count / fullest;
}
