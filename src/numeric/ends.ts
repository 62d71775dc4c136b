/** What a signal counts as before its start and after its end. */
export type Ends = 'zero' | 'hold' | 'reflect-odd';

/**
 * The value a signal of n samples has at index i, also outside 0..n-1: 0, its end value, or itself
 * turned about its end values again and again ('reflect-odd'). 0 where n is 0.
 */
export function extendedAt(x: Float64Array, i: number, ends: Ends): number {
  const n = x.length;
  if (i >= 0 && i < n) return x[i];
  if (ends === 'zero' || n === 0) return 0;
  if (ends === 'hold' || n === 1) return i < 0 ? x[0] : x[n - 1];
  if (i < 0 && -i < n) return 2 * x[0] - x[-i];
  const period = 2 * (n - 1);
  if (i >= n && i <= period) return 2 * x[n - 1] - x[period - i];
  const turns = Math.floor(i / period);
  const within = i - turns * period;
  const rise = 2 * turns * (x[n - 1] - x[0]);
  return rise + (within < n ? x[within] : 2 * x[n - 1] - x[period - within]);
}

/** x with `before` samples put ahead of it and `after` behind it, as `ends` says. */
export function extend(x: Float64Array, before: number, after: number, ends: Ends): Float64Array {
  const out = new Float64Array(before + x.length + after);
  for (let i = 0; i < before; i++) out[i] = extendedAt(x, i - before, ends);
  out.set(x, before);
  for (let i = 0; i < after; i++) out[before + x.length + i] = extendedAt(x, x.length + i, ends);
  return out;
}
