import type { Multilayer } from '../coils/multilayer.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { gaussLegendre } from '../numerics/quadrature.ts';
import { distance } from './loop.ts';
import type { FieldModel, UnitField } from './model.ts';
import { panelOrder, sheetField } from './solenoid.ts';

/** Panels of the transformed radius: singularities stay π/2 off the real t axis, so that 14 points on 2.2 leave 1e-14. */
const PANEL = 2.2;
const PANEL_ORDER = 14;

/** Nearer than this part of the section's smaller side to an end's plane, ξ is not followed further down: leaves 1e-12. */
const CLOSEST = 1e-10;

/** Inner and outer radius, their difference, and each less the point's radius, as exact as the caller has them. */
interface Radii {
  readonly inner: number;
  readonly outer: number;
  readonly width: number;
  readonly innerGap: number;
  readonly outerGap: number;
}

/**
 * H of a winding of rectangular section and uniform current density that carries 1 A in all, at (r, z), r ≥ 0, z ≥ 0 from its
 * centre, any unit of length; finite everywhere, inside the winding too. `above` and `below` are z ∓ length/2.
 *
 * The mean over the radius a of current sheets. As a function of a their field is singular at a = r ± iξ, ξ the distances to
 * the planes of the ends, and jumps at a = r inside the winding. So the integral is split at a = r, and on either side runs
 * over t in |a − r| = ξ sinh t (P. R. Johnston and D. Elliott, Int. J. Numer. Meth. Engng 62 (2005) 564, from memory), which
 * takes the singularities to Im t = π/2 however close the plane is.
 *
 * | domain                                                                   | worst relative error | against           |
 * |--------------------------------------------------------------------------|----------------------|-------------------|
 * | bore 0 to 0.99999 of the outer diameter, length 1e-4 to 1e4 of it; axis, | 2e-12 on the planes  | mpmath, 50 digits |
 * | winding, faces, corners, to 1e4 sizes                                    | of the ends,         |                   |
 * |                                                                          | 5e-13 elsewhere      |                   |
 */
export function sectionField(radii: Radii, r: number, z: number, above: number, below: number): UnitField {
  const { inner, outer, width, innerGap, outerGap } = radii;
  const bend = Math.max(Math.abs(above), CLOSEST * Math.min(width, below - above), 1e-300);
  const total = { radial: 0, axial: 0 };
  const add = (a: number, gap: number, weight: number): void => {
    const sheet = sheetField(a, r, gap, z, above, below);
    total.radial += weight * sheet.radial;
    total.axial += weight * sheet.axial;
  };
  if (innerGap >= 0) integrateAway(add, 1, inner, innerGap, width, bend);
  else if (outerGap <= 0) integrateAway(add, -1, outer, -outerGap, width, bend);
  else {
    integrateAway(add, -1, r, 0, -innerGap, bend);
    integrateAway(add, 1, r, 0, outerGap, bend);
  }
  return { radial: total.radial / width, axial: total.axial / width };
}

/**
 * Calls `add` with each node a, its gap a − r and its weight of a rule over `length` of radii that lead away from the point on
 * `side`, starting at the radius `edge`, which is `start` from the point's.
 */
function integrateAway(
  add: (a: number, gap: number, weight: number) => void,
  side: 1 | -1,
  edge: number,
  start: number,
  length: number,
  bend: number,
): void {
  const away = distance(start, bend);
  // One plain panel where nothing is singular nearby: a thin wall's digits would be lost to the difference of two asinh.
  if (length <= 2 * away) {
    // One point more than the singularity asks for: far away the field grows as a² on the ellipse that bounds the error.
    const { nodes, weights } = gaussLegendre(panelOrder(length, away) + 1);
    for (let i = 0; i < nodes.length; i++) {
      const s = (length / 2) * (1 + nodes[i]!);
      add(edge + side * s, side * (start + s), (length / 2) * weights[i]!);
    }
    return;
  }
  const first = Math.asinh(start / bend);
  const span = Math.asinh((start + length) / bend) - first;
  const panels = Math.ceil(span / PANEL);
  const half = span / panels / 2;
  const { nodes, weights } = gaussLegendre(PANEL_ORDER);
  for (let panel = 0; panel < panels; panel++) {
    for (let i = 0; i < PANEL_ORDER; i++) {
      const t = first + half * (2 * panel + 1 + nodes[i]!);
      const gap = bend * Math.sinh(t);
      add(edge + side * (gap - start), side * gap, half * weights[i]! * bend * Math.cosh(t));
    }
  }
}

/**
 * Field of a multilayer coil: uniform current density over its rectangular section, finite everywhere, in the winding too.
 * Throws `InvalidQuantity` at `/outerDiameter_m` where it does not exceed the inner one.
 */
export function multilayerField(coil: Multilayer): FieldModel {
  const { turns, innerDiameter_m, outerDiameter_m, length_m } = coil;
  if (innerDiameter_m >= outerDiameter_m) {
    throw new InvalidQuantity('/outerDiameter_m', `must be more than the inner diameter of ${innerDiameter_m} m`);
  }
  const innerRadius_m = innerDiameter_m / 2;
  const outerRadius_m = outerDiameter_m / 2;
  const halfLength_m = length_m / 2;
  const size_m = Math.max(outerRadius_m, length_m);
  return {
    turns,
    size_m,
    outerRadius_m,
    halfLength_m,
    reach_m: Math.hypot(outerRadius_m, halfLength_m),
    method: sectionMethod(coil),
    at({ radius_m: r, axial_m: z }) {
      const radii = {
        inner: innerRadius_m / size_m,
        outer: outerRadius_m / size_m,
        width: (outerRadius_m - innerRadius_m) / size_m,
        innerGap: (innerRadius_m - r) / size_m,
        outerGap: (outerRadius_m - r) / size_m,
      };
      return sectionField(radii, r / size_m, z / size_m, (z - halfLength_m) / size_m, (z + halfLength_m) / size_m);
    },
  };
}

/**
 * The even current density against a ring for each turn, an outer radius a or more outside the winding, by the side c of a
 * turn's share of the section: 0.8 (c/a)² for the spread of each turn, and 2 (l/a)² exp(−2πa/c), the ripple of the turns
 * against a long coil's weak outer field. Both read off rings in shares up to twice as long as wide, bore 0 to 0.95 of a,
 * length 0.05 to 10 a (test/physics/fields/multilayer.test.ts: to 2 a).
 */
function sectionMethod({ turns, innerDiameter_m, outerDiameter_m, length_m }: Multilayer): Method {
  const radius_m = outerDiameter_m / 2;
  const length = length_m / radius_m;
  const width = (outerDiameter_m - innerDiameter_m) / outerDiameter_m;
  // A square share, or the whole smaller side of the section where the turns lie in one row.
  const side = Math.max(Math.sqrt((width * length) / turns), width / turns, length / turns);
  return {
    name: 'uniform current density over a rectangular section, by quadrature of current sheets over the radius',
    references: [
      'N. Derby and S. Olbert, Am. J. Phys. 78 (2010) 229',
      'P. R. Johnston and D. Elliott, Int. J. Numer. Meth. Engng 62 (2005) 564',
    ],
    relativeError: 0.8 * side ** 2 + 2 * length ** 2 * Math.exp((-2 * Math.PI) / side),
    validity:
      'at least an outer radius outside the winding, turns evenly spread over the section; in the bore and nearer, larger as the square of turn spacing over distance. Leads and the way from layer to layer are left out',
  };
}
