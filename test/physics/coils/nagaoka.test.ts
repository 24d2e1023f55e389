import { describe, expect, it } from 'vitest';
import { currentSheetInductance_H, nagaokaCoefficient } from '../../../src/physics/coils/nagaoka.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import lorenz from '../../fixtures/mpmath/nagaoka.json' with { type: 'json' };
import fieldEnergy from '../../fixtures/scipy/sheet-field-energy.json' with { type: 'json' };

const rows = (table: unknown) => table as [number, number][];

describe('Nagaoka’s coefficient', () => {
  it('agrees with Lorenz’s closed form at 60 digits for diameter/length from 1e-6 to 1e6', () => {
    expect(lorenz.length).toBe(247);
    const worst = Math.max(...rows(lorenz).map(([u, expected]) => Math.abs(nagaokaCoefficient(u) / expected - 1)));
    expect(worst).toBeLessThan(3e-15);
  });

  it('agrees with the energy of the field, ∫B²/2µ0 dV = ½LI²', () => {
    for (const [u, expected] of rows(fieldEnergy)) {
      expect(Math.abs(nagaokaCoefficient(u) / expected - 1), `u = ${u}`).toBeLessThan(2e-9);
    }
  });

  it.each([
    [0.25, 0.901649],
    [0.5, 0.818136],
    [1, 0.688423],
    [2.5, 0.471865],
    [5, 0.319825],
  ])('published: K(%f) = %f, Nagaoka 1909, table on p. 31', (u, expected) => {
    // One unit of the last printed figure: the table's own rounding.
    expect(Math.abs(nagaokaCoefficient(u) - expected)).toBeLessThan(1e-6);
  });

  it.each([
    [0.1, 0.9588],
    [0.8, 0.7351],
    [1.5, 0.595],
    [10, 0.2033],
    [20, 0.1236],
    [100, 0.035],
  ])('published: K(%f) = %f, NBS Circular 74, table 10', (u, expected) => {
    expect(Math.abs(nagaokaCoefficient(u) - expected)).toBeLessThan(5.1e-5);
  });

  it('stays finite far outside: 1 for the endless coil, (2/πu) ln 4u for the flat one', () => {
    expect(nagaokaCoefficient(1e-300)).toBe(1);
    const u = 1e200;
    const flat = (2 / (Math.PI * u)) * (Math.log(4 * u) - 0.5);
    expect(Math.abs(nagaokaCoefficient(u) / flat - 1)).toBeLessThan(1e-15);
  });
});

describe('inductance of the current sheet', () => {
  it('is that of the endless solenoid when long', () => {
    // OpenStax, University Physics vol. 2, chapter 14 problem: 1e4 turns a metre, radius 0.015 m, 0.089 H a metre.
    const length = 1e5;
    const perMetre = currentSheetInductance_H(1e4 * length, 0.03, length) / length;
    expect(Math.abs(perMetre - 0.089)).toBeLessThan(5e-4);
    const exact = VACUUM_PERMEABILITY_H_PER_M * 1e8 * Math.PI * 0.015 ** 2;
    expect(Math.abs(perMetre / exact - 1)).toBeLessThan(2e-7);
  });

  it('goes as turns² and as size', () => {
    for (const ratio of [1e-6, 0.1, 1, 3, 5, 1e6]) {
      const inductance = currentSheetInductance_H(7, ratio, 1);
      expect(Math.abs(currentSheetInductance_H(7e3, ratio, 1) / inductance / 1e6 - 1)).toBeLessThan(1e-15);
      for (const scale of [1e9, 1e-9]) {
        const scaled = currentSheetInductance_H(7, ratio * scale, scale) / scale;
        expect(Math.abs(scaled / inductance - 1)).toBeLessThan(3e-15);
      }
    }
  });
});
