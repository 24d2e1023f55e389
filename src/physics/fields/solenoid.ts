import type { Solenoid } from '../coils/solenoid.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { gaussLegendre } from '../numerics/quadrature.ts';
import { distance, filamentField } from './loop.ts';
import type { FieldModel, UnitField } from './model.ts';

/** Gauss-Legendre points that resolve a panel of `length` to the last digit when the integrand is singular `away` from it. */
export function panelOrder(length: number, away: number): number {
  // The error falls as ρ^(−2n), ρ of the ellipse through the singularity, smallest where that lies beside the panel's middle:
  // ln ρ = asinh(2·away/length); 18.4 = ln(1e16)/2.
  return length > 0 ? Math.max(2, Math.ceil(18.4 / Math.asinh((2 * away) / length))) : 2;
}

interface SheetEnd {
  readonly solidAngle: number;
  readonly mean: number;
  readonly radial: number;
}

/**
 * What one end of a current sheet of radius a shows at radius r and at the axial distance ξ ≥ 0 from that end's plane:
 * `solidAngle` in sr of the end's disc, and `radial`, H_r of a sheet of 1 A/m that runs on from ξ to infinity. `gap` is
 * a − r. One arithmetic-geometric mean M(β, α) of the greatest and the least distance to the edge, `mean`, gives both.
 *
 * H_r is the vector potential of the edge as a loop, (a/πβ) ∫₀^{π/2} −cos 2θ/√(cos²θ + k'² sin²θ) dθ: a sum of the means'
 * squared half differences cₙ (after DLMF 19.8.6), so that nothing cancels near the axis,
 *
 *     H_r = Σ_{n≥1} 2ⁿ cₙ² / (8 M r),   c₁ = 2ar/(α + β).
 *
 * Solid angle (F. Paxton, Rev. Sci. Instrum. 30 (1959) 254, from memory, in terms of K and Heuman's Λ₀): the discs of radius
 * a seen at r and of radius r seen at a have together 2π − 4ξK/β = 2π (M − ξ)/M, so that the one seen from outside its
 * cylinder is enough, s the lesser and g = |a − r|/(a + r):
 *
 *     Ω = −4 (s/(a + r)) (ξ/β) cel(k', g², 1, −g).
 *
 * Bulirsch's recurrence for this cel ends in a sum of two parts that cancel when the angle is small. Followed as that sum (y)
 * and one of its parts (`slope`), a step's two terms never cancel to less than a quarter of what they were.
 */
function sheetEnd(a: number, r: number, gap: number, xi: number): SheetEnd {
  const sum = a + r;
  const least = distance(gap, xi);
  const greatest = distance(sum, xi);
  let mean = greatest;
  let geometric = least;
  let halfDifference = (2 * a * r) / (least + greatest);
  // Mean and geometric mean less ξ: M − ξ is a²/ξ far along the axis, and would be lost.
  let meanExcess = (sum / (greatest + xi)) * sum;
  let geometricExcess = (gap / (least + xi)) * gap;
  let p = (Math.abs(gap) / sum) * greatest;
  let y = 0;
  let slope = 1;
  let relative = 1; // cₙ/c₁
  let weight = 2;
  let squares = 0;
  // Six steps or so, 13 where the edge is 1e-300 of the radius away.
  for (let step = 0; step < 40; step++) {
    const last = halfDifference <= 1e-16 * mean;
    squares += weight * relative * relative;
    weight *= 2;
    const product = mean * geometric;
    if (p > 0) {
      const nextY = y / 2 + (y * (mean + geometric)) / (4 * p) - (slope * halfDifference * (1 + mean / p)) / 2;
      slope = (y / p + slope * (1 - mean / p)) / 2;
      y = nextY;
      p = (p + product / p) / 2;
    }
    const root = Math.sqrt(product);
    const excess = meanExcess + geometricExcess;
    geometricExcess = (xi * excess + meanExcess * geometricExcess) / (root + xi);
    meanExcess = excess / 2;
    mean = (mean + geometric) / 2;
    geometric = root;
    if (last) break;
    const ratio = halfDifference / (2 * (mean + geometric));
    relative *= ratio;
    halfDifference *= ratio;
  }
  const outside = (-2 * Math.PI * (Math.min(a, r) / sum) * xi * y) / (mean * (mean + p));
  const both = (2 * Math.PI * meanExcess) / mean;
  return {
    solidAngle: gap < 0 ? outside : gap > 0 ? both - outside : both / 2,
    mean,
    radial: ((a / (least + greatest)) * (a / (least + greatest)) * r * squares) / (2 * mean),
  };
}

