import { describe, expect, it } from 'vitest';
import { solveInPlace } from '../../../src/physics/numerics/linear-solve.ts';

describe('a small linear system', () => {
  it('is solved with pivoting', () => {
    // The first pivot is zero; solution (1, −2, 3).
    const matrix = new Float64Array([0, 2, 1, 1, -1, 4, 3, 5, -2]);
    const vector = new Float64Array([-1, 15, -13]);
    expect(solveInPlace(matrix, vector)).toBe(true);
    [1, -2, 3].forEach((value, k) => {
      expect(Math.abs(vector[k]! - value)).toBeLessThan(1e-14);
    });
  });

  it('says that a singular one has no solution', () => {
    expect(solveInPlace(new Float64Array([1, 2, 2, 4]), new Float64Array([1, 1]))).toBe(false);
    expect(solveInPlace(new Float64Array([Number.NaN, 2, 2, 4]), new Float64Array([1, 1]))).toBe(false);
  });
});
