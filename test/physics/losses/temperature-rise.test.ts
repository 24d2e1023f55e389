import { describe, expect, it } from 'vitest';
import { copperLoss } from '../../../src/physics/losses/copper-loss.ts';
import { type HeatedPart, type ThermalState, temperatureRise } from '../../../src/physics/losses/temperature-rise.ts';
import {
  conductorTemperatureRange,
  type Winding,
  windingResistance,
} from '../../../src/physics/losses/winding-resistance.ts';

const winding: Winding = { turns: 40, meanTurnLength_m: 0.06, wireDiameter_m: 8e-4, layers: 2, pitch_m: 9e-4 };
const method = { name: 'test', references: [], relativeError: 0.2, validity: '' };
const part = (change: Partial<HeatedPart>): HeatedPart => ({
  winding,
  current: { direct_A: 5 },
  ambient_degC: 40,
  cooling: { thermalResistance_K_per_W: 12 },
  ...change,
});

function steady(state: ThermalState): Extract<ThermalState, { steady: true }> {
  if (!state.steady) throw new Error(state.reason);
  return state;
}

/** Direct current through a thermal resistance: ΔT = A/(1 − αA) with A = R_th·I²·R_ambient and α = 1/(T_ambient − T₀). */
function closedForm(
  current_A: number,
  ambient_degC: number,
  resistance_K_per_W: number,
  of: Winding = winding,
): number {
  const a = resistance_K_per_W * current_A ** 2 * windingResistance(of, ambient_degC).resistance_ohm;
  return a / (1 - a / (ambient_degC - conductorTemperatureRange(of.conductor ?? 'copper').lower_degC));
}

describe('steady temperature by a thermal resistance', () => {
  it('has the closed form ΔT = A/(1 − αA) of direct current to 1e-14, from 1e-9 K to the melting point', () => {
    for (const conductor of ['copper', 'aluminium'] as const) {
      for (const ambient_degC of [-100, 25, 130]) {
        for (const current of [1e-5, 0.01, 1, 3, 5, 9]) {
          const of: Winding = { ...winding, conductor };
          const exact = closedForm(current, ambient_degC, 12, of);
          if (exact < 0 || ambient_degC + exact > conductorTemperatureRange(conductor).upper_degC) continue;
          const { rise_K } = steady(
            temperatureRise(part({ winding: of, current: { direct_A: current }, ambient_degC })),
          );
          expect(Math.abs(rise_K / exact - 1), `${current} A at ${ambient_degC} °C`).toBeLessThan(1e-14);
        }
      }
    }
  });

  it('runs away from exactly the current at which that form reaches the melting point', () => {
    // A/(1 − αA) = ΔT ⇔ A = ΔT/(1 + αΔT)
    const { lower_degC, upper_degC } = conductorTemperatureRange('copper');
    const rise = upper_degC - 40;
    const threshold_A = Math.sqrt(
      rise / (1 + rise / (40 - lower_degC)) / 12 / windingResistance(winding, 40).resistance_ohm,
    );
    const at = (share: number) => temperatureRise(part({ current: { direct_A: threshold_A * share } }));
    expect(steady(at(1 - 1e-9)).temperature_degC).toBeGreaterThan(upper_degC - 1e-3);
    const lost = at(1 + 1e-9);
    expect(lost.steady).toBe(false);
    expect(!lost.steady && lost.reason).toContain('no steady temperature');
  });

  it('says that it is a runaway where a kelvin heats by another', () => {
    // α·R_th·I²·R₀ = 1
    const { lower_degC } = conductorTemperatureRange('copper');
    const critical_A = Math.sqrt((40 - lower_degC) / 12 / windingResistance(winding, 40).resistance_ohm);
    const reason = (current_A: number) => {
      const state = temperatureRise(part({ current: { direct_A: current_A } }));
      return state.steady ? '' : state.reason;
    };
    expect(reason(critical_A * 1.0001)).toContain('thermal runaway');
    expect(reason(critical_A * 0.9999)).not.toContain('thermal runaway');
    expect(reason(critical_A * 0.9999)).toContain('melting point of copper');
  });

  it('is the product where resistance does not matter: core loss alone', () => {
    const state = steady(temperatureRise(part({ current: { direct_A: 0 }, core: { power_W: 2.5, method } })));
    expect(state.rise_K).toBeCloseTo(30, 12);
    expect(state.total_W).toBe(2.5);
    expect(state.method.relativeError).toBeCloseTo(0.2, 12);
  });

  it('is in balance with the losses at the temperature reached, harmonics and core included', () => {
    const current = { direct_A: 4, harmonics: [1e5, 3e5].map((frequency_Hz) => ({ frequency_Hz, rms_A: 0.8 })) };
    const state = steady(temperatureRise(part({ current, core: { power_W: 0.7, method } })));
    const hot = copperLoss(winding, current, state.temperature_degC);
    expect(state.copper).toEqual(hot);
    expect((12 * (hot.copper_W + 0.7)) / state.rise_K).toBeCloseTo(1, 12);
    expect(state.temperature_degC).toBe(40 + state.rise_K);
  });

  it('multiplies the error of the losses as heat begets heat', () => {
    const error = (current_A: number) =>
      steady(temperatureRise(part({ current: { direct_A: current_A } }))).method.relativeError;
    expect(error(0.01)).toBeCloseTo(0.03, 4);
    // Closed form: d ln ΔT/d ln A = 1/(1 − αA) = 1 + αΔT
    const { lower_degC } = conductorTemperatureRange('copper');
    expect(error(5) / (0.03 * (1 + closedForm(5, 40, 12) / (40 - lower_degC)))).toBeCloseTo(1, 9);
  });

  it('is nothing without loss', () => {
    const state = steady(temperatureRise(part({ current: { direct_A: 0 } })));
    expect(state.rise_K).toBe(0);
    expect(state.temperature_degC).toBe(40);
  });
});

