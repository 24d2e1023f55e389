import { describe, expect, it } from 'vitest';
import { coredCharacteristic } from '../../src/physics/characteristics/cored.ts';
import { linearCharacteristic } from '../../src/physics/characteristics/linear.ts';
import { measuredCharacteristic } from '../../src/physics/characteristics/measured.ts';
import { energyQuantities } from '../../src/physics/energy.ts';

const METHOD = { name: '', references: [], relativeError: 0, validity: '' };
const relative = (value: number, truth: number) => Math.abs(value / truth - 1);

describe('energyQuantities', () => {
  it('of a constant inductance: published energies, and no error of the linear estimate', () => {
    // OpenStax, College Physics 2e, Example 23.8; University Physics vol. 2, check your understanding 14.3: 4.0 H at 2.0 V/4.0 Ω.
    expect(energyQuantities(linearCharacteristic(0.632e-3, METHOD), 30).energy_J).toBeCloseTo(0.2844, 12);
    const steady = energyQuantities(linearCharacteristic(4, METHOD), 0.5);
    expect(steady).toMatchObject({
      energy_J: 0.5,
      coenergy_J: 0.5,
      fluxLinkage_Wb: 2,
      apparentInductance_H: 4,
      differentialInductance_H: 4,
      linearEstimate_J: 0.5,
      linearEstimateError: 0,
    });
  });

  it('of a part that saturates: the linear estimate is too high by what it says', () => {
    const choke = coredCharacteristic({
      shape: 'cored',
      turns: 30,
      core: {
        effectiveArea_m2: 178e-6,
        effectiveLength_m: 0.097,
        material: { initialPermeability: 2300, saturation: { fluxDensity_T: 0.39 } },
        gap: { length_m: 1e-3 },
      },
    });
    const found = energyQuantities(choke, 15);
    expect(relative(found.linearEstimate_J, (choke.differentialInductance_H(0) / 2) * 225)).toBeLessThan(1e-15);
    expect(relative(found.linearEstimate_J, found.energy_J * (1 + found.linearEstimateError))).toBeLessThan(1e-14);
    expect(found.linearEstimateError).toBeGreaterThan(0.5);
    expect(relative(found.energy_J + found.coenergy_J, 15 * found.fluxLinkage_Wb)).toBeLessThan(1e-14);
    expect(found.method.relativeError).toBe(choke.relativeErrorAt!(15));
  });

  it('of a measured sweep, by hand: dλ/di = 2 mH falling in a straight line to 1 mH at 10 A', () => {
    const sweep = measuredCharacteristic({
      kind: 'differential',
      current_A: [0, 5, 10],
      inductance_H: [2e-3, 1.5e-3, 1e-3],
    });
    const found = energyQuantities(sweep, 10);
    // ∫ i (2 − 0.1 i) di = i² − i³/30 mJ
    expect(relative(found.energy_J, (100 - 1000 / 30) * 1e-3)).toBeLessThan(1e-14);
    expect(relative(found.linearEstimate_J, 0.1)).toBeLessThan(1e-14);
    expect(relative(found.linearEstimateError, 0.5)).toBeLessThan(1e-13);
    // straight as it is, three readings leave more open than that
    expect(found.method.relativeError).toBeLessThan(0.05);
  });

  it('at zero current is zero and finite', () => {
    const found = energyQuantities(linearCharacteristic(1e-3, METHOD), 0);
    expect(found).toMatchObject({ energy_J: 0, linearEstimateError: 0, apparentInductance_H: 1e-3 });
  });

  it('passes on that a sweep ends', () => {
    const sweep = measuredCharacteristic({ kind: 'apparent', current_A: [0, 10], inductance_H: [1, 1] });
    expect(() => energyQuantities(sweep, 11)).toThrow(
      expect.objectContaining({ name: 'InvalidQuantity', pointer: '' }),
    );
  });
});
