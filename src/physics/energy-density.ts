import { VACUUM_PERMEABILITY_H_PER_M } from './constants.ts';
import { solveField } from './core/field-solver.ts';
import { fieldError, magnetisationCurve } from './core/magnetisation.ts';
import type { Material } from './core/material.ts';
import { InvalidQuantity, within } from './invalid-quantity.ts';
import type { Method } from './method.ts';

export interface EnergyDensityQuestion {
  readonly fluxDensity_T: number;
  /** of a linear medium; default 1, vacuum or air */
  readonly relativePermeability?: number;
  /** a saturating medium, in place of a relative permeability */
  readonly material?: Material;
  /** of the material, where its saturation is a list; default 25 °C */
  readonly temperature_degC?: number;
  readonly volume_m3?: number;
}

export interface EnergyDensity {
  /** ∫ H dB from zero, B²/(2µ) of a linear medium */
  readonly energyDensity_J_per_m3: number;
  /** B²/(2µ0): the pull per area of a pole face across an air gap in which the flux density is B */
  readonly pressure_Pa: number;
  /** in `volume_m3`, the flux density being uniform in it */
  readonly energy_J?: number;
  readonly method: Method;
}

/**
 * Energy density of a magnetic field of flux density B, and magnetic pressure.
 *
 * The energy is the medium's: B²/(2µ) where it is linear, ∫ H dB along the magnetisation curve where it saturates. The pressure
 * is Maxwell's stress B²/(2µ0) on the air side of a face that the flux leaves at right angles, whatever the
 * permeability behind it; the stress inside the medium, smaller by about 1/µr, is neglected as is usual (net: 1 − 1/µr). In air
 * both are one number.
 *
 * Throws `InvalidQuantity` where both a relative permeability and a material are given (`/material`), a relative permeability is not
 * positive, or at `/material/…`.
 */
export function energyDensity(question: EnergyDensityQuestion): EnergyDensity {
  const { fluxDensity_T, relativePermeability, material, temperature_degC, volume_m3 } = question;
  if (material && relativePermeability !== undefined) {
    throw new InvalidQuantity(
      '/material',
      'a material brings its own permeability: give it or a relative permeability',
    );
  }
  if (relativePermeability !== undefined && !(relativePermeability > 0)) {
    throw new InvalidQuantity('/relativePermeability', `is positive, not ${relativePermeability}`);
  }
  const pressure_Pa = (fluxDensity_T / 2) * (fluxDensity_T / VACUUM_PERMEABILITY_H_PER_M);
  const stored = material
    ? within('/material', () => storedInMaterial(material, Math.abs(fluxDensity_T), temperature_degC))
    : { density: pressure_Pa / (relativePermeability ?? 1), relativeError: 0, name: 'energy density B²/(2µ)' };
  return {
    energyDensity_J_per_m3: stored.density,
    pressure_Pa,
    ...(volume_m3 === undefined ? {} : { energy_J: stored.density * volume_m3 }),
    method: {
      name: `${stored.name}, magnetic pressure B²/(2µ0)`,
      references: ['OpenStax, University Physics vol. 2 (2016), eq. 14.18'],
      relativeError: stored.relativeError,
      validity:
        'uniform flux density, single-valued magnetisation; pressure on a face that the flux crosses at right angles into air',
    },
  };
}

function storedInMaterial(
  material: Material,
  fluxDensity_T: number,
  temperature_degC?: number,
): { density: number; relativeError: number; name: string } {
  const curve = magnetisationCurve(material, temperature_degC);
  const field = solveField(curve, 0, 1, fluxDensity_T);
  return {
    density: curve.energyDensity_J_per_m3(field),
    relativeError: fieldError(curve, field),
    name: `energy density ∫ H dB with ${curve.name}`,
  };
}
