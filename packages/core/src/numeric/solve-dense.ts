/**
 * Solves `matrix · x = rhs` in place for a small dense system; allocates nothing.
 *
 * Gaussian elimination with partial pivoting (G. H. Golub, C. F. Van Loan, Matrix Computations, 4th ed.,
 * 2013, algorithm 3.4.1): backward stable, size³/3 multiplications. Meant for up to a dozen or so unknowns.
 *
 * @param matrix - `size`² coefficients, row by row; overwritten
 * @param rhs - `size` values; holds the solution afterwards
 * @returns `false` where a pivot vanishes or the solution is not finite; `rhs` is then of no use. A matrix
 *   that is singular but for rounding may still pass, with a huge solution.
 */
export function solveDense(matrix: Float64Array, rhs: Float64Array, size: number): boolean {
  for (let column = 0; column < size; column++) {
    const pivotRow = largestBelow(matrix, column, size);
    if (pivotRow !== column) swapRows(matrix, rhs, column, pivotRow, size);
    const top = column * size;
    const pivot = matrix[top + column]!;
    if (pivot === 0) return false;
    for (let row = column + 1; row < size; row++) {
      const start = row * size;
      const factor = matrix[start + column]! / pivot;
      if (factor === 0) continue;
      for (let i = column + 1; i < size; i++) matrix[start + i]! -= factor * matrix[top + i]!;
      rhs[row]! -= factor * rhs[column]!;
    }
  }
  for (let row = size - 1; row >= 0; row--) {
    const start = row * size;
    let value = rhs[row]!;
    for (let i = row + 1; i < size; i++) value -= matrix[start + i]! * rhs[i]!;
    value /= matrix[start + row]!;
    if (!Number.isFinite(value)) return false;
    rhs[row] = value;
  }
  return true;
}

/** Row, from the diagonal down, with the largest magnitude in the column. */
function largestBelow(matrix: Float64Array, column: number, size: number): number {
  let largest = column;
  let magnitude = Math.abs(matrix[column * size + column]!);
  for (let row = column + 1; row < size; row++) {
    const other = Math.abs(matrix[row * size + column]!);
    if (other > magnitude) {
      magnitude = other;
      largest = row;
    }
  }
  return largest;
}

/** Swaps two rows from the pivot column on; what lies left of it is no longer needed. */
function swapRows(matrix: Float64Array, rhs: Float64Array, upper: number, lower: number, size: number): void {
  for (let i = upper; i < size; i++) {
    const kept = matrix[upper * size + i]!;
    matrix[upper * size + i] = matrix[lower * size + i]!;
    matrix[lower * size + i] = kept;
  }
  const kept = rhs[upper]!;
  rhs[upper] = rhs[lower]!;
  rhs[lower] = kept;
}
