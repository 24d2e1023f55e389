import { describe, expect, it } from 'vitest';
import { solveField } from '../../../src/physics/core/field-solver.ts';
import { fieldError, magnetisationCurve } from '../../../src/physics/core/magnetisation.ts';
import type { MagnetisationTable } from '../../../src/physics/core/material.ts';
import { integrate } from '../../../src/physics/numerics/quadrature.ts';

const MU0 = 1.25663706127e-6;
const relative = (value: number, truth: number) => Math.abs(value / truth - 1);
const tabulated = (magnetisation: MagnetisationTable) => magnetisationCurve({ initialPermeability: 1, magnetisation });

/** A rising and falling permeability, as of steel. */
const STEEL: MagnetisationTable = {
  field_A_per_m: [20, 50, 100, 200, 500, 1000, 2000, 5000, 1e4, 3e4],
  fluxDensity_T: [0.01, 0.05, 0.2, 0.6, 1.1, 1.3, 1.45, 1.6, 1.72, 1.95],
};

describe('tabulatedMagnetisation', () => {
  const steel = tabulated(STEEL);

  it('passes through its points, to and fro', () => {
    STEEL.field_A_per_m.forEach((field, k) => {
      expect(relative(steel.fluxDensity_T(field), STEEL.fluxDensity_T[k]!)).toBeLessThan(1e-15);
      const condition = STEEL.fluxDensity_T[k]! / field / steel.differentialPermeability_H_per_m(field);
      expect(relative(solveField(steel, 0, 1, STEEL.fluxDensity_T[k]!), field)).toBeLessThan(4e-15 * (1 + condition));
    });
  });

  it('rises at least as vacuum does, between its points and beyond', () => {
    for (let exponent = -3; exponent < 7; exponent += 0.01) {
      const field = 10 ** exponent;
      expect(steel.differentialPermeability_H_per_m(field)).toBeGreaterThanOrEqual(MU0);
    }
  });

  it('continues with the slope of vacuum beyond the last point, and says where that is', () => {
    expect(steel.lastField_A_per_m).toBe(3e4);
    expect(steel.differentialPermeability_H_per_m(3.1e4)).toBe(MU0);
    expect(relative(steel.fluxDensity_T(1e6), 1.95 + MU0 * (1e6 - 3e4))).toBeLessThan(1e-15);
    expect(fieldError(steel, 1e6)).toBeGreaterThan(fieldError(steel, 1e4));
  });

  it.each([5, 50, 333, 4000, 3e4, 1e5])('energies at %d A/m are the integrals, by quadrature piece by piece', (top) => {
    const edges = [...STEEL.field_A_per_m.filter((field) => field < top), top];
    let [energy, coenergy, from] = [0, 0, 0];
    for (const to of edges) {
      coenergy += integrate((h) => steel.fluxDensity_T(h), from, to, 6);
      energy += integrate((h) => h * steel.differentialPermeability_H_per_m(h), from, to, 6);
      from = to;
    }
    expect(relative(steel.energyDensity_J_per_m3(top), energy)).toBeLessThan(1e-14);
    expect(relative(steel.coenergyDensity_J_per_m3(top), coenergy)).toBeLessThan(1e-14);
  });

  it('may start at the origin or not', () => {
    const withOrigin = tabulated({
      field_A_per_m: [0, ...STEEL.field_A_per_m],
      fluxDensity_T: [0, ...STEEL.fluxDensity_T],
    });
    expect(withOrigin.fluxDensity_T(77)).toBe(steel.fluxDensity_T(77));
    const line = tabulated({ field_A_per_m: [0, 100], fluxDensity_T: [0, 0.1] });
    expect(relative(line.fluxDensity_T(30), 0.03)).toBeLessThan(1e-15);
    expect(relative(line.initialPermeability_H_per_m, 1e-3)).toBeLessThan(1e-15);
  });

  it('reproduces an analytic curve from thirty points within a thousandth', () => {
    const law = magnetisationCurve({
      initialPermeability: 2000,
      saturation: { fluxDensity_T: 0.4 },
      magnetisation: 'arctangent',
    });
    const field = Array.from({ length: 30 }, (_, k) => 10 * 1.35 ** k);
    const table = tabulated({ field_A_per_m: field, fluxDensity_T: field.map(law.fluxDensity_T) });
    for (let h = 5; h < field.at(-1)!; h *= 1.1) {
      expect(relative(table.fluxDensity_T(h), law.fluxDensity_T(h))).toBeLessThan(1e-3);
      expect(relative(table.energyDensity_J_per_m3(h), law.energyDensity_J_per_m3(h))).toBeLessThan(3e-3);
    }
  });

  it('takes the rounding of printed saturation for the slope of vacuum', () => {
    const rounded = tabulated({ field_A_per_m: [100, 1e5, 2e5], fluxDensity_T: [1, 2, 2.12] });
    expect(rounded.differentialPermeability_H_per_m(1.5e5)).toBeGreaterThanOrEqual(MU0);
    expect(relative(rounded.fluxDensity_T(2e5), 2.12)).toBeLessThan(0.005);
  });

  const refused: [string, MagnetisationTable, string][] = [
    ['one point', { field_A_per_m: [1], fluxDensity_T: [1] }, '/field_A_per_m'],
    ['different lengths', { field_A_per_m: [1, 2, 3], fluxDensity_T: [1, 2] }, '/fluxDensity_T'],
    ['a negative field', { field_A_per_m: [-1, 2], fluxDensity_T: [-1, 2] }, '/field_A_per_m/0'],
    ['fields that do not increase', { field_A_per_m: [1, 2, 2], fluxDensity_T: [1, 2, 3] }, '/field_A_per_m/2'],
    ['flux densities that do not increase', { field_A_per_m: [1, 2, 3], fluxDensity_T: [1, 2, 2] }, '/fluxDensity_T/2'],
    ['a flux density at zero field', { field_A_per_m: [0, 2], fluxDensity_T: [0.1, 2] }, '/fluxDensity_T/0'],
    ['J in place of B', { field_A_per_m: [100, 1e4, 1e6], fluxDensity_T: [1, 2, 2.05] }, '/fluxDensity_T/2'],
    ['nothing at the first field', { field_A_per_m: [1, 2], fluxDensity_T: [0, 2] }, '/fluxDensity_T/0'],
  ];
  it.each(refused)('refuses %s', (_, table, pointer) => {
    expect(() => tabulated(table)).toThrow(
      expect.objectContaining({ name: 'InvalidQuantity', pointer: `/magnetisation${pointer}` }),
    );
  });
});
