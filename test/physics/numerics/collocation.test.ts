import { describe, expect, it } from 'vitest';
import { radauCollocation } from '../../../src/physics/numerics/collocation.ts';

describe('Radau IIA collocation', () => {
  // E. Hairer and G. Wanner, Solving Ordinary Differential Equations II, tables IV.5.5 and IV.5.6.
  it('is the published method of order 3', () => {
    const { nodes, weights, matrix } = radauCollocation(2);
    expectClose([...nodes].map(unit), [1 / 3, 1]);
    expectClose(weights, [3 / 4, 1 / 4]);
    expectClose(matrix, [5 / 12, -1 / 12, 3 / 4, 1 / 4]);
  });

  it('is the published method of order 5', () => {
    const { nodes, weights, matrix } = radauCollocation(3);
    const r = Math.sqrt(6);
    expectClose([...nodes].map(unit), [(4 - r) / 10, (4 + r) / 10, 1]);
    expectClose(weights, [(16 - r) / 36, (16 + r) / 36, 1 / 9]);
    const first = [(88 - 7 * r) / 360, (296 - 169 * r) / 1800, (-2 + 3 * r) / 225];
    const second = [(296 + 169 * r) / 1800, (88 + 7 * r) / 360, (-2 - 3 * r) / 225];
    expectClose(matrix, [...first, ...second, (16 - r) / 36, (16 + r) / 36, 1 / 9]);
  });

  it('integrates powers exactly, over the step and to each node', () => {
    for (const stages of [2, 3, 5, 8, 12, 16]) {
      const { nodes, weights, matrix, matrixSquared } = radauCollocation(stages);
      const c = [...nodes].map(unit);
      const sum = (row: ArrayLike<number>, at: number, power: number) =>
        c.reduce((total, x, k) => total + row[at + k]! * x ** power, 0);
      for (let power = 0; power <= 2 * stages - 2; power++) {
        expect(Math.abs(sum(weights, 0, power) - 1 / (power + 1))).toBeLessThan(1e-14);
      }
      for (let power = 0; power < stages; power++) {
        c.forEach((x, j) => {
          const exact = x ** (power + 1) / (power + 1);
          expect(Math.abs(sum(matrix, j * stages, power) - exact)).toBeLessThan(1e-14);
          // Twice: exact where the first integral is still of a degree below the stages.
          const twice = x ** (power + 2) / ((power + 1) * (power + 2));
          if (power < stages - 1) expect(Math.abs(sum(matrixSquared, j * stages, power) - twice)).toBeLessThan(1e-14);
        });
      }
    }
  });
});

function unit(x: number): number {
  return (1 + x) / 2;
}

function expectClose(actual: ArrayLike<number>, expected: readonly number[]): void {
  expect(actual.length).toBe(expected.length);
  expected.forEach((value, k) => {
    expect(Math.abs(actual[k]! - value)).toBeLessThan(1e-15 * Math.max(1, Math.abs(value)));
  });
}
