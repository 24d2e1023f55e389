import { describe, expect, it } from 'vitest';
import { linearCharacteristic } from '../../../src/physics/characteristics/linear.ts';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import type { Method } from '../../../src/physics/method.ts';

const METHOD: Method = { name: 'test', references: ['r'], relativeError: 0.01, validity: 'v' };

describe('linearCharacteristic', () => {
  it('gives the published stored energies of a constant inductance', () => {
    // OpenStax, College Physics 2e, Example 23.8: 0.632 mH at 30.0 A stores 0.284 J.
    expect(linearCharacteristic(0.632e-3, METHOD).energy_J(30)).toBeCloseTo(0.2844, 12);
    // OpenStax, College Physics 2e, ch. 23: 25.0 H at 100 A stores 125 kJ.
    expect(linearCharacteristic(25, METHOD).energy_J(100)).toBe(125e3);
    // OpenStax, University Physics vol. 2, ch. 14: 40 mH holds 2.0 µJ at 10 mA.
    expect(linearCharacteristic(0.04, METHOD).energy_J(0.01)).toBeCloseTo(2e-6, 18);
  });

  it.each([1e-30, 1e-9, 1, 1e9, 1e30])(
    'holds λ = L·i and W + W′ = i·λ for L = %g H at every scale of current',
    (inductance) => {
      const line = linearCharacteristic(inductance, METHOD);
      for (const current of [0, 1e-30, 1e-9, 0.3, 1e9, 1e30]) {
        const linkage = line.fluxLinkage_Wb(current);
        expect(line.apparentInductance_H(current)).toBe(inductance);
        expect(line.differentialInductance_H(current)).toBe(inductance);
        expect(Math.abs(line.current_A(linkage) - current)).toBeLessThanOrEqual(4e-16 * current);
        const sum = line.energy_J(current) + line.coenergy_J(current);
        expect(Math.abs(sum - current * linkage)).toBeLessThanOrEqual(4e-16 * current * linkage);
        expect(line.fluxLinkage_Wb(-current)).toBe(-linkage);
        expect(line.energy_J(-current)).toBe(line.energy_J(current));
      }
    },
  );

  it('carries the method of the inductance and has no largest current', () => {
    const line = linearCharacteristic(1e-3, METHOD);
    expect(line.kind).toBe('linear');
    expect(line.method).toBe(METHOD);
    expect(line.maximumCurrent_A).toBe(Number.POSITIVE_INFINITY);
    expect(linearCharacteristic(1e-3).method.name).toContain('as given');
  });

  it.each([0, -1, Number.NaN, Number.POSITIVE_INFINITY])('refuses %d H', (inductance) => {
    expect(() => linearCharacteristic(inductance, METHOD)).toThrow(InvalidQuantity);
  });
});
