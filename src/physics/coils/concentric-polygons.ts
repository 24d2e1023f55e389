/**
 * Neumann's double integral of two concentric, parallel regular polygons of straight filaments, in closed form.
 */
import { parallelFilaments_m } from './round-bars.ts';

/** ∫∫ ds dt/r in m of two parallel filaments whose middles are abreast, of half lengths h₁ and h₂ (their sum and difference given). */
function parallel(halfSum: number, halfDifference: number, distance: number): number {
  const far = Math.sqrt(halfSum * halfSum + distance * distance);
  const near = Math.sqrt(halfDifference * halfDifference + distance * distance);
  const logarithms =
    halfSum * Math.asinh(halfSum / distance) -
    (halfDifference === 0 ? 0 : halfDifference * Math.asinh(halfDifference / distance));
  return 2 * (logarithms - ((halfSum - halfDifference) * (halfSum + halfDifference)) / (far + near));
}

/** asinh(x₁/d) − asinh(x₀/d) as one logarithm, given r = √(x² + d²); of each pair x ± r the sum that does not cancel. */
function asinhDifference(x1: number, r1: number, x0: number, r0: number, d2: number): number {
  if (x0 >= 0) return Math.log((x1 + r1) / (x0 + r0));
  if (x1 <= 0) return Math.log((r0 - x0) / (r1 - x1));
  return Math.log(((x1 + r1) * (r0 - x0)) / d2);
}

/**
 * ∫∫ ds dt/r in m of two filaments at angle θ, s and t counted from the feet of their lines' common perpendicular z ≥ 0:
 * r² = s² + t² − 2st cos θ + z². From the antiderivative s asinh((t − s cos θ)/√(s² sin² θ + z²)) + (s and t exchanged) −
 * (z/sin θ) atan((z² cos θ + st sin² θ)/(z r sin θ)), G. A. Campbell, "Mutual inductances of circuits composed of straight
 * wires", Physical Review 5 (1915) 452-458 (from memory), whose differences are taken before they can cancel.
 */
function skew(s0: number, s1: number, t0: number, t1: number, cosine: number, sine: number, z: number): number {
  const z2 = z * z;
  const bend = 2 * (1 - cosine);
  const r00 = Math.sqrt((s0 - t0) * (s0 - t0) + bend * s0 * t0 + z2);
  const r01 = Math.sqrt((s0 - t1) * (s0 - t1) + bend * s0 * t1 + z2);
  const r10 = Math.sqrt((s1 - t0) * (s1 - t0) + bend * s1 * t0 + z2);
  const r11 = Math.sqrt((s1 - t1) * (s1 - t1) + bend * s1 * t1 + z2);
  const sine2 = sine * sine;
  // An end at the lines' crossing (s or t nought) has no term of its own.
  const along = (x: number, a1: number, ra1: number, a0: number, ra0: number) =>
    x === 0 ? 0 : x * asinhDifference(a1 - x * cosine, ra1, a0 - x * cosine, ra0, x * x * sine2 + z2);
  let value = along(s1, t1, r11, t0, r10) - along(s0, t1, r01, t0, r00);
  value += along(t1, s1, r11, s0, r01) - along(t0, s1, r10, s0, r00);
  if (z > 0) {
    const corner = (s: number, t: number, r: number) => Math.atan2(z2 * cosine + s * t * sine2, z * r * sine);
    value -= (z / sine) * (corner(s1, t1, r11) - corner(s0, t1, r01) - corner(s1, t0, r10) + corner(s0, t0, r00));
  }
  return value;
}

/**
 * ∮∮ dl·dl'/r in m of two coaxial regular polygons of `sides` sides, alike in attitude: inscribed radii mean ± difference/2,
 * planes z ≥ 0 apart (m). Times µ0/4π it is their mutual inductance. The radii come as mean and difference so that polygons that
 * all but coincide keep every digit; difference and z must not both be 0.
 * By symmetry one side is paired with all sides of the other polygon: the parallel ones, and the skew ones two by two.
 *
 * | domain (3..8 sides; mpmath at 30 digits, the potential of one integrated along the other) | worst relative error |
 * |--------------------------------------------------------------------------------------------|----------------------|
 * | radii within a factor of 3, gaps and z from 1e-9 of them to 1                              | 2e-14                |
 * | radii a factor of 19, or z ten times the radius                                            | 4e-13                |
 * | radii a factor of 200: the sides' parts cancel, by the square of the ratio                 | 3e-11                |
 */
