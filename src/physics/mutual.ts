import {
  type CoaxialCoil,
  type CoaxialWinding,
  clearance_m,
  coaxialWinding,
  selfInductance_H,
} from './coils/coaxial-coil.ts';
import { averageOverSections } from './coils/winding-sections.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from './constants.ts';
import { InvalidQuantity, within } from './invalid-quantity.ts';
import type { Method } from './method.ts';

export type { CoaxialCoil };

/** Two coils on one axis; `axialDistance_m` from the centre of the primary to that of the secondary, along the axis. */
export interface CoaxialPair {
  readonly primary: CoaxialCoil;
  readonly secondary: CoaxialCoil;
  readonly axialDistance_m: number;
  readonly primaryCurrent_A?: number;
  readonly secondaryCurrent_A?: number;
}

export interface MutualInductance {
  /** Positive: the coils are taken to be wound, and their currents counted, in the same sense about the axis. */
  readonly mutualInductance_H: number;
  /** dM/dz: force along the axis on the secondary, per ampere in each coil, positive towards greater `axialDistance_m`. */
  readonly axialForcePerAmpere2_N: number;
  readonly method: Method;
}

/** Lengths that differ by more than this factor would leave the range of a number when squared. */
const LARGEST_PROPORTION = 1e60;
/** How far a coupling coefficient may exceed 1 by rounding and the quadrature of thick coils. */
const COUPLING_ROUNDING = 1e-9;

/**
 * Low-frequency mutual inductance in H of two coaxial coils in air, and its derivative by their axial distance: Maxwell's
 * filaments averaged over both windings (`averageOverSections`). A round loop is the filament of its centre line, a solenoid
 * its current sheet, a multilayer coil its section with uniform current density. Nested, side by side or apart; ideal current
 * sheets may cross or coincide. Exchanging the coils gives the same numbers to the last digit.
 *
 * Throws `InvalidQuantity`: at the coil's own member where its dimensions contradict each other; at `/axialDistance_m` where
 * the conductors would take up the same space, or where a loop lies on the very end of a current sheet, where the force has no
 * finite value; and where the result or the proportions leave the range of a number.
 *
 * | pair                                                     | worst relative error: M | dM/dz | against                       |
 * |----------------------------------------------------------|-------------------------|-------|-------------------------------|
 * | filaments, radii to 1e6 apart, gaps to 1e-12 radii       | 1e-14                   | 1e-13 | mpmath; closed form           |
 * | sheets and filaments, length/radius 1e-6 to 1e6, gaps to | 1e-13                   | 3e-14 | exact sheet kernel, 75 digits |
 * | 1e-12, coincident, 1e4 sizes apart                       |                         |       |                               |
 * | thick coils: nested, side by side, touching, gaps to     | 2e-11                   | 5e-11 | the same over both radii      |
 * | 1e-9 radii, 1e4 sizes apart                              |                         |       |                               |
 * | thick coils at random, build/radius 1e-7 to 1, radii and | 1e-10                   | 1e-9  | the sum over parts that one   |
 * | lengths over 4 and 10 decades, overlapping too           |                         |       | of them is cut into           |
 */
export function mutualInductance(
  primary: CoaxialCoil,
  secondary: CoaxialCoil,
  axialDistance_m: number,
): MutualInductance {
  const first = within('/primary', () => coaxialWinding(primary));
  const second = within('/secondary', () => coaxialWinding(secondary));
  checkProportions(first, second, axialDistance_m);
  const gap_m = clearance_m(first, second, axialDistance_m);
  const { mutualPerMu0_m, slopePerMu0 } = averageOverSections(first.section, second.section, axialDistance_m, true);
  const scale = VACUUM_PERMEABILITY_H_PER_M * (first.turns * second.turns);
  const mutualInductance_H = scale * mutualPerMu0_m;
  const axialForcePerAmpere2_N = scale * slopePerMu0 + 0;
  if (!(Number.isFinite(mutualInductance_H) && Number.isFinite(axialForcePerAmpere2_N))) {
    throw new InvalidQuantity('/primary/turns', 'gives a mutual inductance outside the range of a number');
  }
  return { mutualInductance_H, axialForcePerAmpere2_N, method: mutualMethod(first, second, gap_m, mutualInductance_H) };
}

/**
 * Everything about two coupled coils: inductances in H, coupling coefficient M/√(L₁L₂), and with both currents the energy
 * ½L₁I₁² + ½L₂I₂² + M I₁I₂ in J and the axial force I₁ I₂ dM/dz in N on the secondary, positive towards greater distance: coils side
 * by side attract (a negative force where the distance is positive) when their currents have the same sign.
 *
 * Throws as `mutualInductance` and the self-inductances do, and `InvalidQuantity` where only one current is given, and at
 * `/axialDistance_m` where M exceeds √(L₁L₂): single layers of round wire wound into each other, which their current sheets do not tell apart.
 */
