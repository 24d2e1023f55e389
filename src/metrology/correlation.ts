import { InvalidQuantity } from '../physics/invalid-quantity.ts';

/** How far below zero rounding may take a pivot of a printed correlation matrix that is singular. */
const PIVOT_TOLERANCE = 1e-9;

/**
 * Refuses what cannot be a correlation matrix of `size` inputs: not square, not symmetric, a diagonal other than 1, an
 * entry outside [−1, 1], or not positive semidefinite. Pointers are relative to the matrix ('/0/1'; '' for the whole).
 */
export function requireCorrelationMatrix(matrix: readonly (readonly number[])[], size: number): void {
  if (matrix.length !== size || matrix.some((row) => row.length !== size)) {
    throw new InvalidQuantity('', `must be a ${size} by ${size} matrix`);
  }
  for (let i = 0; i < size; i++) {
    for (let j = 0; j < size; j++) {
      const r = matrix[i]![j]!;
      if (i === j && r !== 1) throw new InvalidQuantity(`/${i}/${j}`, 'an input correlates with itself by 1');
      if (!(Math.abs(r) <= 1)) throw new InvalidQuantity(`/${i}/${j}`, 'must lie between −1 and 1');
      if (r !== matrix[j]![i]) throw new InvalidQuantity(`/${i}/${j}`, 'must be symmetric');
    }
  }
  requirePositiveSemidefinite(matrix);
}

/** Gaussian elimination without pivoting: of a positive semidefinite matrix no pivot is negative. */
function requirePositiveSemidefinite(matrix: readonly (readonly number[])[]): void {
  const rest = matrix.map((row) => row.slice());
  for (let k = 0; k < rest.length; k++) {
    const pivot = rest[k]![k]!;
    const column = rest.map((row) => row[k]!);
    const contradicts = pivot <= PIVOT_TOLERANCE && column.slice(k + 1).some((entry) => Math.abs(entry) > 1e-4);
    if (pivot < -PIVOT_TOLERANCE || contradicts) {
      throw new InvalidQuantity(
        '',
        'these correlations contradict each other: the matrix is not positive semidefinite',
      );
    }
    if (pivot <= PIVOT_TOLERANCE) continue;
    for (let i = k + 1; i < rest.length; i++) {
      for (let j = k + 1; j < rest.length; j++) rest[i]![j]! -= (column[i]! * column[j]!) / pivot;
    }
  }
}
