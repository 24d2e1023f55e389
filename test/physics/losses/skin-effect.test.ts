import { describe, expect, it } from 'vitest';
import { roundWireResistanceRatio, skinDepth_m } from '../../../src/physics/losses/skin-effect.ts';
import { conductorResistivity_ohm_m } from '../../../src/physics/losses/winding-resistance.ts';
import reference from '../../fixtures/mpmath/winding-losses.json' with { type: 'json' };

describe('skin depth', () => {
  // The book multiplies by a rounded constant: 0.15 %.
  it.each([
    ['copper', 5.813e7, 6.6e-7],
    ['aluminium', 3.816e7, 8.14e-7],
  ])('of %s at 10 GHz (D. M. Pozar, Microwave Engineering, Example 1.2)', (_metal, conductivity, published_m) => {
    expect(Math.abs(skinDepth_m(1 / conductivity, 1e10) / published_m - 1)).toBeLessThan(1.5e-3);
  });

  it('is infinite at 0 Hz and falls with the root of frequency', () => {
    expect(skinDepth_m(1.7e-8, 0)).toBe(Number.POSITIVE_INFINITY);
    expect(skinDepth_m(1.7e-8, 1e8) / skinDepth_m(1.7e-8, 1e6)).toBeCloseTo(0.1, 14);
    expect(skinDepth_m(1.7e-8, 1e-308)).toBeGreaterThan(1e150);
  });
});

describe('round wire, R/R_dc', () => {
  it.each([
    [1, 1.0052, 1.5e-4],
    [2, 1.0782, 1.5e-4],
    [5, 2.0427, 1.5e-4],
    [20, 7.328, 1.1e-3],
  ])('at x = %d (NBS Circular 74, 1924, Table 17)', (x, published, tolerance) => {
    expect(Math.abs(roundWireResistanceRatio(x) - published)).toBeLessThan(tolerance);
  });

  it('agrees with the Bessel functions at 50 digits to 1e-15, x from 1e-7 to 1e9', () => {
    expect(reference.roundWire.length).toBeGreaterThan(100);
    for (const [x, exact] of reference.roundWire as [number, number][]) {
      expect(Math.abs(roundWireResistanceRatio(x) / exact - 1), `x = ${x}`).toBeLessThan(1e-15);
    }
  });

  it('is 1 at no frequency, follows x⁴/192 from there and x/(2√2) + 1/4 at the other end', () => {
    expect(roundWireResistanceRatio(0)).toBe(1);
    expect(roundWireResistanceRatio(1e-300)).toBe(1);
    for (const x of [0.05, 0.1, 0.2]) {
      expect((roundWireResistanceRatio(x) - 1) / (x ** 4 / 192)).toBeCloseTo(1, 2);
    }
    for (const x of [1e4, 1e7]) {
      expect(Math.abs(roundWireResistanceRatio(x) / (x / Math.sqrt(8) + 0.25) - 1)).toBeLessThan(1 / (x * x));
    }
  });

  it('is continuous and increasing through the change of method at 40', () => {
    const below = roundWireResistanceRatio(40 * (1 - Number.EPSILON / 2));
    expect(Math.abs(roundWireResistanceRatio(40) / below - 1)).toBeLessThan(1e-15);
    let previous = 0;
    for (let x = 0.2; x < 80; x += 0.01) {
      const ratio = roundWireResistanceRatio(x);
      expect(ratio).toBeGreaterThan(previous);
      previous = ratio;
    }
  });

  it('is finite and at least 1 for every wire of 1 µm to 1 m from 0 to 1 THz', () => {
    const resistivity = conductorResistivity_ohm_m('copper', 20);
    for (const frequency of [0, 1e-308, 1, 50, 1e3, 1e6, 1e9, 1e12]) {
      for (const diameter of [1e-6, 1e-4, 1e-3, 1e-2, 1]) {
        const ratio = roundWireResistanceRatio(diameter / skinDepth_m(resistivity, frequency) / Math.SQRT2);
        expect(ratio).toBeGreaterThanOrEqual(1);
        expect(ratio).toBeLessThan(1e8);
      }
    }
  });
});
