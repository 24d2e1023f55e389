import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { averageOverSections } from './winding-sections.ts';

/** A coil wound over the rectangular section between two diameters; `innerDiameter_m` 0 is a coil without a bore. */
export interface Multilayer {
  readonly shape: 'multilayer';
  readonly turns: number;
  readonly innerDiameter_m: number;
  readonly outerDiameter_m: number;
  readonly length_m: number;
}

/** Beyond this ratio of length to diameter, either way, squares of lengths would leave the range of a number. */
const LARGEST_PROPORTION = 1e60;

/**
 * Low-frequency inductance in H of a coil of rectangular section in air, its current spread evenly over the section:
 * Maxwell's mutual inductance of two filaments averaged over all pairs of them (`averageOverSections`).
 *
 * Throws `InvalidQuantity` at `/outerDiameter_m` where it does not exceed the inner diameter, at `/length_m` where length and
 * diameter differ by more than 1e60, and at `/turns` where the result leaves the range of a number.
 *
 * | build/outer radius | length/outer radius | worst relative error | against                                              |
 * |--------------------|---------------------|----------------------|------------------------------------------------------|
 * | 1e-6 to 1 (solid)  | 1e-6 to 1e6         | 3e-11                | exact sheet kernel over both radii, 75 digits        |
 * | 0.5 to 1 (solid)   | 0.5 to 10           | 3e-11                | Bessel-Struve spectral integral                      |
 */
export function multilayerInductance(coil: Multilayer): { inductance_H: number; method: Method } {
  const { turns, innerDiameter_m, outerDiameter_m, length_m } = coil;
  if (innerDiameter_m >= outerDiameter_m) {
    throw new InvalidQuantity('/outerDiameter_m', `must exceed the inner diameter of ${innerDiameter_m} m`);
  }
  const proportion = length_m / outerDiameter_m;
  if (!(proportion < LARGEST_PROPORTION && proportion > 1 / LARGEST_PROPORTION)) {
    throw new InvalidQuantity('/length_m', `differs from the outer diameter of ${outerDiameter_m} m by more than 1e60`);
  }
  const section = { innerRadius_m: innerDiameter_m / 2, outerRadius_m: outerDiameter_m / 2, length_m };
  const { mutualPerMu0_m } = averageOverSections(section, section, 0, false);
  const inductance_H = VACUUM_PERMEABILITY_H_PER_M * turns * turns * mutualPerMu0_m;
  if (!(inductance_H > 0 && Number.isFinite(inductance_H))) {
    throw new InvalidQuantity(
      '/turns',
      `gives an inductance of ${inductance_H} H, which is outside the range of a number`,
    );
  }
  return { inductance_H, method: multilayerMethod(coil, inductance_H) };
}

function multilayerMethod(coil: Multilayer, inductance_H: number): Method {
  return {
    name: 'thick coil of uniform current density',
    references: [
      'J. C. Maxwell, A Treatise on Electricity and Magnetism (1873), art. 701',
      'E. B. Rosa and F. W. Grover, NBS Scientific Paper 169 (1916)',
    ],
    relativeError: windingError(coil, inductance_H),
    validity:
      'rectangular section filled evenly by its turns, wires spaced to twice their bare diameter at most (common practice), air, low frequency, leads not included',
  };
}

/**
 * What a real winding has and an even current does not, relative to the inductance.
 *
 * - Round wire in its cell of the section: µ0 a N (ln(spacing/bare diameter) + 0.138 + E), E ≤ 0.02, for square cells (Rosa and
 *   Grover, NBS Scientific Paper 169, from memory), at twice the bare diameter µ0 a N · 0.85. Where the turns lie in one row the
 *   cell is a rectangle: the geometric mean distance 0.2235 (w + h) against 0.3894 of the wire's diameter, and up to 0.338 of
 *   neighbours (their table for a single layer).
 * - Direct current's fall as 1/r across a bent wire: 0.75 (wire/mean diameter)² of the inductance of a ring (see round-loop.ts).
 * - The current along the axis, where the layers do not lead it back: (µ0 l/2π) asinh(2l/mean diameter) (see solenoid.ts).
 */
function windingError(coil: Multilayer, inductance_H: number): number {
  const { turns, innerDiameter_m, outerDiameter_m, length_m } = coil;
  const meanDiameter = (outerDiameter_m + innerDiameter_m) / 2;
  const { thin_m, wide_m } = turnCell(coil);
  const oneRow = wide_m > thin_m;
  const cell = Math.log((0.2235 / 0.3894) * 2 * (1 + wide_m / thin_m)) + (oneRow ? 0.338 : 0.02);
  const perTurn = (VACUUM_PERMEABILITY_H_PER_M * meanDiameter) / 2;
  const axial = ((VACUUM_PERMEABILITY_H_PER_M * length_m) / (2 * Math.PI)) * Math.asinh(length_m / (meanDiameter / 2));
  return (perTurn * cell * turns + axial) / inductance_H + 0.75 * Math.min(1, thin_m / meanDiameter) ** 2;
}

/** The part of the section that one turn has: a square, or, where only one row of them fits, a rectangle. */
export function turnCell({ turns, innerDiameter_m, outerDiameter_m, length_m }: Multilayer): {
  thin_m: number;
  wide_m: number;
} {
  const build = (outerDiameter_m - innerDiameter_m) / 2;
  const cells = Math.max(1, turns);
  const side = (Math.sqrt(build) * Math.sqrt(length_m)) / Math.sqrt(cells);
  const thin_m = Math.min(build, length_m);
  return side <= thin_m ? { thin_m: side, wide_m: side } : { thin_m, wide_m: Math.max(build, length_m) / cells };
}