export function coupledCoils(pair: CoaxialPair): {
  readonly mutualInductance_H: number;
  readonly primaryInductance_H: number;
  readonly secondaryInductance_H: number;
  readonly couplingCoefficient: number;
  readonly energy_J?: number;
  readonly axialForce_N?: number;
  readonly method: Method;
} {
  const { primary, secondary, axialDistance_m, primaryCurrent_A, secondaryCurrent_A } = pair;
  const primaryInductance_H = within('/primary', () => selfInductance_H(primary));
  const secondaryInductance_H = within('/secondary', () => selfInductance_H(secondary));
  const { mutualInductance_H, axialForcePerAmpere2_N, method } = mutualInductance(primary, secondary, axialDistance_m);
  const coupling = mutualInductance_H / Math.sqrt(primaryInductance_H) / Math.sqrt(secondaryInductance_H);
  if (coupling > 1 + COUPLING_ROUNDING) {
    throw new InvalidQuantity(
      '/axialDistance_m',
      `winds the coils so closely into each other (coupling ${coupling} > 1) that their current sheets no longer stand for their wires`,
    );
  }
  const result = {
    mutualInductance_H,
    primaryInductance_H,
    secondaryInductance_H,
    couplingCoefficient: Math.min(1, coupling),
    method,
  };
  if (primaryCurrent_A === undefined && secondaryCurrent_A === undefined) return result;
  if (primaryCurrent_A === undefined)
    throw new InvalidQuantity('/primaryCurrent_A', 'is missing beside the secondary current');
  if (secondaryCurrent_A === undefined) {
    throw new InvalidQuantity('/secondaryCurrent_A', 'is missing beside the primary current');
  }
  const energy_J = Math.max(
    0,
    (primaryInductance_H * primaryCurrent_A ** 2 + secondaryInductance_H * secondaryCurrent_A ** 2) / 2 +
      mutualInductance_H * primaryCurrent_A * secondaryCurrent_A,
  );
  const axialForce_N = primaryCurrent_A * secondaryCurrent_A * axialForcePerAmpere2_N + 0;
  if (!(Number.isFinite(energy_J) && Number.isFinite(axialForce_N))) {
    throw new InvalidQuantity('/primaryCurrent_A', 'gives an energy or a force outside the range of a number');
  }
  return { ...result, energy_J, axialForce_N };
}

function checkProportions(first: CoaxialWinding, second: CoaxialWinding, axialDistance_m: number): void {
  const size = Math.max(first.section.outerRadius_m, second.section.outerRadius_m);
  const check = (pointer: string, length: number): void => {
    const proportion = length / size;
    if (!(proportion < LARGEST_PROPORTION && proportion > 1 / LARGEST_PROPORTION)) {
      throw new InvalidQuantity(
        pointer,
        `${length} m and the radius of ${size} m differ by more than a factor of 1e60`,
      );
    }
  };
  for (const [pointer, { coil, section }] of [
    ['/primary', first],
    ['/secondary', second],
  ] as const) {
    const diameter = coil.shape === 'multilayer' ? 'outerDiameter_m' : 'diameter_m';
    check(`${pointer}/${diameter}`, section.outerRadius_m);
    if (coil.shape !== 'round-loop') check(`${pointer}/length_m`, section.length_m);
  }
  if (Math.abs(axialDistance_m) > size) check('/axialDistance_m', Math.abs(axialDistance_m));
}

function mutualMethod(
  first: CoaxialWinding,
  second: CoaxialWinding,
  gap_m: number,
  mutualInductance_H: number,
): Method {
  return {
    name: "Maxwell's filaments averaged over both windings",
    references: [
      'J. C. Maxwell, A Treatise on Electricity and Magnetism (1873), art. 701',
      'E. B. Rosa and F. W. Grover, NBS Scientific Paper 169 (1916)',
    ],
    relativeError: wireError(first, second, gap_m, mutualInductance_H),
    validity:
      'coaxial coils in air, low frequency; filament, current sheet or uniform section for the wires, which the error covers for wires spaced to twice their bare diameter; leads and the current along the axis not included',
  };
}

/**
 * What real turns have and filaments, sheets and uniform sections have not, relative to M.
 *
 * - Thickness h of the conductor: the flux function's mean over a round or square one is off by (h²/12)/r² far away, where it grows as
 *   r², and by h²/(24 r d) at a distance d that is small against the radius r (second-order terms; the first cancels).
 * - Turns a pitch p apart: a helix in a field that is round about the axis links exactly the mean over its sheet, so what is left
 *   is the ripple of the other coil's turns, exp(−2π d/p); discs side by side have (p²/24)/d². Neither is more than what
 *   one turn on another gains: 0.9 µ0 r a turn, the bound on wire against sheet (see solenoid.ts).
 */
function wireError(first: CoaxialWinding, second: CoaxialWinding, gap_m: number, mutualInductance_H: number): number {
  if (mutualInductance_H === 0) return 0;
  const radius = Math.min(first.section.outerRadius_m, second.section.outerRadius_m);
  const turns = Math.min(first.turns, second.turns);
  const oneTurnOnAnother = (0.9 * VACUUM_PERMEABILITY_H_PER_M * radius * turns) / mutualInductance_H;
  return [first, second].reduce((sum, { section, conductor_m, pitch_m, stacked }) => {
    const r = (section.innerRadius_m + section.outerRadius_m) / 2;
    const nearest = Math.max(gap_m, conductor_m / 2);
    const thickness = ((conductor_m / r) ** 2 / 12) * (1 + r / (2 * nearest));
    const ripple = pitch_m === 0 ? 0 : oneTurnOnAnother * Math.exp((-2 * Math.PI * gap_m) / pitch_m);
    const steps = stacked && gap_m > 0 ? Math.min(oneTurnOnAnother, (pitch_m / gap_m) ** 2 / 24) : ripple;
    return sum + thickness + steps;
  }, 0);
}
