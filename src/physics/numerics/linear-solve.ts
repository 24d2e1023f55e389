/**
 * Solves A·x = b for a small dense A (row-major, n × n) by Gaussian elimination with partial pivoting; b becomes x and A is
 * destroyed. False where A is singular to working precision or not finite.
 */
export function solveInPlace(matrix: Float64Array, vector: Float64Array): boolean {
  const n = vector.length;
  for (let column = 0; column < n; column++) {
    let pivot = column;
    for (let row = column + 1; row < n; row++) {
      if (Math.abs(matrix[row * n + column]!) > Math.abs(matrix[pivot * n + column]!)) pivot = row;
    }
    const divisor = matrix[pivot * n + column]!;
    if (divisor === 0 || !Number.isFinite(divisor)) return false;
    if (pivot !== column) swapRows(matrix, vector, pivot, column);
    for (let row = column + 1; row < n; row++) {
      const factor = matrix[row * n + column]! / divisor;
      if (factor === 0) continue;
      for (let k = column + 1; k < n; k++) matrix[row * n + k]! -= factor * matrix[column * n + k]!;
      vector[row]! -= factor * vector[column]!;
    }
  }
  for (let row = n - 1; row >= 0; row--) {
    let sum = vector[row]!;
    for (let k = row + 1; k < n; k++) sum -= matrix[row * n + k]! * vector[k]!;
    vector[row] = sum / matrix[row * n + row]!;
  }
  return true;
}

function swapRows(matrix: Float64Array, vector: Float64Array, a: number, b: number): void {
  const n = vector.length;
  for (let k = 0; k < n; k++) {
    [matrix[a * n + k], matrix[b * n + k]] = [matrix[b * n + k]!, matrix[a * n + k]!];
  }
  [vector[a], vector[b]] = [vector[b]!, vector[a]!];
}
