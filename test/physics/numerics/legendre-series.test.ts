import { describe, expect, it } from 'vitest';
import { radauCollocation, seriesThrough } from '../../../src/physics/numerics/collocation.ts';
import {
  legendrePolynomials,
  seriesIntegral,
  seriesSlope,
  seriesValue,
} from '../../../src/physics/numerics/legendre-series.ts';

describe('Legendre polynomials', () => {
  it('are those of DLMF 18.5', () => {
    for (const x of [-1, -0.3, 0, 0.8, 1]) {
      const p = legendrePolynomials(4, x);
      expect(p[0]).toBe(1);
      expect(p[1]).toBe(x);
      expect(Math.abs(p[2]! - (3 * x * x - 1) / 2)).toBeLessThan(1e-15);
      expect(Math.abs(p[4]! - (35 * x ** 4 - 30 * x * x + 3) / 8)).toBeLessThan(1e-15);
    }
    expect(legendrePolynomials(40, 1)[40]).toBe(1);
  });
});

describe('a Legendre series through the nodes', () => {
  it('gives value, slope and integral of a smooth function', () => {
    const rule = radauCollocation(16);
    const series = seriesThrough(
      rule,
      rule.nodes.map((x) => Math.exp(x)),
    );
    for (const x of [-1, -0.7, 0, 0.31, 1]) {
      expect(Math.abs(seriesValue(series, x) - Math.exp(x))).toBeLessThan(2e-13);
      expect(Math.abs(seriesSlope(series, x) - Math.exp(x))).toBeLessThan(2e-11);
      expect(Math.abs(seriesIntegral(series, x) - (Math.exp(x) - Math.exp(-1)))).toBeLessThan(2e-13);
    }
  });

  it('works with a single term', () => {
    const constant = new Float64Array([3]);
    expect(seriesValue(constant, 0.5)).toBe(3);
    expect(seriesSlope(constant, 0.5)).toBe(0);
    expect(seriesIntegral(constant, 0.5)).toBe(4.5);
  });
});
