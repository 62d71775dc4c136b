/**
 * Greatest less least value in a window of `width` columns about each column (whole windows about the middle; what is
 * there at the ends), from the columns' own least and greatest values; NaN columns are left out, a window of NaN is NaN.
 * Monotonic queues, O(n) (Lemire 2006).
 */
export function slidingRange(
  low: ArrayLike<number>,
  high: ArrayLike<number>,
  width: number,
): Float64Array {
  const n = low.length;
  const before = Math.floor(width / 2);
  const after = width - 1 - before;
  const lows = new Int32Array(n);
  const highs = new Int32Array(n);
  let [lowFrom, lowTo, highFrom, highTo] = [0, 0, 0, 0];
  const range = new Float64Array(n);
  for (let i = 0; i < n + after; i += 1) {
    if (i < n && !Number.isNaN(low[i])) {
      while (lowTo > lowFrom && low[lows[lowTo - 1]] >= low[i]) lowTo -= 1;
      lows[lowTo] = i;
      lowTo += 1;
      while (highTo > highFrom && high[highs[highTo - 1]] <= high[i]) highTo -= 1;
      highs[highTo] = i;
      highTo += 1;
    }
    const at = i - after;
    if (at < 0) continue;
    while (lowFrom < lowTo && lows[lowFrom] < at - before) lowFrom += 1;
    while (highFrom < highTo && highs[highFrom] < at - before) highFrom += 1;
    range[at] = lowFrom < lowTo ? high[highs[highFrom]] - low[lows[lowFrom]] : Number.NaN;
  }
  return range;
}
