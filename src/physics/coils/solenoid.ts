import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { currentSheetInductance_H } from './nagaoka.ts';
import { stackedRingsInductance_H } from './stacked-rings.ts';

/** A single-layer coil: `diameter_m` from wire centre to wire centre, `length_m` = turns × pitch. */
export interface Solenoid {
  readonly shape: 'solenoid';
  readonly turns: number;
  readonly diameter_m: number;
  readonly length_m: number;
  readonly wireDiameter_m?: number;
}

/** Rounding that a length computed as turns × wire diameter may carry. */
const TOUCHING = 1e-9;

/**
 * Low-frequency inductance in H of a single-layer coil in air.
 *
 * Without `wireDiameter_m` the ideal current sheet (`currentSheetInductance_H`, to rounding). With it the sum over coaxial
 * rings of round wire with uniform current density (`stackedRingsInductance_H`), of any number of turns.
 *
 * Throws `InvalidQuantity` at `/wireDiameter_m` where the wire is not thinner than the coil, and at `/length_m` where the
 * turns do not fit side by side.
 */
export function solenoidInductance(coil: Solenoid): { inductance_H: number; method: Method } {
  const { turns, diameter_m, length_m, wireDiameter_m } = coil;
  if (wireDiameter_m === undefined) {
    const inductance_H = currentSheetInductance_H(turns, diameter_m, length_m);
    return { inductance_H, method: sheetMethod(coil, inductance_H) };
  }
  if (wireDiameter_m >= diameter_m) {
    throw new InvalidQuantity('/wireDiameter_m', `must be less than the coil's diameter of ${diameter_m} m`);
  }
  if (turns * wireDiameter_m > length_m * (1 + TOUCHING)) {
    throw new InvalidQuantity(
      '/length_m',
      `must be at least turns × wire diameter, ${turns * wireDiameter_m} m: the turns of a single layer lie side by side`,
    );
  }
  const inductance_H = stackedRingsInductance_H(turns, length_m / turns, diameter_m / 2, wireDiameter_m / 2);
  return { inductance_H, method: ringsMethod(coil, wireDiameter_m, inductance_H) };
}

/**
 * What a helix has and neither a sheet nor a stack of rings has, relative to the inductance.
 *
 * - Its current also runs along the axis, as in a tube of the coil's length: (µ0 l/2π) ln(2l/a), with asinh so that it is
 *   an upper bound for short coils too. It is all there where the return conductor is far off, less where it is near.
 * - Its turns do not close: 0.2·tan ψ/N of the inductance, ψ the pitch angle, and 0.012·sin²(πN)/N^1.5 where the number of
 *   turns is not whole. Both are bounds read off Neumann's integral along the helix (test/fixtures/scipy/helix.py).
 */
function helixError({ turns, diameter_m, length_m }: Solenoid, inductance_H: number): number {
  const axial = ((VACUUM_PERMEABILITY_H_PER_M * length_m) / (2 * Math.PI)) * Math.asinh((2 * length_m) / diameter_m);
  const pitchSlope = length_m / (turns * Math.PI * diameter_m);
  const open = (0.2 * pitchSlope) / turns + (0.012 * Math.sin(Math.PI * turns) ** 2) / turns ** 1.5;
  return axial / inductance_H + open;
}

/**
 * The sheet against round wire: −µ0 a N (G + H), with G = 5/4 − ln(2 pitch/wire) and 0 ≤ H < 0.338 (Rosa and Grover,
 * NBS Scientific Paper 169, from memory); below 0.9 in magnitude for a pitch of one to four wire diameters. And the direct
 * current's own distribution over the wire (see `ringsMethod`), which is at most as thick as the pitch.
 */
function sheetMethod(coil: Solenoid, inductance_H: number): Method {
  const wire = (0.9 * VACUUM_PERMEABILITY_H_PER_M * coil.turns * coil.diameter_m) / 2 / inductance_H;
  const thickest = Math.min(1, coil.length_m / coil.turns / coil.diameter_m);
  return {
    name: 'cylindrical current sheet',
    references: [
      'L. Lorenz, Annalen der Physik 243 (1879) 161',
      'H. Nagaoka, The inductance coefficients of solenoids, J. Coll. Sci. Tokyo 27(6) (1909)',
    ],
    relativeError: wire + 0.75 * thickest ** 2 + helixError(coil, inductance_H),
    validity:
      'single layer, air, low frequency; the error covers round wire at a pitch of one to four wire diameters, give the wire diameter to resolve it',
  };
}

/**
 * 0.75 ε²: uniform current density against the direct current's, which falls as 1/r across a bent wire, and 3e-3 ε⁴: the
 * equivalent filaments that the rings are summed by; ε = wire/coil diameter. Both read off quadrature over the sections
 * (test/fixtures/scipy/rings.py).
 */
function ringsMethod(coil: Solenoid, wireDiameter_m: number, inductance_H: number): Method {
  const ratio = wireDiameter_m / coil.diameter_m;
  const section = 0.75 * ratio ** 2 + 3e-3 * ratio ** 4;
  return {
    name: 'sum over coaxial rings of round wire',
    references: [
      'J. C. Maxwell, A Treatise on Electricity and Magnetism (1873), art. 701',
      'E. B. Rosa and F. W. Grover, NBS Scientific Paper 169 (1916)',
    ],
    relativeError: section + helixError(coil, inductance_H),
    validity:
      'single layer of bare round wire, air, current spread evenly over the wire (low frequency); the error covers the helix against rings, return conductor far off',
  };
}