/**
 * H of a cylindrical current sheet of radius a that carries 1 A in all, at (r, z), r ≥ 0, z ≥ 0 from its centre, any unit of
 * length. `gap` is a − r, `above` z − length/2 and `below` z + length/2, as exact as the caller has them.
 *
 * Nearer than its length the sheet is two discs of poles and, inside, the field of the infinite sheet; on the sheet itself the
 * mean of both sides. Farther off the discs' difference would cancel, and filaments at Gauss-Legendre points are exact.
 *
 * | domain                                                          | worst relative error | against           |
 * |-----------------------------------------------------------------|----------------------|-------------------|
 * | length 1e-6 to 1e4 diameters; r and z from 0 to 1e4 sizes, on   | 4e-14, the vector    | mpmath, 60 digits |
 * | the sheet, and down to 1e-9 radii beside its edge               |                      |                   |
 */
export function sheetField(a: number, r: number, gap: number, z: number, above: number, below: number): UnitField {
  const length = below - above;
  const away = distance(gap, Math.max(0, above));
  if (away >= length) {
    const { nodes, weights } = gaussLegendre(panelOrder(length, away));
    let radial = 0;
    let axial = 0;
    for (let i = 0; i < nodes.length; i++) {
      const field = filamentField(a, r, gap, z - (length / 2) * nodes[i]!);
      radial += weights[i]! * field.radial;
      axial += weights[i]! * field.axial;
    }
    return { radial: z === 0 ? 0 : radial / 2, axial: axial / 2 };
  }
  const near = sheetEnd(a, r, gap, Math.abs(above));
  const far = sheetEnd(a, r, gap, below);
  const radial = (near.radial - far.radial) / length;
  if (above >= 0) return { radial, axial: (near.solidAngle - far.solidAngle) / (4 * Math.PI * length) };
  // On the sheet half of its 1 A/m less both angles would cancel where it is short: each end leaves ξ/4M.
  if (gap === 0) return { radial, axial: (-above / near.mean + below / far.mean) / (4 * length) };
  const inside = gap > 0 ? 1 : 0;
  return { radial, axial: (inside - (near.solidAngle + far.solidAngle) / (4 * Math.PI)) / length };
}

/** Rounding that a length computed as turns × wire diameter may carry. */
const TOUCHING = 1e-9;

/**
 * Field of a single-layer coil as a current sheet, on the sheet the mean of both sides. The wire's diameter, where given,
 * moves the winding's outer surface and nothing else.
 *
 * Throws `InvalidQuantity` at `/wireDiameter_m` where the wire is not thinner than the coil, at `/length_m` where the turns do
 * not fit side by side; the model's `at` throws at `/radius_m` on the sheet's very edge, where the field is infinite.
 */
export function solenoidField(coil: Solenoid): FieldModel {
  const { turns, diameter_m, length_m, wireDiameter_m = 0 } = coil;
  if (wireDiameter_m >= diameter_m) {
    throw new InvalidQuantity('/wireDiameter_m', `must be less than the coil's diameter of ${diameter_m} m`);
  }
  if (turns * wireDiameter_m > length_m * (1 + TOUCHING)) {
    throw new InvalidQuantity('/length_m', `must be at least turns × wire diameter, ${turns * wireDiameter_m} m`);
  }
  const radius_m = diameter_m / 2;
  const halfLength_m = length_m / 2;
  const size_m = Math.max(radius_m, length_m);
  const outerRadius_m = radius_m + wireDiameter_m / 2;
  return {
    turns,
    size_m,
    outerRadius_m,
    halfLength_m,
    reach_m: Math.hypot(outerRadius_m, halfLength_m),
    method: sheetMethod(coil),
    at({ radius_m: r, axial_m: z }) {
      if (r === radius_m && z === halfLength_m) {
        throw new InvalidQuantity('/radius_m', 'lies on the edge of the current sheet, where its field is infinite');
      }
      return sheetField(
        radius_m / size_m,
        r / size_m,
        (radius_m - r) / size_m,
        z / size_m,
        (z - halfLength_m) / size_m,
        (z + halfLength_m) / size_m,
      );
    },
  };
}

/**
 * The sheet against a ring for each turn, on the axis and a coil radius a or more outside the winding: 0.2 (pitch/a)² for the
 * ends and the spread of each turn, and 2 (l/a)² exp(−2πa/pitch), the ripple of the turns against a long coil's weak outer
 * field. Both read off rings of 1 to 100 turns, length 0.03 to 100 radii (test/physics/fields/solenoid.test.ts: to 40 and 30).
 */
function sheetMethod({ turns, diameter_m, length_m }: Solenoid): Method {
  const radius_m = diameter_m / 2;
  const pitch = length_m / turns / radius_m;
  return {
    name: 'cylindrical current sheet',
    references: [
      'N. Derby and S. Olbert, Am. J. Phys. 78 (2010) 229',
      'F. Paxton, Solid angle calculation for a circular disk, Rev. Sci. Instrum. 30 (1959) 254',
    ],
    relativeError: 0.2 * pitch ** 2 + 2 * (length_m / radius_m) ** 2 * Math.exp((-2 * Math.PI) / pitch),
    validity:
      'on the axis and at least a coil radius outside the winding; nearer, the field of single turns shows within a pitch or two. The current that a helix carries along its axis, and the leads, are left out: their field goes round the axis',
  };
}
