import { NonPhysicalInputError } from './errors';

/** A pivot below this share of the largest element of its row counts as zero. */
const SINGULAR_SHARE = 1e-14;

/**
 * Solves A x = b for a small dense A by Gaussian elimination with row pivoting.
 * @param matrix A, row by row, n × n; overwritten
 * @param rightHandSide b, n long; becomes x
 * @returns false where A is singular to rounding; b is then of no use
 * @throws NonPhysicalInputError where the sizes do not match
 */
export function solveLinearSystem(matrix: Float64Array, rightHandSide: Float64Array): boolean {
  const n = rightHandSide.length;
  if (matrix.length !== n * n) throw new NonPhysicalInputError('solveLinearSystem', { n, elements: matrix.length });
  const at = (row: number, column: number): number => matrix[row * n + column] as number;
  for (let column = 0; column < n; column++) {
    let pivot = column;
    for (let row = column + 1; row < n; row++) {
      if (Math.abs(at(row, column)) > Math.abs(at(pivot, column))) pivot = row;
    }
    const size = Math.abs(at(pivot, column));
    if (!(size > 0) || size < SINGULAR_SHARE * largestInRow(matrix, n, pivot)) return false;
    if (pivot !== column) swapRows(matrix, rightHandSide, n, pivot, column);
    for (let row = column + 1; row < n; row++) {
      const factor = at(row, column) / at(column, column);
      if (factor === 0) continue;
      const target = row * n;
      const source = column * n;
      for (let k = column + 1; k < n; k++) {
        matrix[target + k] = (matrix[target + k] as number) - factor * (matrix[source + k] as number);
      }
      rightHandSide[row] = (rightHandSide[row] as number) - factor * (rightHandSide[column] as number);
    }
  }
  for (let row = n - 1; row >= 0; row--) {
    let sum = rightHandSide[row] as number;
    for (let k = row + 1; k < n; k++) sum -= at(row, k) * (rightHandSide[k] as number);
    rightHandSide[row] = sum / at(row, row);
  }
  return true;
}

function largestInRow(matrix: Float64Array, n: number, row: number): number {
  let largest = 0;
  for (let k = 0; k < n; k++) largest = Math.max(largest, Math.abs(matrix[row * n + k] as number));
  return largest;
}

function swapRows(matrix: Float64Array, rightHandSide: Float64Array, n: number, a: number, b: number): void {
  for (let k = 0; k < n; k++) {
    const kept = matrix[a * n + k] as number;
    matrix[a * n + k] = matrix[b * n + k] as number;
    matrix[b * n + k] = kept;
  }
  const kept = rightHandSide[a] as number;
  rightHandSide[a] = rightHandSide[b] as number;
  rightHandSide[b] = kept;
}
