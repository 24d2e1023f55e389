import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findRoot } from '../../../src/physics/numerics/roots.ts';

describe('Brent’s root finder', () => {
  it.each<[string, (x: number) => number, number, number, number]>([
    ['a cosine', (x) => Math.cos(x) - x, 0, 1, 0.7390851332151607],
    ['a cubic (Wallis)', (x) => x ** 3 - 2 * x - 5, 2, 3, 2.0945514815423265],
    ['Lambert’s W(1)', (x) => x * Math.exp(x) - 1, 0, 1, 0.5671432904097838],
    ['the first zero of the sinc’s slope', (x) => Math.tan(x) - x, 4.4, 4.6, 4.493409457909064],
  ])('finds %s to rounding', (_, f, low, high, root) => {
    expect(Math.abs(findRoot(f, low, high) / root - 1)).toBeLessThan(1e-15);
    expect(Math.abs(findRoot(f, high, low) / root - 1)).toBeLessThan(1e-15);
  });

  it('keeps its relative accuracy at every magnitude', () => {
    for (const root of [1e-200, 1e-9, 1, 1e9, 1e200]) {
      const found = findRoot((x) => Math.atan(x / root) - Math.PI / 4, 0, 1e3 * root);
      expect(Math.abs(found / root - 1), `${root}`).toBeLessThan(2e-15);
    }
  });

  it('ends on flat, steep and discontinuous functions', () => {
    expect(Math.abs(findRoot((x) => (x - 0.3) ** 9, 0, 1) - 0.3)).toBeLessThan(0.02);
    expect(Math.abs(findRoot((x) => Math.cbrt(x - 0.3), 0, 1) / 0.3 - 1)).toBeLessThan(1e-15);
    expect(Math.abs(findRoot((x) => (x < 0.3 ? -1 : 1), 0, 1) / 0.3 - 1)).toBeLessThan(1e-15);
  });

  it('takes an end that is the root, and never leaves the bracket', () => {
    expect(findRoot((x) => x, 0, 1)).toBe(0);
    expect(findRoot((x) => x - 1, 0, 1)).toBe(1);
    fc.assert(
      fc.property(fc.double({ min: 0.001, max: 0.999, noNaN: true }), fc.integer({ min: 1, max: 9 }), (root, power) => {
        let calls = 0;
        const found = findRoot(
          (x) => {
            calls++;
            expect(x).toBeGreaterThanOrEqual(0);
            expect(x).toBeLessThanOrEqual(1);
            return x ** power - root ** power;
          },
          0,
          1,
        );
        expect(Math.abs(found / root - 1)).toBeLessThan(1e-13);
        expect(calls).toBeLessThan(150);
      }),
      { seed: 5, numRuns: 300 },
    );
  });

  it('stops early where a coarse answer will do', () => {
    let calls = 0;
    const f = (x: number) => {
      calls++;
      return Math.exp(x) - 2;
    };
    expect(Math.abs(findRoot(f, 0, 10, 1e-3) / Math.LN2 - 1)).toBeLessThan(2e-3);
    const coarse = calls;
    calls = 0;
    findRoot(f, 0, 10);
    expect(coarse).toBeLessThan(calls);
  });

  it('refuses a bracket without a sign change', () => {
    expect(() => findRoot((x) => x * x + 1, -1, 1)).toThrow(RangeError);
    expect(() => findRoot((x) => 1 / x, 0, 1)).toThrow(RangeError);
    expect(() => findRoot(() => Number.NaN, 0, 1)).toThrow(RangeError);
  });
});
