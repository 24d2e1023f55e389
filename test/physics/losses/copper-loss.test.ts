import { describe, expect, it } from 'vitest';
import { alternatingResistanceRatio } from '../../../src/physics/losses/alternating-resistance.ts';
import { copperLoss } from '../../../src/physics/losses/copper-loss.ts';
import { type Winding, windingResistance } from '../../../src/physics/losses/winding-resistance.ts';

const winding: Winding = { turns: 40, meanTurnLength_m: 0.06, wireDiameter_m: 8e-4, layers: 2, pitch_m: 9e-4 };

describe('copperLoss', () => {
  it('is I²R of the direct current and of each harmonic with its own ratio', () => {
    const current = { direct_A: -5, harmonics: [1e4, 2e5, 3e6].map((frequency_Hz) => ({ frequency_Hz, rms_A: 0.4 })) };
    const { directResistance_ohm, harmonics, copper_W } = copperLoss(winding, current, 90);
    expect(directResistance_ohm).toBe(windingResistance(winding, 90).resistance_ohm);
    let expected = 25 * directResistance_ohm;
    harmonics.forEach(({ frequency_Hz, resistanceRatio, power_W }, i) => {
      expect(frequency_Hz).toBe(current.harmonics[i]!.frequency_Hz);
      expect(resistanceRatio).toBe(alternatingResistanceRatio(winding, frequency_Hz, 90).resistanceRatio);
      expect(power_W / (0.16 * directResistance_ohm * resistanceRatio)).toBeCloseTo(1, 14);
      expected += power_W;
    });
    expect(copper_W / expected).toBeCloseTo(1, 14);
  });

  it('weighs the errors of its parts by their powers', () => {
    const direct = windingResistance(winding, 20).method.relativeError;
    expect(copperLoss(winding, { direct_A: 5 }, 20).method.relativeError).toBe(direct);
    const harmonic = { frequency_Hz: 1e6, rms_A: 1 };
    const alone = copperLoss(winding, { direct_A: 0, harmonics: [harmonic] }, 20).method.relativeError;
    expect(alone).toBeCloseTo(direct + alternatingResistanceRatio(winding, 1e6, 20).method.relativeError, 12);
    const mixed = copperLoss(winding, { direct_A: 5, harmonics: [harmonic] }, 20).method.relativeError;
    expect(mixed).toBeGreaterThan(direct);
    expect(mixed).toBeLessThan(alone);
  });

  it('is nothing without current', () => {
    const idle = copperLoss(winding, { direct_A: 0, harmonics: [] }, 20);
    expect(idle.copper_W).toBe(0);
    expect(idle.harmonics).toEqual([]);
    expect(Number.isFinite(idle.method.relativeError)).toBe(true);
    expect(copperLoss(winding, { direct_A: 0, harmonics: [{ frequency_Hz: 1e5, rms_A: 0 }] }, 20).copper_W).toBe(0);
  });

  it('names the field that it cannot use', () => {
    const harmonics = (...frequencies: number[]) => ({
      direct_A: 1,
      harmonics: frequencies.map((frequency_Hz) => ({ frequency_Hz, rms_A: 1 })),
    });
    expect(() => copperLoss(winding, harmonics(50, 150, 50), 20)).toThrow('/current/harmonics/2/frequency_Hz:');
    expect(() => copperLoss({ ...winding, wireDiameter_m: 8e153, pitch_m: 8e153 }, harmonics(1e308), 20)).toThrow(
      '/current/harmonics/0/frequency_Hz:',
    );
    expect(() => copperLoss(winding, { direct_A: 1e200 }, 20)).toThrow('/current/direct_A:');
    expect(() => copperLoss(winding, { direct_A: 0, harmonics: [{ frequency_Hz: 50, rms_A: 1e200 }] }, 20)).toThrow(
      '/current/harmonics/0/rms_A:',
    );
    expect(() => copperLoss({ ...winding, pitch_m: 7e-4 }, { direct_A: 1 }, 20)).toThrow('/winding/pitch_m:');
    expect(() => copperLoss(winding, { direct_A: 1 }, -300)).toThrow(/^\/temperature_degC:/);
  });
});
