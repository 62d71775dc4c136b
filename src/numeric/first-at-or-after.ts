/** Index of the first of `count` ascending values that is at or above `wanted`; `count` where none is. O(log n). */
export function firstAtOrAfter(
  ascending: ArrayLike<number>,
  wanted: number,
  count = ascending.length,
): number {
  let low = 0;
  let high = count;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (ascending[middle] < wanted) low = middle + 1;
    else high = middle;
  }
  return low;
}
