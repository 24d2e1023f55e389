import { describe, expect, it } from 'vitest';
import { gaussLegendre, integrate } from '../../../src/physics/numerics/quadrature.ts';

describe('Gauss-Legendre rule', () => {
  it('has the nodes and weights of the closed forms (DLMF 3.5, tables for n = 2, 3, 5)', () => {
    const two = gaussLegendre(2);
    expect(Math.abs(two.nodes[1]! - Math.sqrt(1 / 3))).toBeLessThan(2e-16);
    expect(Math.abs(two.weights[0]! - 1)).toBeLessThan(5e-16);
    const three = gaussLegendre(3);
    expect(Math.abs(three.nodes[2]! - Math.sqrt(3 / 5))).toBeLessThan(2e-16);
    expect(Math.abs(three.nodes[1]!)).toBeLessThan(2e-16);
    expect(Math.abs(three.weights[1]! - 8 / 9)).toBeLessThan(5e-16);
    const five = gaussLegendre(5);
    expect(Math.abs(five.nodes[4]! - Math.sqrt(5 + 2 * Math.sqrt(10 / 7)) / 3)).toBeLessThan(3e-16);
    expect(Math.abs(five.weights[4]! - (322 - 13 * Math.sqrt(70)) / 900)).toBeLessThan(5e-16);
  });

  it('is exact for every power up to 2·order − 1, orders 1 to 64', () => {
    for (let order = 1; order <= 64; order++) {
      for (let power = 0; power < 2 * order; power++) {
        const expected = 1 / (power + 1);
        expect(Math.abs(integrate((x) => x ** power, 0, 1, order) / expected - 1)).toBeLessThan(1e-13);
      }
    }
  });

  it('is not exact for the next power', () => {
    // ∫₋₁¹ x^2n less the rule = 2^(2n+1) (n!)⁴ / ((2n + 1) ((2n)!)²), DLMF 3.5.19 with f = x^2n.
    const error = 2 / 5 - integrate((x) => x ** 4, -1, 1, 2);
    expect(Math.abs(error - (2 ** 5 * 2 ** 4) / (5 * 24 ** 2))).toBeLessThan(1e-15);
  });

  it('sums its weights to 2, ascends and is symmetric, up to order 400', () => {
    for (const order of [1, 2, 7, 30, 101, 400]) {
      const { nodes, weights } = gaussLegendre(order);
      expect(nodes.length).toBe(order);
      expect(Math.abs(weights.reduce((a, b) => a + b, 0) - 2)).toBeLessThan(1e-14);
      for (let i = 0; i < order; i++) {
        expect(nodes[i]! + nodes[order - 1 - i]!).toBeCloseTo(0, 15);
        expect(weights[i]!).toBeGreaterThan(0);
        if (i > 0) expect(nodes[i]!).toBeGreaterThan(nodes[i - 1]!);
      }
    }
  });

  it('integrates smooth functions over any interval', () => {
    expect(Math.abs(integrate(Math.exp, -1, 3, 20) / (Math.exp(3) - Math.exp(-1)) - 1)).toBeLessThan(1e-15);
    expect(Math.abs(integrate((x) => 1 / x, 1e9, 2e9, 20) / Math.LN2 - 1)).toBeLessThan(1e-15);
    expect(integrate(Math.sin, 2, 2, 5)).toBe(0);
    expect(integrate(Math.exp, 1, 0, 20)).toBeCloseTo(1 - Math.E, 14);
  });
});
