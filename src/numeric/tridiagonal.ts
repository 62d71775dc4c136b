/** A symmetric tridiagonal matrix: `main` its diagonal, `beside[i]` between rows i and i + 1, none 0. */
export interface Tridiagonal {
  readonly main: Float64Array;
  readonly beside: Float64Array;
}

/** Rounds of inverse iteration; each takes the error down by the gap over the eigenvalue's own error. */
const ROUNDS = 3;

/** How many eigenvalues lie above `level`, by the signs of the pivots (Sturm; Givens 1954). */
function countAbove({ main, beside }: Tridiagonal, level: number): number {
  let count = 0;
  let pivot = 1;
  for (let i = 0; i < main.length; i++) {
    const before = i === 0 ? 0 : beside[i - 1];
    pivot = main[i] - level - (before * before) / pivot;
    if (pivot === 0) pivot = -Number.MIN_VALUE;
    if (pivot > 0) count += 1;
  }
  return count;
}

/** An interval that holds every eigenvalue (Gershgorin 1931). */
function boundsOf({ main, beside }: Tridiagonal): { low: number; high: number } {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < main.length; i++) {
    const around = Math.abs(beside[i - 1] ?? 0) + Math.abs(beside[i] ?? 0);
    low = Math.min(low, main[i] - around);
    high = Math.max(high, main[i] + around);
  }
  return { low, high };
}

/**
 * The `count` largest eigenvalues, descending, by bisection to the last bit.
 * O(length) a step, some 60 steps an eigenvalue. Throws where there are not so many.
 */
export function largestEigenvalues(matrix: Tridiagonal, count: number): Float64Array {
  if (!Number.isInteger(count) || count < 0 || count > matrix.main.length)
    throw new Error(`no ${count} eigenvalues of a matrix of ${matrix.main.length} rows`);
  const bounds = boundsOf(matrix);
  const values = new Float64Array(count);
  for (let k = 0; k < count; k++) {
    let [low, high] = [bounds.low, bounds.high];
    for (;;) {
      const middle = low + (high - low) / 2;
      if (!(middle > low && middle < high)) break;
      if (countAbove(matrix, middle) > k) low = middle;
      else high = middle;
    }
    values[k] = low;
  }
  return values;
}

/** Solves (matrix - shift) x = right in place, rows exchanged where that keeps factors below 1. */
function solveShifted({ main, beside }: Tridiagonal, shift: number, right: Float64Array): void {
  const n = main.length;
  const [pivots, first, second] = [0, 1, 2].map(() => new Float64Array(n));
  let pivot = main[0] - shift;
  let next = beside[0] ?? 0;
  for (let i = 0; i + 1 < n; i++) {
    const below = beside[i];
    const belowMain = main[i + 1] - shift;
    const belowNext = beside[i + 1] ?? 0;
    const exchanged = Math.abs(pivot) < Math.abs(below);
    const factor = exchanged ? pivot / below : below / pivot;
    pivots[i] = exchanged ? below : pivot;
    first[i] = exchanged ? belowMain : next;
    second[i] = exchanged ? belowNext : 0;
    pivot = exchanged ? next - factor * belowMain : belowMain - factor * next;
    next = exchanged ? -factor * belowNext : belowNext;
    const upper = exchanged ? right[i + 1] : right[i];
    right[i + 1] = (exchanged ? right[i] : right[i + 1]) - factor * upper;
    right[i] = upper;
  }
  const smallest = Number.EPSILON * (Math.abs(shift) || 1);
  pivots[n - 1] = Math.abs(pivot) < smallest ? smallest : pivot;
  for (let i = n - 1; i >= 0; i--) {
    const later = first[i] * (right[i + 1] ?? 0) + second[i] * (right[i + 2] ?? 0);
    right[i] = (right[i] - later) / pivots[i];
  }
}

/**
 * The eigenvector of an eigenvalue that is known to the last bits, of unit length and either sign,
 * by inverse iteration (Wielandt 1944). The eigenvalue must be clear of the others.
 */
export function eigenvectorOf(matrix: Tridiagonal, eigenvalue: number): Float64Array {
  const n = matrix.main.length;
  const vector = Float64Array.from({ length: n }, (_, i) => 1 + i / n);
  for (let round = 0; round < ROUNDS; round++) {
    solveShifted(matrix, eigenvalue, vector);
    let largest = 0;
    for (let i = 0; i < n; i++) largest = Math.max(largest, Math.abs(vector[i]));
    let squares = 0;
    for (let i = 0; i < n; i++) {
      vector[i] /= largest;
      squares += vector[i] * vector[i];
    }
    const size = Math.sqrt(squares);
    for (let i = 0; i < n; i++) vector[i] /= size;
  }
  return vector;
}
