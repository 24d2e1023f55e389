import { describe, expect, it } from 'vitest';
import { coaxialLoopsMutualInductance_H } from '../../../src/physics/coils/coaxial-loops.ts';
import { filamentPair } from '../../../src/physics/coils/filament-pair.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import { ellipticE, ellipticK } from '../../../src/physics/numerics/elliptic.ts';
import fixture from '../../fixtures/mpmath/coaxial-loops.json' with { type: 'json' };

const off = (value: number, expected: number): number => Math.abs(value / expected - 1);
function pair(radius: number, offset: number, height: number): { mutual: number; slope: number } {
  const result = { mutual: 0, slope: 0 };
  filamentPair(radius, offset, height, true, result);
  return result;
}

describe('two coaxial filaments', () => {
  it('have Maxwell’s mutual inductance, against mpmath at 60 digits', () => {
    let worst = 0;
    for (const [radius1, radius2, distance, expected] of fixture as [number, number, number, number][]) {
      const smaller = Math.min(radius1, radius2);
      const { mutual } = pair(smaller, Math.max(radius1, radius2) - smaller, distance);
      worst = Math.max(worst, off(VACUUM_PERMEABILITY_H_PER_M * mutual, expected));
    }
    expect(fixture.length).toBeGreaterThan(200);
    expect(worst).toBeLessThan(5e-15);
  });

  it('have the slope of its closed form, where that does not cancel', () => {
    for (const [radius, offset] of [
      [1, 0],
      [1, 1e-6],
      [0.5, 0.5],
      [1, 0.3],
    ] as const) {
      for (const height of [1e-9, 1e-6, 1e-3, 0.1, 0.7, 1]) {
        // dM/dz = −µ0 z/(2R) [(2 − k²) E/k'² − 2K], R the greatest distance (J. C. Maxwell, Treatise, art. 701, differentiated).
        const greatest2 = (2 * radius + offset) ** 2 + height ** 2;
        const complement2 = (offset * offset + height * height) / greatest2;
        const complement = Math.sqrt(complement2);
        const bracket = ((1 + complement2) * ellipticE(complement)) / complement2 - 2 * ellipticK(complement);
        const expected = (-height / (2 * Math.sqrt(greatest2))) * bracket;
        expect(off(pair(radius, offset, height).slope, expected)).toBeLessThan(1e-13);
      }
    }
  });

  it('have the slope of two dipoles far apart, without cancellation', () => {
    for (const [r, offset, height] of [
      [1, 0, 1e6],
      [1e-4, 1, 1e8],
      [1e-20, 1, 1e10],
    ] as const) {
      const expected = (-3 * Math.PI * (r * (r + offset)) ** 2) / (2 * height ** 4);
      expect(off(pair(r, offset, height).slope, expected)).toBeLessThan(1e-11);
    }
  });

  it('leave the slope alone where it is not asked for', () => {
    const result = { mutual: 0, slope: 7 };
    filamentPair(1, 0.2, 0.3, false, result);
    expect(result.slope).toBe(7);
    expect(off(result.mutual * VACUUM_PERMEABILITY_H_PER_M, coaxialLoopsMutualInductance_H(1, 1.2, 0.3))).toBeLessThan(
      2e-15,
    );
  });
});
