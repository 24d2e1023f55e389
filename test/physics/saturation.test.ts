import { describe, expect, it } from 'vitest';
import { type Cored, coredCharacteristic } from '../../src/physics/characteristics/cored.ts';
import { linearCharacteristic } from '../../src/physics/characteristics/linear.ts';
import { measuredCharacteristic } from '../../src/physics/characteristics/measured.ts';
import type { Magnetisation, Material } from '../../src/physics/core/material.ts';
import {
  coredSaturation,
  dropCurrent,
  dropCurrent_A,
  energyAtFluxLimit,
  fluxDensityInSmallestSection_T,
  fluxLimitCurrent_A,
  saturationFluxDensity_T,
} from '../../src/physics/saturation.ts';
import fixture from '../fixtures/mpmath/cored.json' with { type: 'json' };

const MU0 = 1.25663706127e-6;
const relative = (value: number, truth: number) => Math.abs(value / truth - 1);
const coil = (material: Material, gap_m = 0, minimumArea_m2 = 178e-6): Cored => ({
  shape: 'cored',
  turns: 40,
  core: {
    effectiveArea_m2: 178e-6,
    effectiveLength_m: 0.097,
    minimumArea_m2,
    material,
    gap: { length_m: gap_m, area_m2: 2e-4 },
  },
});
const FERRITE: Material = { initialPermeability: 2300, saturation: { fluxDensity_T: 0.39 } };

describe('dropCurrent', () => {
  it('agrees with roots found in 130 digits, and finds none where there is none', () => {
    let checked = 0;
    for (const row of fixture.drops) {
      const [law, mu, js, gap, area, drop, truth] = row as [
        Extract<Magnetisation, string>,
        number,
        number,
        number,
        number,
        number,
        number | null,
      ];
      const c = coredCharacteristic({
        shape: 'cored',
        turns: fixture.turns,
        core: {
          effectiveArea_m2: fixture.effectiveArea_m2,
          effectiveLength_m: fixture.effectiveLength_m,
          material: { initialPermeability: mu, saturation: { fluxDensity_T: js }, magnetisation: law },
          ...(gap > 0 ? { gap: { length_m: gap, area_m2: area } } : {}),
        },
      });
      const found = dropCurrent_A(c, drop);
      checked += 1;
      if (truth === null) expect(found).toBeNull();
      else expect(relative(found!, truth)).toBeLessThan(1e-10);
    }
    expect(checked).toBe(144);
  });

  it('looks for the first crossing of a curve that dips and recovers', () => {
    const sweep = measuredCharacteristic({
      kind: 'differential',
      current_A: [0, 1, 2, 3, 4, 5],
      inductance_H: [1, 0.9, 0.6, 0.9, 0.5, 0.4],
    });
    const first = dropCurrent_A(sweep, 0.3)!;
    expect(first).toBeGreaterThan(1);
    expect(first).toBeLessThan(2);
    expect(sweep.differentialInductance_H(first)).toBeCloseTo(0.7, 12);
  });

  it('measures the drop from zero current where permeability first rises', () => {
    const steel = {
      field_A_per_m: [20, 50, 100, 200, 500, 1000, 2000, 5000],
      fluxDensity_T: [0.01, 0.05, 0.2, 0.6, 1.1, 1.3, 1.45, 1.6],
    };
    const c = coredCharacteristic(coil({ initialPermeability: 400, magnetisation: steel }));
    const initial = c.differentialInductance_H(0);
    const found = dropCurrent_A(c, 0.3)!;
    expect(relative(c.differentialInductance_H(found), 0.7 * initial)).toBeLessThan(1e-9);
    for (let i = found / 200; i < found; i += found / 200) {
      expect(c.differentialInductance_H(i)).toBeGreaterThan(0.7 * initial);
    }
  });

  it('finds a drop at the very end of a table, where the slope jumps to that of vacuum', () => {
    const table = { field_A_per_m: [100, 200], fluxDensity_T: [0.1, 0.2] };
    const c = coredCharacteristic(coil({ initialPermeability: 1, magnetisation: table }));
    expect(relative(dropCurrent_A(c, 0.5)!, (200 * 0.097) / 40)).toBeLessThan(1e-12);
  });

  it('says why there is none', () => {
    const method = { name: '', references: [], relativeError: 0, validity: '' };
    expect(dropCurrent(linearCharacteristic(1e-3, method), 0.3)).toEqual({
      current_A: null,
      reason: 'the inductance does not depend on current',
    });
    const shallow = measuredCharacteristic({
      kind: 'differential',
      current_A: [0, 5, 10],
      inductance_H: [1, 0.95, 0.88],
    });
    expect(dropCurrent(shallow, 0.3).reason).toContain('at the last reading, 10 A, it has fallen by 12.0 %');
    expect(dropCurrent(coredCharacteristic(coil({ initialPermeability: 60 })), 0.3).reason).toContain(
      'fallen by 0.00 %',
    );
    expect(dropCurrent(coredCharacteristic(coil({ ...FERRITE, initialPermeability: 2 })), 0.6).reason).toContain(
      '50.0 %',
    );
  });

  it.each([0, 1, -0.1, 1.5, Number.NaN])('refuses a drop of %d', (drop) => {
    expect(() => dropCurrent(coredCharacteristic(coil(FERRITE)), drop)).toThrow(
      expect.objectContaining({ name: 'InvalidQuantity', pointer: '/inductanceDrop' }),
    );
  });
});

