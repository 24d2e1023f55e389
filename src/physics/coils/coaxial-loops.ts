import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { ellipticKMinusE } from '../numerics/elliptic.ts';

/**
 * Mutual inductance in H of two coaxial circular filaments, radii and axial distance between their planes in m (the sign
 * of the distance does not matter).
 *
 * J. C. Maxwell, A Treatise on Electricity and Magnetism (1873), vol. 2, art. 701, in the second form given there, which
 * Landen's transformation makes of the first (E. B. Rosa and F. W. Grover, NBS Scientific Paper 169, formula (2), from
 * memory): with r₁, r₂ the least and the greatest distance between points of the two circles,
 *
 *     M = µ0 (r₁ + r₂) (K(k₁) − E(k₁)),   k₁ = (r₂ − r₁)/(r₂ + r₁) = 4ab/(r₁ + r₂)²,   k₁' = 2√(r₁r₂)/(r₁ + r₂).
 *
 * Written with the second expressions nothing cancels: a − b is exact where the radii are close, and K − E is summed from
 * positive terms. Coincident circles give Infinity, the limit: a filament has no self-inductance.
 *
 * | domain                                                              | worst relative error | against           |
 * |---------------------------------------------------------------------|----------------------|-------------------|
 * | b/a and z/a from 1e-6 to 1e6, (a − b)/a and z/a down to 1e-15       | 2e-15                | mpmath, 60 digits |
 */
export function coaxialLoopsMutualInductance_H(radius1_m: number, radius2_m: number, distance_m: number): number {
  // Scaled to the size of the pair: squares neither overflow nor underflow, whatever the unit of length.
  const size = radius1_m + radius2_m + Math.abs(distance_m);
  const scale = 1 / size;
  const a = radius1_m * scale;
  const b = radius2_m * scale;
  const z = distance_m * scale;
  const difference = (radius1_m - radius2_m) * scale;
  const sum = a + b;
  const least = Math.sqrt(difference * difference + z * z);
  if (least === 0) return Infinity;
  const greatest = Math.sqrt(sum * sum + z * z);
  const total = least + greatest;
  const modulus = (4 * a * b) / (total * total);
  const complementaryModulus = (2 * Math.sqrt(least * greatest)) / total;
  return VACUUM_PERMEABILITY_H_PER_M * size * total * ellipticKMinusE(complementaryModulus, modulus * modulus);
}
