import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { coupledInductorsEnergy } from '../../src/physics/coupled-inductors.ts';
import { InvalidQuantity } from '../../src/physics/invalid-quantity.ts';

const energy = (inductanceMatrix_H: number[][], current_A: number[]) =>
  coupledInductorsEnergy({ inductanceMatrix_H, current_A });
const refusal = (inductanceMatrix_H: number[][], current_A: number[]): InvalidQuantity | undefined => {
  try {
    energy(inductanceMatrix_H, current_A);
  } catch (error) {
    if (error instanceof InvalidQuantity) return error;
    throw error;
  }
  return undefined;
};

/** A double as an integer times 2^−1200: exact, so that sums of products of them are too. */
function exact(value: number): bigint {
  let [fraction, exponent] = [Math.abs(value), 0];
  while (fraction !== Math.floor(fraction)) {
    fraction *= 2;
    exponent++;
  }
  return (BigInt(fraction) << BigInt(1200 - exponent)) * (value < 0 ? -1n : 1n);
}

/** ½ Σ |iᵢ Lᵢⱼ iⱼ| and ½ Σ iᵢ Lᵢⱼ iⱼ, in exact arithmetic. */
function exactEnergy(matrix: number[][], current: number[]): { sum: number; ofMagnitudes: number } {
  let [sum, ofMagnitudes] = [0n, 0n];
  matrix.forEach((row, i) => {
    row.forEach((element, j) => {
      const term = exact(element) * exact(current[i]!) * exact(current[j]!);
      sum += term;
      ofMagnitudes += term < 0n ? -term : term;
    });
  });
  const toNumber = (value: bigint): number => Number(value >> 3200n) * 2 ** -401;
  return { sum: toNumber(sum), ofMagnitudes: toNumber(ofMagnitudes) };
}

/** L = S C S with a coupling matrix C = A Aᵀ of rank `rank` and unit diagonal. */
function passive(size: number, rank: number, sizes: number[], parts: number[]): number[][] {
  const rows = Array.from({ length: size }, (_, i) => {
    const row = parts.slice(i * rank, (i + 1) * rank);
    const length = Math.hypot(...row);
    return row.map((x) => x / length);
  });
  return rows.map((a, i) =>
    rows.map((b, j) => {
      const coupling = i === j ? 1 : a.reduce((sum, x, k) => sum + x * b[k]!, 0);
      return coupling * Math.sqrt(sizes[i]!) * Math.sqrt(sizes[j]!);
    }),
  );
}

const sets = fc.integer({ min: 1, max: 6 }).chain((size) =>
  fc.record({
    size: fc.constant(size),
    rank: fc.integer({ min: 1, max: size }),
    sizes: fc.array(
      fc.double({ min: -9, max: 3, noNaN: true }).map((x) => 10 ** x),
      { minLength: size, maxLength: size },
    ),
    parts: fc.array(
      fc.double({ min: 0.1, max: 1, noNaN: true }).map((x) => (x > 0.5 ? x : -x)),
      { minLength: size * size, maxLength: size * size },
    ),
    current: fc.array(
      fc.integer({ min: -1e8, max: 1e8 }).map((x) => x * 1e-6),
      { minLength: size, maxLength: size },
    ),
  }),
);

