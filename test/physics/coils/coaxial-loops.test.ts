import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { coaxialLoopsMutualInductance_H } from '../../../src/physics/coils/coaxial-loops.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import reference from '../../fixtures/mpmath/coaxial-loops.json' with { type: 'json' };

describe('mutual inductance of coaxial circular filaments', () => {
  it('agrees with Maxwell’s formula at 60 digits, near-touching, far and very unequal', () => {
    expect(reference.length).toBe(403);
    let worst = 0;
    for (const [radius1, radius2, distance, expected] of reference as [number, number, number, number][]) {
      const error = Math.abs(coaxialLoopsMutualInductance_H(radius1, radius2, distance) / expected - 1);
      worst = Math.max(worst, error);
    }
    expect(worst).toBeLessThan(2e-15);
  });

  it('tends to the field of a dipole times the area when the loops are far apart', () => {
    const [a, b, z] = [0.3, 0.02, 4e4];
    const dipole = (VACUUM_PERMEABILITY_H_PER_M * Math.PI * a * a * b * b) / (2 * z ** 3);
    expect(Math.abs(coaxialLoopsMutualInductance_H(a, b, z) / dipole - 1)).toBeLessThan(1e-9);
  });

  it('is infinite for coincident filaments', () => {
    expect(coaxialLoopsMutualInductance_H(0.1, 0.1, 0)).toBe(Infinity);
  });

  const length = fc.double({ min: 1e-6, max: 1, noNaN: true });
  it('is symmetric, ignores the side and scales with size from 1e-150 to 1e150', () => {
    fc.assert(
      fc.property(length, length, length, (a, b, z) => {
        const mutual = coaxialLoopsMutualInductance_H(a, b, z);
        const same = (other: number) => Math.abs(other / mutual - 1) < 5e-15;
        expect(mutual).toBeGreaterThan(0);
        expect(same(coaxialLoopsMutualInductance_H(b, a, -z))).toBe(true);
        for (const scale of [1e9, 1e-9, 1e144, 1e-144]) {
          expect(same(coaxialLoopsMutualInductance_H(a * scale, b * scale, z * scale) / scale)).toBe(true);
        }
      }),
      { seed: 1, numRuns: 200 },
    );
  });
});
