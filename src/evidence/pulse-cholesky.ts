/**
 * Cholesky's factorisation of the small dense matrices of a least-squares fit. Matrices are n × n, row-major; only the lower
 * triangle is read.
 */

/**
 * A = L·Lᵀ in place: L takes the lower triangle. False where A is not positive definite to working precision; A is then spoilt.
 * Backward stable without pivoting (N. J. Higham, Accuracy and Stability of Numerical Algorithms, 2nd ed., ch. 10).
 */
export function factorise(matrix: Float64Array, n: number): boolean {
  for (let i = 0; i < n; i++) {
    const rowI = i * n;
    for (let j = 0; j <= i; j++) {
      const rowJ = j * n;
      let sum = matrix[rowI + j]!;
      for (let k = 0; k < j; k++) sum -= matrix[rowI + k]! * matrix[rowJ + k]!;
      if (j < i) matrix[rowI + j] = sum / matrix[rowJ + j]!;
      else if (sum > 0) matrix[rowI + i] = Math.sqrt(sum);
      else return false;
    }
  }
  return true;
}

/** Solves A·x = b by A's factor; b becomes x. */
export function solveFactorised(factor: Float64Array, n: number, vector: Float64Array): void {
  for (let i = 0; i < n; i++) {
    let sum = vector[i]!;
    for (let k = 0; k < i; k++) sum -= factor[i * n + k]! * vector[k]!;
    vector[i] = sum / factor[i * n + i]!;
  }
  for (let i = n - 1; i >= 0; i--) {
    let sum = vector[i]!;
    for (let k = i + 1; k < n; k++) sum -= factor[k * n + i]! * vector[k]!;
    vector[i] = sum / factor[i * n + i]!;
  }
}

/** ln det A from its factor. */
export function logDeterminant(factor: Float64Array, n: number): number {
  let sum = 0;
  for (let i = 0; i < n; i++) sum += 2 * Math.log(factor[i * n + i]!);
  return sum;
}

/** A⁻¹ from its factor, both triangles. */
export function inverse(factor: Float64Array, n: number): Float64Array {
  const result = new Float64Array(n * n);
  const column = new Float64Array(n);
  for (let j = 0; j < n; j++) {
    column.fill(0);
    column[j] = 1;
    solveFactorised(factor, n, column);
    result.set(column, j * n); // symmetric: its column is its row
  }
  return result;
}