describe('steady temperature of a surface', () => {
  it('rises by (mW/cm²)^0.833: 30 mW/cm² by 17 K (common practice)', () => {
    const cooling = { surfaceArea_m2: 0.01 };
    const state = steady(temperatureRise(part({ current: { direct_A: 0 }, core: { power_W: 3, method }, cooling })));
    expect(state.rise_K).toBeCloseTo(30 ** 0.833, 11);
    expect(state.rise_K).toBeCloseTo(17, 1);
  });

  it('has a bound that holds the other published fit, 450·(W/cm²)^0.826, from 1 mW/cm² to 1 W/cm²', () => {
    for (const density of [1e-3, 1e-2, 0.1, 1]) {
      const core = { power_W: density * 100, method: { ...method, relativeError: 0 } };
      const state = steady(
        temperatureRise(part({ current: { direct_A: 0 }, core, cooling: { surfaceArea_m2: 0.01 } })),
      );
      expect(Math.abs(450 * density ** 0.826 - state.rise_K) / state.rise_K).toBeLessThan(state.method.relativeError);
    }
  });

  it('is in balance with the losses at the temperature reached', () => {
    const state = steady(temperatureRise(part({ cooling: { surfaceArea_m2: 4e-3 } })));
    const hot_W = 25 * windingResistance(winding, state.temperature_degC).resistance_ohm;
    expect(((hot_W * 1e3) / 40) ** 0.833 / state.rise_K).toBeCloseTo(1, 12);
  });

  it('is an honest no where it would melt', () => {
    const state = temperatureRise(part({ current: { direct_A: 500 }, cooling: { surfaceArea_m2: 4e-3 } }));
    expect(!state.steady && state.reason).toContain('melting point of copper');
  });
});

describe('the balance of heat', () => {
  it('is crossed once above the ambient, whatever heats and cools: scanned kelvin by kelvin', () => {
    for (const cooling of [{ thermalResistance_K_per_W: 15 }, { surfaceArea_m2: 3e-3 }]) {
      for (const frequency_Hz of [1e3, 3e4, 1e6]) {
        for (const core_W of [0, 2]) {
          const current = { direct_A: 2, harmonics: [{ frequency_Hz, rms_A: 2 }] };
          const state = temperatureRise(part({ current, cooling, core: { power_W: core_W, method } }));
          const law = (power_W: number) =>
            'surfaceArea_m2' in cooling ? (power_W / 10 / cooling.surfaceArea_m2!) ** 0.833 : 15 * power_W;
          let crossings = 0;
          let first = 0;
          let below = true;
          for (let rise = 1; rise < 1044; rise++) {
            const now = rise < law(copperLoss(winding, current, 40 + rise).copper_W + core_W);
            if (now !== below) {
              crossings++;
              first ||= rise;
            }
            below = now;
          }
          expect(crossings).toBe(state.steady ? 1 : 0);
          if (state.steady) expect(Math.abs(state.rise_K - first + 0.5)).toBeLessThan(0.5 + 1e-9);
        }
      }
    }
  });

  it('grows with current, core loss and ambient, and falls with cooling', () => {
    const rise = (change: Partial<HeatedPart>) => steady(temperatureRise(part(change))).rise_K;
    for (const cooling of [{ thermalResistance_K_per_W: 10 }, { surfaceArea_m2: 5e-3 }]) {
      expect(rise({ cooling, current: { direct_A: 5.1 } })).toBeGreaterThan(rise({ cooling }));
      expect(rise({ cooling, core: { power_W: 0.1, method } })).toBeGreaterThan(rise({ cooling }));
      expect(rise({ cooling, ambient_degC: 41 })).toBeGreaterThan(rise({ cooling }));
    }
    expect(rise({ cooling: { thermalResistance_K_per_W: 11 } })).toBeLessThan(rise({}));
    expect(rise({ cooling: { surfaceArea_m2: 6e-3 } })).toBeLessThan(rise({ cooling: { surfaceArea_m2: 5e-3 } }));
  });

  it('names the field that it cannot use', () => {
    expect(() => temperatureRise(part({ cooling: {} }))).toThrow('/cooling:');
    expect(() => temperatureRise(part({ cooling: { surfaceArea_m2: 1, thermalResistance_K_per_W: 1 } }))).toThrow(
      '/cooling:',
    );
    expect(() => temperatureRise(part({ ambient_degC: -300 }))).toThrow('/ambient_degC:');
    expect(() => temperatureRise(part({ ambient_degC: 1e308 }))).toThrow('/ambient_degC:');
    expect(() => temperatureRise(part({ current: { direct_A: 1e200 } }))).toThrow('/current/direct_A:');
    expect(() =>
      temperatureRise(part({ cooling: { thermalResistance_K_per_W: 1e308 }, current: { direct_A: 1e3 } })),
    ).toThrow('/cooling:');
  });
});
