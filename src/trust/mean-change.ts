/** Change from the mean of one half of the latest samples to that of the other, kept up as they come. */
export interface Change {
  readonly latest: Float64Array;
  at: number;
  sum: number;
}

/** No change yet; each half holds so many samples. */
export const createChange = (half: number): Change => ({
  latest: new Float64Array(2 * half).fill(Number.NaN),
  at: 0,
  sum: Number.NaN,
});

/** The change with the next sample; 0 while samples are missing. */
export function nextChange(change: Change, value: number): number {
  const { latest } = change;
  const half = latest.length / 2;
  if (Number.isNaN(value) || Number.isNaN(change.sum)) {
    latest.fill(value);
    change.sum = Number.isNaN(value) ? Number.NaN : 0;
    return 0;
  }
  const { at } = change;
  change.sum += value - 2 * latest[at < half ? at + half : at - half] + latest[at];
  latest[at] = value;
  change.at = at + 1 === latest.length ? 0 : at + 1;
  return change.sum / half;
}