export function concentricPolygons_m(sides: number, mean_m: number, difference_m: number, z_m: number): number {
  const step = (2 * Math.PI) / sides;
  const tangent = Math.tan(step / 2);
  const u = Math.abs(difference_m);
  const gap = Math.sqrt(u * u + z_m * z_m);
  let side = parallel(2 * mean_m * tangent, u * tangent, gap);
  if (sides % 2 === 0) side -= parallel(2 * mean_m * tangent, u * tangent, Math.sqrt(4 * mean_m * mean_m + z_m * z_m));
  const outer = mean_m + u / 2;
  const inner = mean_m - u / 2;
  for (let j = 1; 2 * j < sides; j++) {
    if (4 * j === sides) continue;
    const [cosine, sine] = [Math.cos(j * step), Math.sin(j * step)];
    // Ends of the two sides from the point where their lines cross: (u + r (cos θ − 1 ± tan sin θ))/sin θ. At the corner that
    // adjacent sides share the bracket is nought, and u/sin θ is exact.
    const here = j === 1 ? 0 : cosine - 1 + tangent * sine;
    const there = cosine - 1 - tangent * sine;
    const s1 = (u + outer * here) / sine;
    const s0 = (u + outer * there) / sine;
    const t0 = (u - inner * here) / sine;
    const t1 = (u - inner * there) / sine;
    side += 2 * cosine * skew(s0, s1, t0, t1, cosine, sine, z_m);
  }
  return sides * side;
}

/**
 * Neumann's integral of a part of a regular polygon's turn with itself, over that of the whole turn: `share` of the perimeter
 * from a corner on, two filaments of inscribed radius 1 in planes `offset` (the geometric mean distance of the section) apart.
 *
 * Against quadrature along the sides (mpmath, 30 digits), 4 to 8 sides, shares 0.01..0.99, offset 1e-6..0.3: within 3e-15.
 */
export function polygonPartShare(sides: number, share: number, offset: number): number {
  return polygonPart(sides, share, offset) / polygonPart(sides, 1, offset);
}

/** ∫∫ ds dt/r in m of filaments on opposite sides, 2 apart and `offset` out of plane, both from −half, to a and b on their own sides. */
function opposite(half: number, a: number, b: number, offset: number): number {
  const distance = Math.sqrt(4 + offset * offset);
  const f = (x: number) => x * Math.asinh(x / distance) - Math.sqrt(x * x + distance * distance);
  return f(a + b) + f(2 * half) - f(a - half) - f(b - half);
}

function polygonPart(sides: number, share: number, offset: number): number {
  const step = (2 * Math.PI) / sides;
  const half = Math.tan(step / 2);
  const begun = Math.ceil(share * sides);
  // Where the last side begun ends; the others end at half.
  const end = half * (2 * (share * sides - begun) + 1);
  let sum = 0;
  for (let i = 0; i < begun; i++) {
    const a = i === begun - 1 ? end : half;
    for (let j = 0; j < begun; j++) {
      const b = j === begun - 1 ? end : half;
      const turn = j - i;
      if (turn === 0) sum += parallelFilaments_m(half + a, offset);
      else if (2 * Math.abs(turn) === sides) sum -= opposite(half, a, b, offset);
      else {
        // The lines cross tan(θ/2) beyond the middle of the one, as far before that of the other.
        const crossing = Math.tan((turn * step) / 2);
        const [cosine, sine] = [Math.cos(turn * step), Math.abs(Math.sin(turn * step))];
        sum += cosine * skew(-half - crossing, a - crossing, -half + crossing, b + crossing, cosine, sine, offset);
      }
    }
  }
  return sum;
}
