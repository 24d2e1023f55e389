import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { coaxialLoopsMutualInductance_H } from './coaxial-loops.ts';

/**
 * Rings of round wire that carry a current of uniform density: the self-inductance of one, and the mutual inductance of two
 * equal ones on a common axis. `radius_m` is that of the centre line, `wireRadius_m` that of the section, ε their ratio.
 */

/** Enough for every ε < 1: what they leave out at ε → 1 is 2e-13, against 1478 terms of the same series. */
const MAXIMUM_TERMS = 400;

/**
 * Self-inductance in H of a ring of round section, the flux linkage averaged over the section: 0 < wireRadius_m < radius_m.
 *
 *     L = µ0 a Σₙ ε²ⁿ (Aₙ ln(8/ε) + Bₙ),   A₀ = 1, B₀ = −7/4, A₁ = 1/8, B₁ = 1/24, …
 *
 * The first two pairs are the classical formula (Rosa and Grover, NBS Scientific Paper 169, formula (58), from memory). The
 * others come from the solution in toroidal harmonics of (∇² − 1/r²)A = −µ0 J, for which the section's edge is a coordinate
 * line. Expanded in ε² its rational coefficients follow
 *
 *     f(n) Aₙ = g(n) Aₙ₋₁ − h(n) Aₙ₋₂,   f(n) Bₙ = g(n) Bₙ₋₁ − h(n) Bₙ₋₂ + ½(f'(n) Aₙ − g'(n) Aₙ₋₁ + h'(n) Aₙ₋₂) + [n = 1],
 *     f = 4n²(n + 1)(n + 2),   g = (2n − 3)(2n − 1)(2n² − 2n − 3),   h = (n − 3)(n − 2)(2n − 5)(2n − 3),
 *
 * a recurrence found from the first Aₙ and confirmed on sixty of them in exact arithmetic (test/fixtures/mpmath/ring-series.py),
 * not proved; that of Bₙ is its logarithmic companion and rests on the first row of the table.
 *
 * | ε            | worst relative error | against                                              |
 * |--------------|----------------------|------------------------------------------------------|
 * | 1e-6 to 0.99 | 5e-15                | the toroidal harmonics themselves, mpmath, 60 digits |
 * | 0.05 to 0.99 | 2e-10                | quadrature over both sections of Maxwell's formula   |
 */
export function roundRingSelfInductance_H(radius_m: number, wireRadius_m: number): number {
  const ratio = wireRadius_m / radius_m;
  const logarithm = Math.log(8 / ratio);
  const square = ratio * ratio;
  let [olderA, olderB] = [0, 0];
  let [a, b] = [1, -1.75];
  let power = 1;
  let sum = logarithm - 1.75;
  for (let n = 1; n < MAXIMUM_TERMS; n++) {
    const f = 4 * n * n * (n + 1) * (n + 2);
    const g = (2 * n - 3) * (2 * n - 1) * (2 * n * n - 2 * n - 3);
    const h = (n - 3) * (n - 2) * (2 * n - 5) * (2 * n - 3);
    const slopeF = 4 * n * (4 * n * n + 9 * n + 4);
    const slopeG = (8 * n - 8) * (2 * n * n - 2 * n - 3) + (2 * n - 3) * (2 * n - 1) * (4 * n - 2);
    const slopeH = (2 * n - 5) * (2 * n - 5) * (2 * n - 3) + (n - 3) * (n - 2) * (8 * n - 16);
    const nextA = (g * a - h * olderA) / f;
    const source = (slopeF * nextA - slopeG * a + slopeH * olderA) / 2 + (n === 1 ? 1 : 0);
    const nextB = (g * b - h * olderB + source) / f;
    [olderA, olderB, a, b] = [a, b, nextA, nextB];
    power *= square;
    const term = power * (a * logarithm + b);
    sum += term;
    if (Math.abs(term) < 1e-17 * sum) break;
  }
  return VACUUM_PERMEABILITY_H_PER_M * radius_m * sum;
}

/**
 * The filaments that stand for a ring of round section, seen from outside it: two halves of the current at `radius_m`, a
 * distance `offset_m` before and behind its plane.
 *
 * T. R. Lyle's idea for rectangular sections (Phil. Mag. 3 (1902) 310, from memory), worked for the round one: both
 * have the section's mean of r² and of r⁴ − 4r²z², the first solutions of (∂²/∂r² − (1/r)∂/∂r + ∂²/∂z²)(rA) = 0, which
 * gives radius² = a² + ρ²/4 and offset² = 5ρ⁴/(192 radius²).
 */
export function equivalentFilaments(radius_m: number, wireRadius_m: number): { radius_m: number; offset_m: number } {
  const radius = Math.sqrt(radius_m * radius_m + (wireRadius_m * wireRadius_m) / 4);
  return { radius_m: radius, offset_m: (Math.sqrt(5 / 192) * wireRadius_m * wireRadius_m) / radius };
}

/**
 * Mutual inductance in H of two equal coaxial rings, given as their equivalent filaments, whose planes are `distance_m`
 * apart, at least one wire diameter.
 *
 * | a/ρ  | worst relative error, touching or further | against                                            |
 * |------|-------------------------------------------|----------------------------------------------------|
 * | 1.05 | 2.5e-3                                    | quadrature over both sections of Maxwell's formula |
 * | 1.5  | 6e-4                                      | the same                                           |
 * | 3    | 2.5e-5                                    | the same                                           |
 * | 10   | 2e-7                                      | the same                                           |
 */
export function equalRingsMutualInductance_H(
  filaments: { readonly radius_m: number; readonly offset_m: number },
  distance_m: number,
): number {
  const { radius_m, offset_m } = filaments;
  const twice = 2 * offset_m;
  return (
    coaxialLoopsMutualInductance_H(radius_m, radius_m, distance_m) / 2 +
    (coaxialLoopsMutualInductance_H(radius_m, radius_m, distance_m - twice) +
      coaxialLoopsMutualInductance_H(radius_m, radius_m, distance_m + twice)) /
      4
  );
}
