/**
 * Solves A x = b for a symmetric positive definite matrix and several right-hand sides, by Cholesky's factorisation (Benoit
 * 1924). `matrix` holds n x n numbers row by row, of which the lower triangle is read; it is overwritten by the factor, each
 * of `sides` (n numbers) by its solution. n^3 / 6 multiplications. Throws where a pivot is not above 0.
 */
export function choleskySolve(
  matrix: Float64Array,
  n: number,
  sides: readonly Float64Array[],
): void {
  for (let i = 0; i < n; i += 1) {
    const row = i * n;
    for (let j = 0; j <= i; j += 1) {
      const other = j * n;
      let sum = matrix[row + j];
      for (let k = 0; k < j; k += 1) sum -= matrix[row + k] * matrix[other + k];
      if (j < i) matrix[row + j] = sum / matrix[other + j];
      else if (sum > 0) matrix[row + i] = Math.sqrt(sum);
      else throw new Error(`the matrix is not positive definite: pivot ${i} is ${sum}`);
    }
  }
  for (const x of sides) {
    for (let i = 0; i < n; i += 1) {
      let sum = x[i];
      for (let k = 0; k < i; k += 1) sum -= matrix[i * n + k] * x[k];
      x[i] = sum / matrix[i * n + i];
    }
    for (let i = n - 1; i >= 0; i -= 1) {
      let sum = x[i];
      for (let k = i + 1; k < n; k += 1) sum -= matrix[k * n + i] * x[k];
      x[i] = sum / matrix[i * n + i];
    }
  }
}
