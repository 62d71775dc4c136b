import { firstAtOrAfter } from '../numeric/first-at-or-after';
import { median } from '../numeric/statistics';
import type { BaseColumns } from './base-columns';
import type { Excursion } from './excursions';

/** A complex with its neighbours' shares of a column. */
const LONGEST_S = 0.35;
/** The level before and after is looked at from 0.2 to 0.6 s away. */
const NEAR_S = 0.2;
const FAR_S = 0.6;
/** A beat leaves the level of the lead where it was; so much of its height may be baseline and T wave. */
const RETURNS = 0.6;
/** Beats of a kind differ in height by no more than this (breathing swings it), and there are several. */
const ALIKE = 1.3;
const SEVERAL = 4;

interface Jump extends Excursion {
  /** Height in uV with the sign of its larger side; NaN where it cannot be a beat. */
  readonly heightUv: number;
}

function levelOf(mean: Float64Array, from: number, to: number): number {
  const known = mean
    .subarray(Math.max(0, from), Math.max(0, Math.min(mean.length, to)))
    .filter((value) => !Number.isNaN(value));
  return known.length > 0 ? median(known) : Number.NaN;
}

function measured(found: Excursion, columns: BaseColumns, mean: Float64Array): Jump {
  const { from, to } = found;
  const near = Math.round(NEAR_S / columns.columnS);
  const far = Math.round(FAR_S / columns.columnS);
  const before = levelOf(mean, from - far, from - near);
  const after = levelOf(mean, to + near, to + far);
  const top = Math.max(...columns.high.subarray(from, to));
  const bottom = Math.min(...columns.low.subarray(from, to));
  const height = top - bottom;
  const short = (to - from) * columns.columnS <= LONGEST_S;
  const isBeat = short && Math.abs(after - before) < RETURNS * height;
  const upright = top - before > before - bottom;
  return { from, to, heightUv: isBeat ? (upright ? height : -height) : Number.NaN };
}

/**
 * The jumps that are no beats. Beats of a kind come again: a short jump that leaves the level where it was and has several
 * others of its height is a beat, however high beside the usual ones (a ventricular beat on a lead that sees little of the
 * others). `jumps` holds all jumps worth comparing, `mean` each column's, NaN where it does not count.
 */
export function withoutBeats(
  jumps: readonly Excursion[],
  columns: BaseColumns,
  mean: Float64Array,
): readonly Excursion[] {
  const all = jumps.map((found) => measured(found, columns, mean));
  const heights = Float64Array.from(
    all.flatMap(({ heightUv }) => (Number.isNaN(heightUv) ? [] : [heightUv])),
  ).sort();
  return all.filter(({ heightUv }) => {
    const [a, b] = [heightUv / ALIKE, heightUv * ALIKE];
    const alike = firstAtOrAfter(heights, Math.max(a, b)) - firstAtOrAfter(heights, Math.min(a, b));
    return Number.isNaN(heightUv) || alike < SEVERAL;
  });
}