describe('energy of coupled inductors', () => {
  it('of two is ½L₁I₁² + ½L₂I₂² + M I₁I₂, with λ = L i', () => {
    const { energy_J, fluxLinkage_Wb } = energy(
      [
        [1e-3, 5e-4],
        [5e-4, 2e-3],
      ],
      [2, -3],
    );
    expect(energy_J).toBeCloseTo(2e-3 + 9e-3 - 3e-3, 16);
    expect(fluxLinkage_Wb[0]).toBeCloseTo(2e-3 - 1.5e-3, 16);
    expect(fluxLinkage_Wb[1]).toBeCloseTo(1e-3 - 6e-3, 16);
  });

  it('of one is ½LI²', () => {
    expect(energy([[2e-3]], [3])).toEqual({ energy_J: expect.closeTo(9e-3, 16), fluxLinkage_Wb: [6e-3] });
    expect(energy([[0]], [3])).toEqual({ energy_J: 0, fluxLinkage_Wb: [0] });
  });

  it('of series-aiding and series-opposing coils differs by 2M', () => {
    const matrix = [
      [0.4, 0.1],
      [0.1, 0.9],
    ];
    expect(energy(matrix, [1, 1]).energy_J).toBeCloseTo((0.4 + 0.9 + 0.2) / 2, 15);
    expect(energy(matrix, [1, -1]).energy_J).toBeCloseTo((0.4 + 0.9 - 0.2) / 2, 15);
  });

  it('agrees with exact arithmetic for 1 to 6 inductors of 1 nH to 1 kH mixed, of any rank, and is never negative', () => {
    let worst = 0;
    fc.assert(
      fc.property(sets, ({ size, rank, sizes, parts, current }) => {
        const matrix = passive(size, rank, sizes, parts);
        const { energy_J } = energy(matrix, current);
        expect(energy_J).toBeGreaterThanOrEqual(0);
        const { sum, ofMagnitudes } = exactEnergy(matrix, current);
        if (ofMagnitudes > 0) worst = Math.max(worst, Math.abs(energy_J - sum) / ofMagnitudes);
      }),
      { seed: 12, numRuns: 400 },
    );
    console.log(worst);
    expect(worst).toBeLessThan(1e-14);
  });

  it('allows perfect coupling, where opposed ampere-turns store nothing', () => {
    const { energy_J } = energy(
      [
        [1e-9, 1e-3],
        [1e-3, 1e3],
      ],
      [1e3, -1e-3],
    );
    expect(energy_J).toBeLessThan(1e-18);
    // Three windings on one core, and three whose couplings just close the circle.
    const turns = [3, 7, 11];
    expect(
      energy(
        turns.map((a) => turns.map((b) => a * b * 1e-6)),
        [7, -3, 0],
      ).energy_J,
    ).toBeLessThan(1e-18);
    const circle = [
      [1, -0.5, -0.5],
      [-0.5, 1, -0.5],
      [-0.5, -0.5, 1],
    ];
    expect(energy(circle, [1, 1, 1]).energy_J).toBe(0);
  });

  it('refuses a matrix that is not square, or has not one current a row', () => {
    expect(refusal([], [])?.pointer).toBe('/inductanceMatrix_H');
    expect(refusal([[1, 0]], [1])?.pointer).toBe('/inductanceMatrix_H/0');
    expect(refusal([[1, 0], [0]], [1, 1])?.pointer).toBe('/inductanceMatrix_H/1');
    expect(refusal([[1]], [1, 1])?.pointer).toBe('/current_A');
    expect(refusal([[1e300]], [1e10])?.pointer).toBe('/current_A');
  });

  it('refuses a matrix that is not symmetric and names both elements', () => {
    const error = refusal(
      [
        [1, 0.2],
        [0.3, 1],
      ],
      [1, 1],
    );
    expect(error?.pointer).toBe('/inductanceMatrix_H/1/0');
    expect(error?.detail).toContain('/inductanceMatrix_H/0/1');
    expect(error?.detail).toContain('0.2');
  });

  it('refuses a pair that is coupled beyond 1, by however little beside the others it is', () => {
    for (const [l1, l2] of [
      [1e-9, 1e3],
      [1, 1],
      [1e-9, 1e-9],
    ] as const) {
      const at = (coupling: number) => {
        const mutual = coupling * Math.sqrt(l1) * Math.sqrt(l2);
        return refusal(
          [
            [1e3, 0, 0],
            [0, l1, mutual],
            [0, mutual, l2],
          ],
          [1, 1, 1],
        );
      };
      expect(at(1)).toBeUndefined();
      expect(at(-1)).toBeUndefined();
      expect(at(1 + 1e-9)?.pointer).toBe('/inductanceMatrix_H/1/2');
      expect(at(-1.5)?.detail).toContain('inductors 1 and 2');
    }
    expect(refusal([[-1e-3]], [1])?.pointer).toBe('/inductanceMatrix_H/0/0');
    expect(
      refusal(
        [
          [0, 1e-9],
          [1e-9, 1],
        ],
        [1, 1],
      )?.pointer,
    ).toBe('/inductanceMatrix_H/0/1');
  });

  it('refuses couplings that contradict each other only together, with currents that show it', () => {
    let refused = 0;
    fc.assert(
      fc.property(sets, fc.double({ min: 0.1, max: 0.9, noNaN: true }), ({ size, sizes, parts }, shift) => {
        // A matrix of couplings below 1 in magnitude, positive semidefinite or not.
        const matrix = passive(size, size, sizes, parts).map((row, i) =>
          row.map((element, j) =>
            i === j ? element : -Math.abs(element) * (1 - shift) - shift * 0.5 * Math.sqrt(sizes[i]! * sizes[j]!),
          ),
        );
        const error = refusal(matrix, new Array(size).fill(1));
        if (!error) return;
        refused++;
        expect(error.pointer).toBe('/inductanceMatrix_H');
        const current = JSON.parse(/\[.*?\]/.exec(error.detail)![0]) as number[];
        expect(exactEnergy(matrix, current).sum).toBeLessThan(0);
      }),
      { seed: 3, numRuns: 200 },
    );
    expect(refused).toBeGreaterThan(50);
    const error = refusal(
      [
        [1, -0.9, -0.9],
        [-0.9, 1, -0.9],
        [-0.9, -0.9, 1],
      ],
      [0, 0, 0],
    );
    expect(error?.detail).toContain('not positive semidefinite');
  });
});
