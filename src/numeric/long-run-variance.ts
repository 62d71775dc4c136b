import { cos } from './elementary';
import { mean } from './statistics';

/**
 * Long-run variance of a series in order (n times the variance of its mean, as n grows) from its first `terms` cosines across
 * the whole length (Mueller 2007; Lazarus, Lewis, Stock and Watson 2018): the mean of their squared weights, the slower
 * counting more (`terms` : ... : 2 : 1), since a series that hangs together holds most in the slowest. `terms` is from 1 to
 * n - 1.
 */
export function cosineVariance(values: Float64Array, terms: number): number {
  const n = values.length;
  if (!Number.isInteger(terms) || terms < 1 || terms >= n)
    throw new Error(`${terms} cosines cannot be fitted to ${n} values`);
  const level = mean(values);
  let squares = 0;
  for (let j = 1; j <= terms; j += 1) {
    const step = (Math.PI * j) / n;
    const twice = 2 * cos(step);
    let before = cos(step / 2);
    let now = before;
    let sum = 0;
    for (let i = 0; i < n; i += 1) {
      sum += (values[i] - level) * now;
      const next = twice * now - before;
      before = now;
      now = next;
    }
    squares += (terms + 1 - j) * ((2 * sum * sum) / n);
  }
  return (2 * squares) / (terms * (terms + 1));
}

/** Degrees of freedom of `cosineVariance`: the square of the sum of its weights over the sum of their squares (Welch 1947). */
export const cosineDegrees = (terms: number): number =>
  (3 * terms * (terms + 1)) / (2 * (2 * terms + 1));

/**
 * Long-run variance as the moving-block bootstrap has it (Kuensch 1989): n times the variance that the mean of a replicate
 * has, drawn from blocks of `blockLength` neighbours and cut to n. Exact, without drawing.
 */
export function blockVariance(values: Float64Array, blockLength: number): number {
  const n = values.length;
  const whole = Math.floor(n / blockLength);
  const rest = n - whole * blockLength;
  const places = n - blockLength + 1;
  const all = whole * varianceOfSums(values, blockLength, places);
  return (all + (rest > 0 ? varianceOfSums(values, rest, places) : 0)) / n;
}

/** Variance (with n) of the sums over `length` neighbours, of blocks that begin at the first `places`. */
function varianceOfSums(values: Float64Array, length: number, places: number): number {
  let sum = 0;
  for (let i = 0; i < length; i += 1) sum += values[i];
  const first = sum;
  let [total, squares] = [0, 0];
  for (let k = 0; k < places; k += 1) {
    const off = sum - first;
    total += off;
    squares += off * off;
    if (k + length < values.length) sum += values[k + length] - values[k];
  }
  const centre = total / places;
  return Math.max(0, squares / places - centre * centre);
}
