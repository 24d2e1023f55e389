import { describe, expect, it } from 'vitest';
import { lowerQuantile, lowerTail, upperQuantile, upperTail } from '../../../src/metrology/statistics/scaled-chi.ts';
import reference from '../../fixtures/mpmath/noncentral-t.json' with { type: 'json' };

describe('the distribution of s/σ', () => {
  it('both tails, to 1e-12 wherever they are above 1e-290', () => {
    let compared = 0;
    for (const [nu, x, lower, upper] of reference.chi as [number, number, number, number][]) {
      for (const [found, expected] of [
        [lowerTail(nu, x), lower],
        [upperTail(nu, x), upper],
      ] as const) {
        // x itself is rounded, which a tail z standard deviations out feels z·x/spread times over.
        const condition = 1e-16 * Math.sqrt(2 * nu) * Math.sqrt(-2 * Math.log(expected) + 1);
        if (expected > 1e-290) expect(Math.abs(found / expected - 1)).toBeLessThan(5e-13 + 4 * condition);
        else expect(found).toBeLessThan(1e-289);
        compared++;
      }
    }
    expect(compared).toBeGreaterThan(150);
  });

  it.each(reference.chiQuantiles as number[][])('quantiles, ν = %i, p = %f', (nu, p, low, high) => {
    expect(Math.abs(lowerQuantile(nu!, p!) / low! - 1)).toBeLessThan(1e-13);
    expect(Math.abs(upperQuantile(nu!, p!) / high! - 1)).toBeLessThan(1e-13);
  });

  it('one and two degrees of freedom in closed form', () => {
    for (const x of [1e-9, 1e-3, 0.1, 1, 3]) {
      expect(Math.abs(lowerTail(2, x) / -Math.expm1(-x * x) - 1)).toBeLessThan(1e-14);
      expect(Math.abs(upperTail(2, x) / Math.exp(-x * x) - 1)).toBeLessThan(1e-14);
    }
    // P(|Z| < 1e-9)
    expect(Math.abs(lowerTail(1, 1e-9) / (Math.sqrt(2 / Math.PI) * 1e-9) - 1)).toBeLessThan(1e-14);
  });

  it('NIST/SEMATECH e-Handbook 7.2.6.3: chi-squared point 23.650 at 0.01 with 42 degrees of freedom', () => {
    expect(42 * lowerQuantile(42, 0.01) ** 2).toBeCloseTo(23.65, 3);
  });

  it('ends where the distribution does', () => {
    expect([lowerTail(5, 0), lowerTail(5, -1), upperTail(5, 0), upperTail(5, -1)]).toEqual([0, 0, 1, 1]);
    for (const nu of [1, 2, 999_999]) {
      for (const x of [50, 1e10, 1e200, Number.MAX_VALUE]) expect([lowerTail(nu, x), upperTail(nu, x)]).toEqual([1, 0]);
      expect(upperTail(nu, 1e-300)).toBe(1);
    }
  });
});
