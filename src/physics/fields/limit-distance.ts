import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { findRoot } from '../numerics/roots.ts';
import { type FieldCoil, fieldModel, magnitudeAt } from './coil-model.ts';
import type { FieldModel } from './model.ts';

/**
 * The distances from the coil's centre beyond which its flux density stays at or below `limit_T` (> 0): `axial_m` along the
 * axis, `radial_m` in the mid-plane, outside the winding.
 *
 * - `axial_m` is 0 where the limit is kept at the centre already: on the axis |B| has its greatest value there.
 * - `radial_m` is never less than the radius of the winding's outer surface; equal to it, the limit is kept just outside.
 * - null stands for a distance that cannot be reckoned: the limit is some 300 orders of magnitude below the coil's field.
 *
 * |B| falls steadily on both rays, so that one root is the answer: on the axis each turn's field falls on either side of its
 * plane, and an even spread of such humps is one hump; in the mid-plane a sheet's outer field is the solid angle of its two
 * ends' discs, which falls with the distance from their axis, and a winding is a nest of sheets.
 *
 * Throws `InvalidQuantity` as `fieldModel` does.
 *
 * | domain                                                  | worst relative error | against          |
 * |---------------------------------------------------------|----------------------|------------------|
 * | loop, on the axis, limits of 1 mT to 1e-15 T            | 1e-13                | the closed form  |
 * | six coils from pancake to tube, limits 0.5 mT to 10 nT  | 1e-12 in B there     | `fieldAt`        |
 */
export function limitDistances(
  coil: FieldCoil,
  current_A: number,
  limit_T: number,
): { axial_m: number | null; radial_m: number | null } {
  const model = fieldModel(coil);
  const onAxis = (axial_m: number) => magnitudeAt(model, current_A, { radius_m: 0, axial_m });
  const inPlane = (radius_m: number) => magnitudeAt(model, current_A, { radius_m, axial_m: 0 });

  // A turn's field is that of the dipoles on the disc it encloses, each at most µ0m/(2πd³) at its own distance d.
  const reach_m = dipoleDistance_m(model, current_A, limit_T);
  const outside_m = model.outerRadius_m * (1 + Number.EPSILON);
  return {
    axial_m: falling(onAxis, 0, model.halfLength_m + reach_m, limit_T),
    radial_m: falling(inPlane, outside_m, model.outerRadius_m + reach_m, limit_T, model.outerRadius_m),
  };
}

/** Where the field on the axis of a dipole as strong as all turns at the outer radius falls to the limit: µ0 N I a²/(2d³). */
function dipoleDistance_m({ outerRadius_m, turns }: FieldModel, current_A: number, limit_T: number): number {
  const edge_T = (VACUUM_PERMEABILITY_H_PER_M * turns * (Math.abs(current_A) / outerRadius_m)) / 2;
  return outerRadius_m * Math.cbrt(edge_T / limit_T) * (1 + 1e-12);
}

/** Where the falling `magnitude_T` reaches `limit_T` between `low` and `high`; `within` where it is there from the start. */
function falling(
  magnitude_T: (distance_m: number) => number,
  low: number,
  high: number,
  limit_T: number,
  within = low,
): number | null {
  if (magnitude_T(low) <= limit_T) return within;
  if (!Number.isFinite(high)) return null;
  // In logarithms: the inverse cube is nearly a line, and an underflow to zero is still a number.
  const excess = (distance_m: number) =>
    Math.log(Math.max(magnitude_T(distance_m), Number.MIN_VALUE)) - Math.log(limit_T);
  return findRoot(excess, low, high);
}
