import { describe, expect, it } from 'vitest';
import type { Material } from '../../src/physics/core/material.ts';
import { type EnergyDensityQuestion, energyDensity } from '../../src/physics/energy-density.ts';
import fixture from '../fixtures/mpmath/magnetisation.json' with { type: 'json' };

const relative = (value: number, truth: number) => Math.abs(value / truth - 1);
const FERRITE: Material = {
  initialPermeability: 2300,
  saturation: [
    { temperature_degC: 25, fluxDensity_T: 0.49 },
    { temperature_degC: 100, fluxDensity_T: 0.39 },
  ],
};

describe('energyDensity', () => {
  it('of 1.0 T in air is 3.98e5 J/m³, and as much pressure', () => {
    // B²/(2µ0), OpenStax, University Physics vol. 2, eq. 14.18
    const found = energyDensity({ fluxDensity_T: 1 });
    expect(Math.abs(found.energyDensity_J_per_m3 - 3.98e5)).toBeLessThan(5e2);
    expect(relative(found.energyDensity_J_per_m3, 397_887.4)).toBeLessThan(2e-7);
    expect(found.pressure_Pa).toBe(found.energyDensity_J_per_m3);
    expect(found).not.toHaveProperty('energy_J');
  });

  it('of a linear medium is less by its permeability, the pull on its face is not', () => {
    const found = energyDensity({ fluxDensity_T: -0.5, relativePermeability: 2000, volume_m3: 3e-6 });
    expect(relative(found.energyDensity_J_per_m3, 397_887.357_8 / 4 / 2000)).toBeLessThan(1e-9);
    expect(relative(found.pressure_Pa, 397_887.357_8 / 4)).toBeLessThan(1e-9);
    expect(relative(found.energy_J!, found.energyDensity_J_per_m3 * 3e-6)).toBeLessThan(1e-15);
  });

  it('of a saturating material is ∫ H dB, against 50 digits', () => {
    for (const row of fixture.rows) {
      const [magnetisation, initialPermeability, saturation_T, field, fluxDensity_T, slope, energy] = row as [
        'froehlich',
        number,
        number,
        number,
        number,
        number,
        number,
      ];
      if (field < 1e-6 || field > 1e9) continue;
      const material: Material = { initialPermeability, saturation: { fluxDensity_T: saturation_T }, magnetisation };
      const found = energyDensity({ fluxDensity_T, material });
      // dW = H dB: where B hardly determines H, neither does it the energy
      const condition = Math.max((field * fluxDensity_T) / energy, fluxDensity_T / field / slope);
      expect(relative(found.energyDensity_J_per_m3, energy)).toBeLessThan(4e-15 * (1 + condition));
    }
  });

  it('of a saturating material at small flux density is B²/(2µ), and depends on temperature at large', () => {
    const at = (fluxDensity_T: number, temperature_degC: number) =>
      energyDensity({ fluxDensity_T, material: FERRITE, temperature_degC }).energyDensity_J_per_m3;
    const linear = energyDensity({ fluxDensity_T: 1e-6, relativePermeability: 2300 }).energyDensity_J_per_m3;
    expect(relative(at(1e-6, 25), linear)).toBeLessThan(1e-9);
    expect(at(0.38, 100)).toBeGreaterThan(at(0.38, 25));
    expect(energyDensity({ fluxDensity_T: 0.38, material: FERRITE }).energyDensity_J_per_m3).toBe(at(0.38, 25));
    expect(energyDensity({ fluxDensity_T: 0.38, material: FERRITE }).method.relativeError).toBeGreaterThan(0.1);
  });

  it('of no field is nothing', () => {
    expect(energyDensity({ fluxDensity_T: 0, material: FERRITE, volume_m3: 1 })).toMatchObject({
      energyDensity_J_per_m3: 0,
      pressure_Pa: 0,
      energy_J: 0,
    });
  });

  const refused: [string, EnergyDensityQuestion, string][] = [
    ['permeability and material', { fluxDensity_T: 1, relativePermeability: 2, material: FERRITE }, '/material'],
    ['no permeability', { fluxDensity_T: 1, relativePermeability: 0 }, '/relativePermeability'],
    ['a temperature outside', { fluxDensity_T: 1, material: FERRITE, temperature_degC: 130 }, '/material/saturation'],
  ];
  it.each(refused)('refuses %s', (_, question, pointer) => {
    expect(() => energyDensity(question)).toThrow(expect.objectContaining({ name: 'InvalidQuantity', pointer }));
  });
});
