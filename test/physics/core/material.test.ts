import { describe, expect, it } from 'vitest';
import {
  type Material,
  saturationFluxDensity_T,
  saturationTemperatureRange,
} from '../../../src/physics/core/material.ts';

const LIST = [
  { temperature_degC: -20, fluxDensity_T: 0.52 },
  { temperature_degC: 25, fluxDensity_T: 0.49 },
  { temperature_degC: 100, fluxDensity_T: 0.39 },
];
const listed: Material = { initialPermeability: 2300, saturation: LIST };

describe('saturationFluxDensity_T', () => {
  it('is linear between the entries and exact at them', () => {
    for (const { temperature_degC, fluxDensity_T } of LIST) {
      expect(saturationFluxDensity_T(listed, temperature_degC)).toBe(fluxDensity_T);
    }
    expect(saturationFluxDensity_T(listed, 62.5)).toBeCloseTo(0.44, 15);
    expect(saturationFluxDensity_T(listed, 2.5)).toBeCloseTo(0.505, 15);
  });

  it('reads a list at 25 °C where no temperature is given', () => {
    expect(saturationFluxDensity_T(listed)).toBe(0.49);
    expect(() =>
      saturationFluxDensity_T({ initialPermeability: 1, saturation: [{ temperature_degC: 100, fluxDensity_T: 0.4 }] }),
    ).toThrow('25 °C');
  });

  it('never goes beyond the list', () => {
    for (const temperature of [-20.001, 100.001, -273, 1e9, Number.NaN]) {
      expect(() => saturationFluxDensity_T(listed, temperature)).toThrow(
        expect.objectContaining({ pointer: '/saturation' }),
      );
    }
    expect(saturationTemperatureRange(listed)).toEqual({ lower_degC: -20, upper_degC: 100 });
  });

  it('of a single value holds at every temperature, and is null without one', () => {
    const single: Material = { initialPermeability: 2300, saturation: { fluxDensity_T: 0.4 } };
    expect(saturationFluxDensity_T(single, 400)).toBe(0.4);
    expect(saturationTemperatureRange(single)).toBeNull();
    expect(saturationFluxDensity_T({ initialPermeability: 2300 }, 400)).toBeNull();
  });

  const refused: [string, Material['saturation'], string][] = [
    ['an empty list', [], '/saturation'],
    ['temperatures that do not increase', [LIST[1]!, LIST[1]!], '/saturation/1/temperature_degC'],
    ['a flux density of zero', [{ temperature_degC: 25, fluxDensity_T: 0 }], '/saturation/0/fluxDensity_T'],
    ['a single zero', { fluxDensity_T: 0 }, '/saturation/fluxDensity_T'],
  ];
  it.each(refused)('refuses %s', (_, saturation, pointer) => {
    const material: Material = { initialPermeability: 1, ...(saturation ? { saturation } : {}) };
    expect(() => saturationFluxDensity_T(material, 25)).toThrow(expect.objectContaining({ pointer }));
  });
});
