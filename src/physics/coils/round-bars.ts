/**
 * Straight bars of round section, uniform current: Neumann's double integral ∫∫ dz dz'/r averaged over all pairs of points
 * of the sections. Lengths in m, results in m (times µ0/4π they are inductances).
 *
 * Two aligned filaments of length l at distance s have (E. B. Rosa, "The self and mutual inductances of linear
 * conductors", Bulletin of the Bureau of Standards 4 (1908) 301-344, formula (12), from memory)
 *
 *     N(l, s) = 2 [l asinh(l/s) − √(l² + s²) + s] = 2 [−l ln s + s + l ln 2l − l + r(s)],
 *     r(s) = l ln(1 + q/2l) − q,   q = √(l² + s²) − l.
 *
 * Over the sections ln s averages to the logarithm of the geometric mean distance, ρ e^{−1/4} within a circle of radius ρ
 * and D between two circles whose centres are D apart (Maxwell, Treatise, vol. 2, arts. 691-693), s averages to the
 * arithmetic mean distance, 128ρ/45π within a circle, and r(s), which a long bar hardly has, is averaged by quadrature.
 */
import { ellipticE } from '../numerics/elliptic.ts';
import { gaussLegendre } from '../numerics/quadrature.ts';

const MEAN_DISTANCE_IN_UNIT_CIRCLE = 128 / (45 * Math.PI);

/** ∫∫ dz dz'/r in m of two parallel filaments of equal length, abreast. Both terms are of one size, whatever s/l. */
export function parallelFilaments_m(length_m: number, distance_m: number): number {
  const slant = Math.hypot(length_m, distance_m);
  return 2 * length_m * (Math.asinh(length_m / distance_m) - length_m / (slant + distance_m));
}

/** r(s)/l of the head of this file, as a function of s/l. */
function remainder(ratio: number): number {
  const q = (ratio * ratio) / (Math.sqrt(1 + ratio * ratio) + 1);
  return Math.log1p(q / 2) - q;
}

/**
 * Mean of f(s/2ρ) over the distances s of all pairs of points of a circle of radius ρ, for x = s/2ρ between cos `to` and
 * cos `from`: density (16/π) x (acos x − x√(1 − x²)) (disc line picking; H. Solomon, Geometric Probability, 1978, from memory).
 * In φ = acos x the density's root at x = 1 is gone and Gauss-Legendre converges geometrically.
 */
function overCircle(f: (x: number) => number, order: number, from = 0, to = Math.PI / 2): number {
  const { nodes, weights } = gaussLegendre(order);
  const half = (to - from) / 2;
  let sum = 0;
  for (let i = 0; i < order; i++) {
    const phi = from + half * (1 + nodes[i]!);
    const [x, y] = [Math.cos(phi), Math.sin(phi)];
    sum += weights[i]! * x * y * (phi - x * y) * f(x);
  }
  return (16 / Math.PI) * half * sum;
}

/**
 * ∫∫ dz dz'/r in m of one round bar with itself, uniform current density; times µ0/4π its partial self-inductance.
 * For l ≫ ρ it is Rosa's 2 [l (ln(2l/ρ) − 3/4) + 128ρ/45π − ρ²/4l + …], for l ≪ ρ it is 16 l²/3πρ.
 *
 * | domain                 | worst relative error | against                                                              |
 * |------------------------|----------------------|----------------------------------------------------------------------|
 * | l/2ρ from 1e-9 to 1e12 | 5e-16                | mpmath: single integral over Maxwell's coaxial loops (another route) |
 */
