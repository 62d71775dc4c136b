/** Counts of a comparison beat by beat. */
export interface MatchCounts {
  readonly truePositive: number;
  readonly falseNegative: number;
  readonly falsePositive: number;
}

export interface Matching extends MatchCounts {
  /** Index pairs [reference, detected] in ascending order. */
  readonly pairs: readonly (readonly [number, number])[];
  readonly missed: readonly number[];
  readonly extra: readonly number[];
}

/**
 * Matches detected to reference beats (times in s, ascending) by ANSI/AAMI EC57: within 150 ms, one to one, nearest first.
 */
export function matchBeats(
  reference: ArrayLike<number>,
  detected: ArrayLike<number>,
  windowS = 0.15,
): Matching {
  const near: { r: number; d: number; apart: number }[] = [];
  for (let r = 0, first = 0; r < reference.length; r += 1) {
    while (first < detected.length && detected[first] < reference[r] - windowS - 1e-9) first += 1;
    for (let d = first; d < detected.length && detected[d] <= reference[r] + windowS + 1e-9; d += 1)
      near.push({ r, d, apart: Math.abs(detected[d] - reference[r]) });
  }
  near.sort((a, b) => a.apart - b.apart || a.r - b.r);
  const partner = new Map<number, number>();
  const taken = new Set<number>();
  for (const { r, d } of near) {
    if (partner.has(r) || taken.has(d)) continue;
    partner.set(r, d);
    taken.add(d);
  }
  const missed = Array.from(reference, (_, r) => r).filter((r) => !partner.has(r));
  const extra = Array.from(detected, (_, d) => d).filter((d) => !taken.has(d));
  return {
    pairs: [...partner].sort((a, b) => a[0] - b[0]),
    missed,
    extra,
    truePositive: partner.size,
    falseNegative: missed.length,
    falsePositive: extra.length,
  };
}

/** Sensitivity TP/(TP+FN) in percent; NaN without reference beats. */
export const sensitivity = (c: Omit<MatchCounts, 'falsePositive'>) =>
  (100 * c.truePositive) / (c.truePositive + c.falseNegative);

/** Positive predictivity TP/(TP+FP) in percent; NaN without detections. */
export const positivePredictivity = (c: Omit<MatchCounts, 'falseNegative'>) =>
  (100 * c.truePositive) / (c.truePositive + c.falsePositive);

/** Harmonic mean of the two in percent. */
export const f1 = (c: MatchCounts) =>
  (200 * c.truePositive) / (2 * c.truePositive + c.falseNegative + c.falsePositive);

/** Gross: all records' beats in one pool. Average: every record counts the same. */
export function overRecords(records: readonly Omit<MatchCounts, 'falsePositive'>[]): {
  gross: number;
  average: number;
} {
  const pool = { truePositive: 0, falseNegative: 0 };
  for (const record of records) {
    pool.truePositive += record.truePositive;
    pool.falseNegative += record.falseNegative;
  }
  const average = records.reduce((sum, one) => sum + sensitivity(one), 0) / records.length;
  return { gross: sensitivity(pool), average };
}
