import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';

/** |ΔB|/|B| of a flux density in T against the reference H in A/m. */
export function vectorError(
  field: { readonly radial_T: number; readonly axial_T: number },
  radial_A_per_m: number,
  axial_A_per_m: number,
): number {
  const radial = VACUUM_PERMEABILITY_H_PER_M * radial_A_per_m;
  const axial = VACUUM_PERMEABILITY_H_PER_M * axial_A_per_m;
  return Math.hypot(field.radial_T - radial, field.axial_T - axial) / Math.hypot(radial, axial);
}

/** |a/b − 1|. */
export const relativeError = (value: number, expected: number): number => Math.abs(value / expected - 1);
