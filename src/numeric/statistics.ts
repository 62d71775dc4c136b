/** Arithmetic mean; NaN of nothing. */
export function mean(x: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < x.length; i++) sum += x[i];
  return sum / x.length;
}

/** Variance with n - 1, about the mean; NaN for fewer than two values. */
export function variance(x: ArrayLike<number>): number {
  if (x.length < 2) return Number.NaN;
  const centre = mean(x);
  let squares = 0;
  for (let i = 0; i < x.length; i++) squares += (x[i] - centre) ** 2;
  return squares / (x.length - 1);
}

/** Standard deviation with n - 1; NaN for fewer than two values. */
export function standardDeviation(x: ArrayLike<number>): number {
  return Math.sqrt(variance(x));
}

/** Moves the k-th smallest of x[0..length) to place k, smaller ones before it (Hoare 1961). */
function selectInPlace(x: Float64Array, k: number, length: number): number {
  let left = 0;
  let right = length - 1;
  while (left < right) {
    const pivot = x[(left + right) >> 1];
    let i = left;
    let j = right;
    while (i <= j) {
      while (x[i] < pivot) i++;
      while (x[j] > pivot) j--;
      if (i <= j) {
        const held = x[i];
        x[i] = x[j];
        x[j] = held;
        i++;
        j--;
      }
    }
    if (k <= j) right = j;
    else if (k >= i) left = i;
    else break;
  }
  return x[k];
}

/**
 * Quantile q (0 to 1) of the first `length` values of x, linear between neighbours (type 7 of
 * Hyndman & Fan 1996, numpy's default), in linear time. Reorders x and allocates nothing; NaN
 * where there is no value. The values must be numbers, none of them NaN.
 */
export function quantileInPlace(x: Float64Array, q: number, length = x.length): number {
  if (length === 0) return Number.NaN;
  const at = q * (length - 1);
  const whole = Math.floor(at);
  const low = selectInPlace(x, whole, length);
  if (whole === at) return low;
  let next = x[whole + 1];
  for (let i = whole + 2; i < length; i++) if (x[i] < next) next = x[i];
  return low + (at - whole) * (next - low);
}

/** Median of the first `length` values; reorders x and allocates nothing. */
export function medianInPlace(x: Float64Array, length = x.length): number {
  return quantileInPlace(x, 0.5, length);
}

/** Median; NaN of nothing. x stays as it is. */
export function median(x: ArrayLike<number>): number {
  return medianInPlace(Float64Array.from(x));
}

/** Quantile q (0 to 1), linear between neighbours as numpy's default; NaN of nothing. */
export function quantile(x: ArrayLike<number>, q: number): number {
  if (!(q >= 0 && q <= 1)) throw new Error(`a quantile lies in 0 to 1, not at ${q}`);
  return quantileInPlace(Float64Array.from(x), q);
}

/** Median of the distances from the median, without a factor for normal spread. */
export function medianAbsoluteDeviation(x: ArrayLike<number>): number {
  const values = Float64Array.from(x);
  const centre = medianInPlace(values);
  for (let i = 0; i < values.length; i++) values[i] = Math.abs(values[i] - centre);
  return medianInPlace(values);
}

/** Two-sided 95 % point of the normal distribution. */
const Z95 = 1.959963984540054;

/**
 * Wilson's interval (Wilson 1927) for a share of `successes` in n (n above 0, whole or not);
 * 95 % unless z is given.
 */
export function wilson(successes: number, n: number, z = Z95): { low: number; high: number } {
  if (!(n > 0) || !(successes >= 0 && successes <= n))
    throw new Error(`${successes} of ${n} is no share`);
  const share = successes / n;
  const square = z * z;
  const centre = share + square / (2 * n);
  const spread = z * Math.sqrt((share * (1 - share)) / n + square / (4 * n * n));
  const below = (centre - spread) / (1 + square / n);
  const above = (centre + spread) / (1 + square / n);
  return { low: Math.max(0, below), high: Math.min(1, above) };
}