export function roundBarSelf_m(length_m: number, radius_m: number): number {
  if (length_m >= radius_m) {
    const spread = overCircle((x) => remainder((2 * radius_m * x) / length_m), 24);
    const logarithm = Math.log((2 * length_m) / radius_m) - 0.75;
    return 2 * length_m * (logarithm + MEAN_DISTANCE_IN_UNIT_CIRCLE * (radius_m / length_m) + spread);
  }
  // A short bar: the terms above would cancel, N itself does not. Panels that shrink fourfold towards s = 0, past s = l,
  // where N bends, to where the rest (it is of the order of x² ln x) is below rounding.
  const abreast = (x: number) => parallelFilaments_m(length_m, 2 * radius_m * x);
  let sum = overCircle(abreast, 24, 0, Math.acos(0.25));
  const smallest = 1e-9 * Math.min(1, length_m / radius_m);
  for (let x = 0.25; x > smallest; x /= 4) sum += overCircle(abreast, 16, Math.acos(x), Math.acos(x / 4));
  return sum;
}

/**
 * Mean of f(s) over the distances s between the points of two circles of radius ρ whose centres are D ≥ 2ρ apart.
 * The difference of a point of each is spread about D as within one circle, so it is a circle's mean of means round rings
 * of radius u ≤ 2ρ. On a ring s² = ((D − u) cos ψ)² + ((D + u) sin ψ)², 0 ≤ ψ ≤ π/2; ψ = ε sinh τ keeps f smooth also where the
 * ring passes close to s = 0, which happens where the wires touch.
 */
function betweenCircles(f: (s: number) => number, radius: number, distance: number): number {
  const order = distance < 4 * radius ? 24 : 12;
  const { nodes, weights } = gaussLegendre(order);
  return overCircle((x) => {
    // In units of D, so that squares neither overflow nor underflow.
    const u = (2 * radius * x) / distance;
    const epsilon = (1 - u) / Math.sqrt(1 + u * u);
    const half = Math.asinh(Math.PI / (2 * epsilon)) / 2;
    let ring = 0;
    for (let i = 0; i < order; i++) {
      const growth = Math.exp(half * (1 + nodes[i]!));
      const psi = (epsilon / 2) * (growth - 1 / growth);
      const [a, b] = [(1 - u) * Math.cos(psi), (1 + u) * Math.sin(psi)];
      ring += weights[i]! * (growth + 1 / growth) * f(distance * Math.sqrt(a * a + b * b));
    }
    return (epsilon / Math.PI) * half * ring;
  }, order);
}

/**
 * ∫∫ dz dz'/r in m of one round bar with itself, less that with an equal bar abreast at centre distance D ≥ 2ρ, uniform
 * current density in both. Twice this, times µ0/4π, is the inductance of the two as go and return.
 * For l ≫ D it is 2l (ln(D/ρ) + 1/4), where self and mutual, taken apart, would each be far larger than their difference.
 *
 * | domain                                                 | worst relative error | against                     |
 * |--------------------------------------------------------|----------------------|-----------------------------|
 * | l/ρ 0.5..1e6, D/ρ 2 (touching)..20                     | 2e-14                | Hankel's integral (scipy)   |
 * | l/ρ 0.01..0.5, the same distances                      | 1e-11                | the same                    |
 */
export function roundBarSelfLessAbreast_m(length_m: number, radius_m: number, distance_m: number): number {
  const [l, rho, d] = [length_m, radius_m, distance_m];
  if (l < d / 2) {
    // Short: the mutual part is the smaller one.
    return roundBarSelf_m(l, rho) - betweenCircles((s) => parallelFilaments_m(l, s), rho, d);
  }
  // Ring means of s: (2/π)(D + u) E(k), k' = (D − u)/(D + u). E is smooth enough even where the circles touch.
  const meanDistance = overCircle((x) => {
    const u = 2 * rho * x;
    return (2 / Math.PI) * (d + u) * ellipticE(Math.max((d - u) / (d + u), 1e-150));
  }, 24);
  const ownSpread = overCircle((x) => remainder((2 * rho * x) / l), 24);
  const abreastSpread = betweenCircles((s) => remainder(s / l), rho, d);
  const distances = (MEAN_DISTANCE_IN_UNIT_CIRCLE * rho - meanDistance) / l;
  return 2 * l * (Math.log(d / rho) + 0.25 + distances + ownSpread - abreastSpread);
}
