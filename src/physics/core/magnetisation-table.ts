import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import { harmonicSlopes, hermite } from '../numerics/monotone-interpolation.ts';
import type { MagnetisationCurve } from './magnetisation.ts';
import type { MagnetisationTable } from './material.ts';

/**
 * How far below µ0 a table's slope may fall before it is refused: printed flux densities are rounded, and in saturation a step of B
 * has few digits. Up to here it is read as µ0. A table of J in place of B, the likely mistake, falls to nothing.
 */
const ROUNDING_OF_SLOPE = 0.1;

/**
 * A magnetisation curve through measured points. The polarisation J = B − µ0 H is interpolated (PCHIP, from the origin, odd), so that
 * dB/dH never falls below µ0. Beyond the last point J stays where it is, full saturation, and the
 * slope is µ0; `lastField_A_per_m` tells where that begins. Energies are the exact integrals of the pieces.
 *
 * The points are as the table gives them, at whatever temperature it was taken.
 *
 * Throws `InvalidQuantity` at `/field_A_per_m…` or `/fluxDensity_T…`: fewer than two points, unequal lengths, a negative field, H or B not
 * increasing, a flux density at zero field, a slope under 0.9 µ0.
 */
export function tabulatedMagnetisation(table: MagnetisationTable): MagnetisationCurve {
  const mu0 = VACUUM_PERMEABILITY_H_PER_M;
  const { field, polarisation } = withOrigin(table);
  const curve = hermite(field, polarisation, harmonicSlopes(field, polarisation));
  const lastField = field.at(-1)!;
  const lastPolarisation = polarisation.at(-1)!;
  const lastEnergy = curve.stieltjes(lastField);
  const lastCoenergy = curve.integral(lastField);
  const vacuum = (h: number) => (h / 2) * (mu0 * h);
  return {
    name: 'tabulated magnetisation',
    saturationPolarisation_T: lastPolarisation,
    initialPermeability_H_per_m: mu0 + curve.slope(0),
    slopeTurns_A_per_m: curve.slopeTurns().slice(1),
    lastField_A_per_m: lastField,
    fluxDensity_T: (h) => mu0 * h + (h < lastField ? curve.value(h) : lastPolarisation),
    differentialPermeability_H_per_m: (h) => (h < lastField ? mu0 + curve.slope(h) : mu0),
    energyDensity_J_per_m3: (h) => vacuum(h) + (h < lastField ? curve.stieltjes(h) : lastEnergy),
    coenergyDensity_J_per_m3: (h) =>
      vacuum(h) + (h < lastField ? curve.integral(h) : lastCoenergy + lastPolarisation * (h - lastField)),
  };
}

/** The table's points as field and polarisation, checked, starting at the origin. */
function withOrigin({ field_A_per_m, fluxDensity_T }: MagnetisationTable): { field: number[]; polarisation: number[] } {
  if (field_A_per_m.length < 2) throw new InvalidQuantity('/field_A_per_m', 'a table has at least two points');
  if (fluxDensity_T.length !== field_A_per_m.length) {
    throw new InvalidQuantity(
      '/fluxDensity_T',
      `as many flux densities as fields are needed: ${fluxDensity_T.length} for ${field_A_per_m.length}`,
    );
  }
  const [field, fluxDensity] = [[0], [0]];
  field_A_per_m.forEach((h, k) => {
    const b = fluxDensity_T[k]!;
    if (k === 0 && h === 0) {
      if (b !== 0)
        throw new InvalidQuantity('/fluxDensity_T/0', `at zero field the curve starts at zero, not at ${b} T`);
      return;
    }
    const [lastH, lastB] = [field.at(-1)!, fluxDensity.at(-1)!];
    if (!(h > lastH && Number.isFinite(h))) {
      throw new InvalidQuantity(
        `/field_A_per_m/${k}`,
        `fields are positive and increase, but ${h} A/m follows ${lastH} A/m`,
      );
    }
    const least_T = VACUUM_PERMEABILITY_H_PER_M * (h - lastH);
    if (!(b - lastB >= (1 - ROUNDING_OF_SLOPE) * least_T && b > lastB && Number.isFinite(b))) {
      throw new InvalidQuantity(
        `/fluxDensity_T/${k}`,
        `from ${lastH} A/m to ${h} A/m vacuum alone adds ${least_T} T, but the table adds ${b - lastB} T; is it J in place of B?`,
      );
    }
    field.push(h);
    fluxDensity.push(b);
  });
  let highest = 0;
  const polarisation = fluxDensity.map((b, k) => {
    highest = Math.max(highest, b - VACUUM_PERMEABILITY_H_PER_M * field[k]!);
    return highest;
  });
  return { field, polarisation };
}
