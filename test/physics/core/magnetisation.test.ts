import { describe, expect, it } from 'vitest';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import { solveField } from '../../../src/physics/core/field-solver.ts';
import { fieldError, magnetisationCurve } from '../../../src/physics/core/magnetisation.ts';
import type { Magnetisation, Material } from '../../../src/physics/core/material.ts';
import fixture from '../../fixtures/mpmath/magnetisation.json' with { type: 'json' };

type Law = Extract<Magnetisation, string>;
const LAWS: readonly Law[] = ['hyperbolic-tangent', 'arctangent', 'froehlich'];
const MU0 = VACUUM_PERMEABILITY_H_PER_M;

const relative = (value: number, truth: number) => (truth === 0 ? Math.abs(value) : Math.abs(value / truth - 1));
const curveOf = (magnetisation: Law, initialPermeability: number, fluxDensity_T: number) =>
  magnetisationCurve({ initialPermeability, saturation: { fluxDensity_T }, magnetisation });

describe.each(LAWS)('%s against 50 and more digits, µ 1 to 1e9, 1e-12 to 1e12 A/m', (law) => {
  const cases = fixture.rows
    .filter(([name]) => name === law)
    .map((row) => {
      const [, mu, js, field, fluxDensity, slope, energy, coenergy] = row as [
        Law,
        number,
        number,
        number,
        number,
        number,
        number,
        number,
      ];
      // tanh's slope falls as e^(−2x): the rounding of x alone moves it by 2x units in the last place.
      const reach = Math.min(((mu - 1) * MU0 * field) / js, 40);
      return { curve: curveOf(law, mu, js), field, fluxDensity, slope, energy, coenergy, reach };
    });
  const worst = (error: (row: (typeof cases)[number]) => number) => Math.max(...cases.map(error));

  it('B and dB/dH', () => {
    expect(cases.length).toBe(343);
    expect(worst(({ curve, field, fluxDensity }) => relative(curve.fluxDensity_T(field), fluxDensity))).toBeLessThan(
      2e-15,
    );
    const slopeError = ({ curve, field, slope }: (typeof cases)[number]) =>
      relative(curve.differentialPermeability_H_per_m(field), slope);
    expect(worst((row) => slopeError(row) / (1 + row.reach))).toBeLessThan(2e-15);
  });

  it('∫ H dB and ∫ B dH', () => {
    expect(worst(({ curve, field, energy }) => relative(curve.energyDensity_J_per_m3(field), energy))).toBeLessThan(
      3e-15,
    );
    expect(
      worst(({ curve, field, coenergy }) => relative(curve.coenergyDensity_J_per_m3(field), coenergy)),
    ).toBeLessThan(3e-15);
  });

  it('H(B) gives the field back as well as B determines it', () => {
    for (const { curve, field, fluxDensity } of cases) {
      const condition = fluxDensity / field / curve.differentialPermeability_H_per_m(field);
      expect(relative(solveField(curve, 0, 1, fluxDensity), field)).toBeLessThan(2e-15 * (1 + condition));
    }
  });
});

describe('magnetisationCurve', () => {
  it.each(LAWS)('%s starts at the initial permeability and ends at µ0', (law) => {
    const curve = curveOf(law, 2000, 0.4);
    expect(relative(curve.initialPermeability_H_per_m, 2000 * MU0)).toBeLessThan(1e-15);
    expect(curve.differentialPermeability_H_per_m(0)).toBe(curve.initialPermeability_H_per_m);
    expect(relative(curve.differentialPermeability_H_per_m(1e12), MU0)).toBeLessThan(1e-9);
    expect(relative(curve.fluxDensity_T(1e9) - MU0 * 1e9, 0.4)).toBeLessThan(1e-6);
  });

  it.each(LAWS)('%s is finite at zero field, in vacuum, and where the argument overflows', (law) => {
    for (const curve of [curveOf(law, 1, 0.4), curveOf(law, 1 + 2 ** -52, 0.4), curveOf(law, 1e6, 1e-300)]) {
      for (const field of [0, 1e-300, 1, 1e30]) {
        for (const value of [
          curve.fluxDensity_T(field),
          curve.differentialPermeability_H_per_m(field),
          curve.energyDensity_J_per_m3(field),
          curve.coenergyDensity_J_per_m3(field),
        ]) {
          expect(value).toBeGreaterThanOrEqual(0);
          expect(Number.isFinite(value)).toBe(true);
        }
      }
    }
  });

  it('is linear without a saturation flux density, whatever law is named', () => {
    const curve = magnetisationCurve({ initialPermeability: 60, magnetisation: 'froehlich' });
    expect(curve.saturationPolarisation_T).toBe(Number.POSITIVE_INFINITY);
    for (const field of [1e-9, 1, 1e9]) {
      expect(curve.fluxDensity_T(field)).toBe(60 * MU0 * field);
      expect(relative(curve.energyDensity_J_per_m3(field), 30 * MU0 * field ** 2)).toBeLessThan(1e-15);
    }
    expect(relative(solveField(curve, 0.1, 1e3, 7), 7 / (0.1 + 60 * MU0 * 1e3))).toBeLessThan(1e-15);
  });

  it('defaults to the hyperbolic tangent', () => {
    const material: Material = { initialPermeability: 2000, saturation: { fluxDensity_T: 0.4 } };
    expect(magnetisationCurve(material).fluxDensity_T(200)).toBe(
      curveOf('hyperbolic-tangent', 2000, 0.4).fluxDensity_T(200),
    );
  });

  it.each([0.999, 0, -1, Number.NaN, Number.POSITIVE_INFINITY])('refuses an initial permeability of %d', (mu) => {
    expect(() => magnetisationCurve({ initialPermeability: mu })).toThrow(
      expect.objectContaining({ name: 'InvalidQuantity', pointer: '/initialPermeability' }),
    );
  });

  it('refuses numbers beyond the range of floats rather than answer NaN', () => {
    const curve = curveOf('arctangent', 2000, 0.4);
    expect(() => solveField(curve, 0, 1, Number.POSITIVE_INFINITY)).toThrow(
      expect.objectContaining({ name: 'InvalidQuantity' }),
    );
    expect(() => solveField(curve, 0.1, 1, Number.POSITIVE_INFINITY)).toThrow(
      expect.objectContaining({ name: 'InvalidQuantity' }),
    );
  });

  it('is less sure of the field the more the law bends', () => {
    const curve = curveOf('hyperbolic-tangent', 2000, 0.4);
    expect(fieldError(curve, 0)).toBe(0);
    expect(fieldError(curve, 1e-3)).toBeLessThan(1e-6);
    expect(fieldError(curve, 1e6)).toBeGreaterThan(0.4);
    expect(fieldError(curve, 1e6)).toBeLessThanOrEqual(0.5);
  });
});
