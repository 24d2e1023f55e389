import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';

interface ToroidWinding {
  readonly shape: 'toroid';
  readonly turns: number;
  /** Of what fills the winding; 1 where left out. */
  readonly relativePermeability?: number;
}

export interface RectangularToroid extends ToroidWinding {
  readonly section: 'rectangle';
  readonly innerDiameter_m: number;
  readonly outerDiameter_m: number;
  readonly height_m: number;
}

/** `meanDiameter_m` is that of the circle through the centres of the section. */
export interface CircularToroid extends ToroidWinding {
  readonly section: 'circle';
  readonly meanDiameter_m: number;
  readonly sectionDiameter_m: number;
}

/** A ring-shaped winding of one layer, evenly spread all round; the dimensions are those of the current sheet. */
export type Toroid = RectangularToroid | CircularToroid;

/**
 * Inductance in H of a toroid with the uniform current sheet's field B = µ0 µr N i/(2πr), exact for both sections.
 *
 *     rectangle   µ0 µr N² (h/2π) ln(D₂/D₁)          as log1p, for thin-walled rings
 *     circle      µ0 µr N² (R − √(R² − a²))          as a²/(R + √(R² − a²)), for slender ones
 *
 * J. C. Maxwell, A Treatise on Electricity and Magnetism (1873), art. 681 (from memory).
 *
 * Throws `InvalidQuantity` at `/outerDiameter_m` or `/sectionDiameter_m` where the ring has no hole or no thickness.
 *
 * | domain                                             | worst relative error | against           |
 * |----------------------------------------------------|----------------------|-------------------|
 * | (D₂ − D₁)/D₁ from 1e-12 to 1e6, a/R from 1e-9 to 1 | 1e-15                | mpmath, 50 digits |
 */
export function toroidInductance(coil: Toroid): { inductance_H: number; method: Method } {
  const { turns, relativePermeability = 1 } = coil;
  const perTurn = geometricFactor_m(coil) * VACUUM_PERMEABILITY_H_PER_M;
  const inductance_H = relativePermeability * turns * turns * perTurn;
  return { inductance_H, method: sheetMethod(coil, inductance_H) };
}

/** Inductance over µ0 µr N². */
function geometricFactor_m(coil: Toroid): number {
  if (coil.section === 'rectangle') {
    const { innerDiameter_m, outerDiameter_m, height_m } = coil;
    if (outerDiameter_m <= innerDiameter_m) {
      throw new InvalidQuantity('/outerDiameter_m', `must be more than the inner diameter of ${innerDiameter_m} m`);
    }
    return (height_m / (2 * Math.PI)) * Math.log1p((outerDiameter_m - innerDiameter_m) / innerDiameter_m);
  }
  const { meanDiameter_m, sectionDiameter_m } = coil;
  if (sectionDiameter_m >= meanDiameter_m) {
    throw new InvalidQuantity('/sectionDiameter_m', `must be less than the mean diameter of ${meanDiameter_m} m`);
  }
  const ratio = sectionDiameter_m / meanDiameter_m;
  const innerToMean = (meanDiameter_m - sectionDiameter_m) / meanDiameter_m;
  return ((sectionDiameter_m / 2) * ratio) / (1 + Math.sqrt(innerToMean * (1 + ratio)));
}

/**
 * What a winding of wire has and the sheet has not, relative to the inductance. Checked against sums over separate turns in
 * air (test/fixtures/scipy/toroid-turns.py); a filling of permeability µr raises the field round a wire on its surface by the
 * image factor 2µr/(µr + 1), below 2, while the inductance itself rises by µr.
 *
 * - each turn is a wire and not a strip of sheet, µ0 P N/2π (G + H) as for a solenoid, P its perimeter, G = 5/4 − ln(2 pitch/wire),
 *   0 ≤ H < 0.338, with the logarithm of the pitch averaged along the turn, because the pitch widens from the hole outwards;
 * - the winding also goes once round the axis: at most µ0 R (ln(8R/b) − 3/2), b the radius of a circle within the section.
 */
function sheetMethod(coil: Toroid, inductance_H: number): Method {
  const { relativePermeability = 1 } = coil;
  const { perimeter_m, meanRadius_m, sectionRadius_m, meanLogWidening } = outline(coil);
  const wire = (perimeter_m * coil.turns * Math.max(0.9, Math.log(8) + meanLogWidening - 1.25)) / (2 * Math.PI);
  const onceRound = meanRadius_m * (Math.log((8 * meanRadius_m) / sectionRadius_m) - 1.5);
  const image = (2 * relativePermeability) / (relativePermeability + 1);
  return {
    name: 'toroid as a uniform current sheet',
    references: ['J. C. Maxwell, A Treatise on Electricity and Magnetism (1873), art. 681'],
    relativeError: (VACUUM_PERMEABILITY_H_PER_M * image * (wire + onceRound)) / inductance_H,
    validity:
      'one layer spread evenly all round, filling linear and of one permeability; the error covers separate turns at a pitch of one to four wire diameters at the hole and the turn that the winding makes round the axis',
  };
}

/** `meanLogWidening`: the mean of ln(r/r₁) along a turn, r₁ the radius of the hole. */
function outline(coil: Toroid): {
  perimeter_m: number;
  meanRadius_m: number;
  sectionRadius_m: number;
  meanLogWidening: number;
} {
  if (coil.section === 'circle') {
    const { meanDiameter_m, sectionDiameter_m } = coil;
    const ratio = sectionDiameter_m / meanDiameter_m;
    return {
      perimeter_m: Math.PI * sectionDiameter_m,
      meanRadius_m: meanDiameter_m / 2,
      sectionRadius_m: sectionDiameter_m / 2,
      meanLogWidening: Math.log((1 + Math.sqrt((1 - ratio) * (1 + ratio))) / (2 * (1 - ratio))),
    };
  }
  const { innerDiameter_m, outerDiameter_m, height_m } = coil;
  const wall = (outerDiameter_m - innerDiameter_m) / 2;
  const outside = Math.log(outerDiameter_m / innerDiameter_m);
  // Along the two faces, ∫ ln(r/r₁) dr / (r₂ − r₁); of a thin wall only rounding is left, which its small share hides.
  const across = (outerDiameter_m * outside) / (2 * wall) - 1;
  return {
    perimeter_m: 2 * (wall + height_m),
    meanRadius_m: (innerDiameter_m + outerDiameter_m) / 4,
    sectionRadius_m: Math.min(wall, height_m) / 2,
    meanLogWidening: (height_m * outside + 2 * wall * across) / (2 * (height_m + wall)),
  };
}
