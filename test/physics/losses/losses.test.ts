import { describe, expect, it } from 'vitest';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import { type LossesRequest, losses } from '../../../src/physics/losses/losses.ts';

/** A ripple choke of two layers on a ferrite core. */
const request: LossesRequest = {
  winding: { turns: 40, meanTurnLength_m: 0.06, wireDiameter_m: 8e-4, layers: 2, pitch_m: 9e-4, windowArea_m2: 6e-5 },
  current: { direct_A: 5, harmonics: [{ frequency_Hz: 1e5, rms_A: 0.5 }] },
  core: { volume_m3: 5e-6, loss: { k: 1.3, alpha: 1.46, beta: 2.75 } },
  flux: { frequency_Hz: 1e5, amplitude_T: 0.05 },
  temperature_degC: 40,
};

describe('losses', () => {
  it('adds copper and core at the temperature given', () => {
    const result = losses(request);
    // 1/58 µΩ·m at 20 °C, 0.00393 /K
    const direct = ((1e-6 / 58) * (1 + 0.00393 * 20) * 40 * 0.06) / ((Math.PI / 4) * 64e-8);
    expect(result.directResistance_ohm / direct).toBeCloseTo(1, 13);
    const harmonic = result.harmonics?.[0];
    expect(harmonic && (25 * direct + harmonic.power_W) / result.copper_W).toBeCloseTo(1, 13);
    expect(result.core_W / (5e-6 * 1.3 * 1e5 ** 1.46 * 0.05 ** 2.75)).toBeCloseTo(1, 13);
    expect(result.total_W).toBe(result.copper_W + result.core_W);
    expect(result.temperature_degC).toBe(40);
    expect(result.rise_K).toBeUndefined();
    expect(result.conductorFillFactor).toBeCloseTo((40 * (Math.PI / 4) * 64e-8) / 6e-5, 14);
  });

  it('takes the temperature as the ambient where there is cooling, and answers for the one reached', () => {
    const cooled = losses({ ...request, cooling: { thermalResistance_K_per_W: 12 } });
    expect(cooled.rise_K! / (12 * cooled.total_W)).toBeCloseTo(1, 12);
    expect(cooled.temperature_degC).toBe(40 + cooled.rise_K!);
    const there = losses({ ...request, temperature_degC: cooled.temperature_degC });
    expect(cooled.directResistance_ohm).toBe(there.directResistance_ohm);
    expect(cooled.harmonics).toEqual(there.harmonics);
    expect(cooled.total_W).toBe(there.total_W);
  });

  it('leaves out what was not asked', () => {
    const { winding } = request;
    const result = losses({ winding, current: { direct_A: 5 }, temperature_degC: 20 });
    expect(result.core_W).toBe(0);
    expect('harmonics' in result).toBe(false);
    expect('rise_K' in result).toBe(false);
    expect(Object.keys(result.methods)).toEqual(['copper']);
    expect(losses({ ...request, winding: { turns: 1, meanTurnLength_m: 1, wireDiameter_m: 1e-3 } })).not.toHaveProperty(
      'conductorFillFactor',
    );
  });

  it('carries the largest error of its parts', () => {
    const { method, methods } = losses({ ...request, cooling: { surfaceArea_m2: 5e-3 } });
    const errors = Object.values(methods).map((part) => part.relativeError);
    expect(errors.length).toBe(3);
    expect(method.relativeError).toBe(Math.max(...errors));
  });

  it.each<[string, Partial<LossesRequest>, string]>([
    ['temperature', { temperature_degC: -300 }, '/temperature_degC'],
    ['ambient', { temperature_degC: 1100, cooling: { surfaceArea_m2: 1 } }, '/temperature_degC'],
    ['runaway', { cooling: { thermalResistance_K_per_W: 1e3 } }, '/cooling'],
    ['no cooling in cooling', { cooling: {} }, '/cooling'],
    ['winding', { winding: { turns: 1, meanTurnLength_m: 1 } }, '/winding/wireDiameter_m'],
    ['window', { winding: { ...request.winding, windowArea_m2: 2e-5 } }, '/winding/windowArea_m2'],
    ['flux', { flux: { frequency_Hz: 1, phase: [0, 2], fluxDensity_T: [0, 1] } }, '/flux/phase/1'],
    ['flux beyond numbers', { flux: { frequency_Hz: 1e308, amplitude_T: 1 } }, '/core/loss'],
    [
      'flux beyond numbers, pieces',
      { flux: { frequency_Hz: 1, phase: [0, 0.5], fluxDensity_T: [-1e308, 1e308] } },
      '/core/loss',
    ],
    ['current', { current: { direct_A: 1e300 } }, '/current/direct_A'],
  ])('points at %s', (_name, change, pointer) => {
    expect(() => losses({ ...request, ...change })).toThrow(InvalidQuantity);
    expect(() => losses({ ...request, ...change })).toThrow(`${pointer}:`);
  });

  it('needs core and flux together', () => {
    const { core: _core, ...withoutCore } = request;
    const { flux: _flux, ...withoutFlux } = request;
    expect(() => losses(withoutCore)).toThrow('/core:');
    expect(() => losses(withoutFlux)).toThrow('/flux:');
  });

  it('says why there is no steady temperature', () => {
    expect(() => losses({ ...request, cooling: { thermalResistance_K_per_W: 1e3 } })).toThrow(
      /no steady temperature.*runaway/,
    );
  });

  it('is the same part at any scale of current and cooling: I by s, cooling by 1/s²', () => {
    const { winding } = request;
    const at = (s: number) =>
      losses({
        winding,
        current: { direct_A: 5 * s },
        temperature_degC: 40,
        cooling: { thermalResistance_K_per_W: 12 / s / s },
      });
    for (const s of [1e9, 1e-9]) {
      expect(at(s).rise_K! / at(1).rise_K!).toBeCloseTo(1, 12);
      expect(at(s).total_W / (at(1).total_W * s * s)).toBeCloseTo(1, 12);
    }
  });
});