describe('coredSaturation', () => {
  it('puts the flux limit where N·i = H·l_c + Js·l_g·(A_e/A_g)/µ0, H solved for by hand', () => {
    // Fröhlich with B = Js: x/χ + x/(1 + x) = 1, a quadratic in x = χ µ0 H/Js.
    const chi = 2299;
    const x = Math.sqrt(chi + 0.25) - 0.5; // x² + x = χ
    const field = (x * 0.39) / (chi * MU0);
    const i = (field * 0.097 + ((0.39 * 1e-3) / MU0) * (178e-6 / 2e-4)) / 40;
    const found = coredSaturation(coil({ ...FERRITE, magnetisation: 'froehlich' }, 1e-3), { current_A: 4 });
    expect(relative(found.fluxLimitCurrent_A!, i)).toBeLessThan(1e-12);
    const gapEnergy = ((0.39 * 0.39 * 178e-6 ** 2) / 2e-4) * (1e-3 / (2 * MU0));
    expect(relative(found.energyAtFluxLimit!.gap_J, gapEnergy)).toBeLessThan(1e-12);
    expect(found.energyAtFluxLimit!.total_J).toBe(found.energyAtFluxLimit!.gap_J + found.energyAtFluxLimit!.core_J);
    expect(relative(found.currentMargin!, i / 4 - 1)).toBeLessThan(1e-11);
    expect(found.fluxDensity_T).toBe(
      coredCharacteristic(coil({ ...FERRITE, magnetisation: 'froehlich' }, 1e-3)).fluxDensity_T(4),
    );
  });

  it('reaches the limit in the smallest section first', () => {
    const whole = fluxLimitCurrent_A(coil(FERRITE, 1e-3))!;
    const narrow = coil(FERRITE, 1e-3, 150e-6);
    const limit = fluxLimitCurrent_A(narrow)!;
    expect(limit).toBeLessThan(whole);
    expect(relative(fluxDensityInSmallestSection_T(narrow, limit), 0.39)).toBeLessThan(1e-13);
    expect(energyAtFluxLimit(narrow)!.total_J).toBeLessThan(energyAtFluxLimit(coil(FERRITE, 1e-3))!.total_J);
  });

  it('has a drop by default of 30 %, and neither margin nor flux density without a current', () => {
    const found = coredSaturation(coil(FERRITE, 1e-3));
    expect(found.dropCurrent_A).toBe(dropCurrent_A(coredCharacteristic(coil(FERRITE, 1e-3)), 0.3));
    expect(found).not.toHaveProperty('fluxDensity_T');
    expect(found).not.toHaveProperty('currentMargin');
    expect(coredSaturation(coil(FERRITE, 1e-3), { current_A: 0 })).not.toHaveProperty('currentMargin');
    expect(coredSaturation(coil(FERRITE, 1e-3), { current_A: -4 }).currentMargin).toBe(
      coredSaturation(coil(FERRITE, 1e-3), { current_A: 4 }).currentMargin,
    );
  });

  it('moves with temperature, and names a temperature outside the list', () => {
    const list = [
      { temperature_degC: 25, fluxDensity_T: 0.49 },
      { temperature_degC: 100, fluxDensity_T: 0.39 },
    ];
    const part = coil({ initialPermeability: 2300, saturation: list }, 1e-3);
    const limit = (temperature_degC: number) => coredSaturation(part, { temperature_degC }).fluxLimitCurrent_A!;
    expect(limit(100)).toBe(fluxLimitCurrent_A(coil(FERRITE, 1e-3)));
    expect(limit(60)).toBeGreaterThan(limit(90));
    expect(saturationFluxDensity_T(part, 100)).toBe(0.39);
    expect(() => limit(120)).toThrow(expect.objectContaining({ pointer: '/coil/core/material/saturation' }));
    expect(() => limit(120)).toThrow('120 °C');
  });

  it('has no flux limit without saturation, and says so', () => {
    const found = coredSaturation(coil({ initialPermeability: 60 }, 1e-3), { current_A: 5 });
    expect(found).toMatchObject({ dropCurrent_A: null, fluxLimitCurrent_A: null, energyAtFluxLimit: null });
    expect(found.fluxLimitReason).toContain('no saturation');
    expect(found.dropReason).toBeDefined();
    expect(found.fluxDensity_T).toBeGreaterThan(0);
    expect(energyAtFluxLimit(coil({ initialPermeability: 60 }))).toBeNull();
    expect(saturationFluxDensity_T(coil({ initialPermeability: 60 }))).toBeNull();
  });

  it('gives a table with a saturation a flux limit, and one without none', () => {
    const magnetisation = { field_A_per_m: [100, 1000, 1e4], fluxDensity_T: [0.3, 1.2, 1.6] };
    const found = coredSaturation(coil({ initialPermeability: 1, magnetisation, saturation: { fluxDensity_T: 1.2 } }));
    expect(relative(found.fluxLimitCurrent_A!, (1000 * 0.097) / 40)).toBeLessThan(1e-12);
    expect(coredSaturation(coil({ initialPermeability: 1, magnetisation })).fluxLimitCurrent_A).toBeNull();
  });
});
