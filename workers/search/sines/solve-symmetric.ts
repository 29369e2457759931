/** Below this part of its own diagonal a pivot is rounding error. */
const LEAST_PIVOT = 1e-11;

/**
 * Solves a small symmetric positive definite system by Cholesky's decomposition.
 *
 * @param matrix row by row, n x n; the lower triangle is read and written over
 * @param right length n, becomes the solution
 * @returns false where the matrix is singular to working accuracy
 */
export function solveSymmetric(matrix: Float64Array, right: Float64Array): boolean {
  const n = right.length;
  for (let row = 0; row < n; row += 1) {
    for (let column = 0; column <= row; column += 1) {
      let rest = matrix[n * row + column]!;
      for (let k = 0; k < column; k += 1) rest -= matrix[n * row + k]! * matrix[n * column + k]!;
      if (column < row) matrix[n * row + column] = rest / matrix[n * column + column]!;
      else if (!(rest > LEAST_PIVOT * matrix[n * row + row]!)) return false;
      else matrix[n * row + row] = Math.sqrt(rest);
    }
  }
  for (let row = 0; row < n; row += 1) {
    for (let k = 0; k < row; k += 1) right[row] = right[row]! - matrix[n * row + k]! * right[k]!;
    right[row] = right[row]! / matrix[n * row + row]!;
  }
  for (let row = n - 1; row >= 0; row -= 1) {
    for (let k = row + 1; k < n; k += 1) right[row] = right[row]! - matrix[n * k + row]! * right[k]!;
    right[row] = right[row]! / matrix[n * row + row]!;
  }
  return true;
}
