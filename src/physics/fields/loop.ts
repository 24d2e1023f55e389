import type { RoundLoop } from '../coils/round-loop.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { bulirschCel } from '../numerics/elliptic.ts';
import type { FieldModel, UnitField } from './model.ts';

/** √(x² + y²); by the slow, safe way only where a square would leave the range of numbers. */
export function distance(x: number, y: number): number {
  const square = x * x + y * y;
  return square > 1e-280 && square < 1e280 ? Math.sqrt(square) : Math.hypot(x, y);
}

/**
 * H per ampere of a circular filament of radius a at (r, z) from its centre: a > 0, r ≥ 0, any unit of length. `gap` is a − r,
 * given apart because beside the filament, or within the integral over a winding, the caller knows it better.
 *
 * With the azimuth π − 2θ, α and β the least and the greatest distance to the filament and k' = α/β, Biot and Savart's
 * integral is a pair of complete elliptic integrals (as in W. R. Smythe, Static and Dynamic Electricity, 7.10, from memory):
 *
 *     H_z = a/(πβ³) cel(k', k'², a + r, a − r),   H_r = a z/(πβ³) cel(k', k'², −1, 1).
 *
 * So written H_r loses its digits near the axis, and both lose them far away. One step of Bartky's transformation by hand,
 *
 *     cel(k', k'², A, B) = cel(k₁', 1, A + B/k'², 2 (B + A k')/(k' + k'²)) / (1 + k'),   k₁' = 2√k'/(1 + k'),
 *
 * leaves parameters in which each difference is a product of distances, such as 1 − k'² = 4ar/β².
 *
 * | domain                                                             | worst relative error            | against           |
 * |--------------------------------------------------------------------|---------------------------------|-------------------|
 * | r, z 0 or 1e-9 to 1e6 radii, down to 1e-12 radii from the filament | 3e-15, vector and H_r by itself | mpmath, 60 digits |
 */
export function filamentField(a: number, r: number, gap: number, z: number): UnitField {
  const sum = a + r;
  const least = distance(gap, z);
  if (least === 0) return { radial: 0, axial: Number.POSITIVE_INFINITY };
  const greatest = distance(sum, z);
  const k = least / greatest;
  const modulusSquared = (4 * (a / greatest) * r) / greatest;
  const next = (2 * Math.sqrt(k)) / (1 + k);
  const factor = a / (Math.PI * greatest * greatest * greatest * (1 + k));
  const axialCosine = 2 * a * ((gap / least) * (sum / least) + (z / least) * (z / least));
  // (a − r)β + (a + r)α over α; where a < r it would cancel, and is 4arz² over its conjugate.
  const axialSine =
    gap >= 0
      ? (2 * (gap * greatest + sum * least)) / (least * (1 + k))
      : (8 * a * r * (z / least) * z) / ((sum * least - gap * greatest) * (1 + k));
  const radialCosine = modulusSquared / (k * k);
  const radialSine = (2 * modulusSquared) / (k * (1 + k) * (1 + k));
  return {
    radial: z === 0 ? 0 : factor * z * bulirschCel(next, 1, radialCosine, radialSine),
    axial: factor * bulirschCel(next, 1, axialCosine, axialSine),
  };
}

/**
 * Field of a loop of round wire. Outside the wire that of a filament along its centre line. Inside, on every ray from the
 * wire's centre, linear from the field there to the filament's at the surface: what a current of uniform density does in a
 * straight wire, with the field at the centre that it has in a thin ring, I ln(8a/b)/(4πa) along the axis (b the wire's
 * radius; from the filament's field expanded about the wire). Continuous, and finite everywhere.
 *
 * Throws `InvalidQuantity` at `/wireDiameter_m` where the wire is not thinner than the loop.
 */
export function loopField({ diameter_m, wireDiameter_m, turns = 1 }: RoundLoop): FieldModel {
  if (wireDiameter_m >= diameter_m) {
    throw new InvalidQuantity('/wireDiameter_m', `must be less than the loop's diameter of ${diameter_m} m`);
  }
  const radius_m = diameter_m / 2;
  const wire = wireDiameter_m / diameter_m;
  const centre = Math.log(8 / wire) / (4 * Math.PI);
  return {
    turns,
    size_m: radius_m,
    outerRadius_m: radius_m + wireDiameter_m / 2,
    halfLength_m: 0,
    reach_m: radius_m + wireDiameter_m / 2,
    method: loopMethod(wire),
    at({ radius_m: r, axial_m }) {
      const gap = (radius_m - r) / radius_m;
      const z = axial_m / radius_m;
      const depth = distance(gap, z) / wire;
      if (depth >= 1) return filamentField(1, r / radius_m, gap, z);
      if (depth === 0) return { radial: 0, axial: centre };
      const surface = filamentField(1, 1 - gap / depth, gap / depth, z / depth);
      return { radial: depth * surface.radial, axial: centre + depth * (surface.axial - centre) };
    },
  };
}

/**
 * The filament against a current spread over the wire's section, evenly or falling as 1/r as a direct current does in one
 * thick turn, anywhere outside the wire and worst at its surface: x/8 for thin wire, x the wire's diameter over the loop's,
 * and at most x²/4 far away. Quadrature over the section for x from 1e-3 to 0.9 stays within the expression and above 3/4 of
 * it (test/physics/fields/loop.test.ts).
 */
function loopMethod(wire: number): Method {
  return {
    name: 'circular filament',
    references: [
      'J. C. Maxwell, A Treatise on Electricity and Magnetism (1873), art. 702',
      'R. Bulirsch, Numerische Mathematik 13 (1969) 305',
    ],
    relativeError: (wire * (1 + wire + 3 * wire ** 3)) / 6.5,
    validity:
      'outside the wire, current spread over its section (low frequency), leads left out; inside the wire a linear estimate that the error does not cover',
  };
}
