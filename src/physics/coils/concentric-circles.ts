import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { integrate } from '../numerics/quadrature.ts';
import { coaxialLoopsMutualInductance_H } from './coaxial-loops.ts';

/**
 * Neumann's double integral ∮∮ dl·dl'/r in m of two coaxial circles of radii mean ± difference/2, planes v ≥ 0 apart (m).
 * Maxwell's M depends on them by √(r₁r₂) and √(difference² + v²) alone (through k² it is a function of both over r₁r₂), so equal
 * circles of that radius at that distance stand for them, and circles that all but coincide keep every digit.
 */
export function concentricCircles_m(mean_m: number, difference_m: number, v_m: number): number {
  const radius = Math.sqrt(Math.max(0, (mean_m - difference_m / 2) * (mean_m + difference_m / 2)));
  const distance = Math.sqrt(difference_m * difference_m + v_m * v_m);
  return ((4 * Math.PI) / VACUUM_PERMEABILITY_H_PER_M) * coaxialLoopsMutualInductance_H(radius, radius, distance);
}

/**
 * Neumann's integral of a circular arc of `share` of a turn with itself, over that of the whole turn: two filaments of radius 1
 * `offset` (the geometric mean distance of the section, over the radius) apart,
 *
 *     ∫₀^Φ (Φ − φ) cos φ/√(4 sin²(φ/2) + offset²) dφ,   Φ = 2π share.
 *
 * Against the double integral over the arc (mpmath, 15 digits), shares 0.01..0.99, offset 0.02 and 0.3: within 5e-16.
 */
export function circleArcShare(share: number, offset: number): number {
  // φ = offset sinh τ is smooth through the near-singularity at φ = 0, and through that of a nearly whole turn, seen from 2π.
  const part = (from: number, to: number, weight: (phi: number) => number) =>
    integrate(
      (tau) => {
        const phi = offset * Math.sinh(tau);
        return (weight(phi) * Math.cos(phi) * offset * Math.cosh(tau)) / Math.hypot(2 * Math.sin(phi / 2), offset);
      },
      Math.asinh(from / offset),
      Math.asinh(to / offset),
      40,
    );
  const integral = (turn: number) => {
    const angle = 2 * Math.PI * turn;
    const near = part(0, Math.min(angle, Math.PI), (phi) => angle - phi);
    if (angle <= Math.PI) return near;
    return near + part(2 * Math.PI - angle, Math.PI, (phi) => angle - 2 * Math.PI + phi);
  };
  return integral(share) / integral(1);
}
