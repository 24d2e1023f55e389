import { describe, expect, it } from 'vitest';
import {
  bulirschCel,
  carlsonRD,
  carlsonRF,
  ellipticE,
  ellipticK,
  ellipticKAndKMinusE,
  ellipticKMinusE,
} from '../../../src/physics/numerics/elliptic.ts';
import reference from '../../fixtures/mpmath/elliptic.json' with { type: 'json' };

const worst = (errors: number[]) => Math.max(...errors.map(Math.abs));

describe('complete elliptic integrals against mpmath at 60 digits', () => {
  const complete = reference.complete as [number, number, number, number][];

  it('covers k’ from 1e-300 to 1 and k² down to 1e-58', () => {
    expect(complete.length).toBe(47);
    expect(Math.min(...complete.map(([modulus]) => modulus))).toBe(1e-300);
    expect(Math.max(...complete.map(([modulus]) => modulus))).toBe(1);
    expect(reference.small.length).toBe(20);
  });

  it('K', () => {
    expect(worst(complete.map(([modulus, k]) => ellipticK(modulus) / k - 1))).toBeLessThan(1e-15);
  });

  it('E', () => {
    expect(worst(complete.map(([modulus, , , e]) => ellipticE(modulus) / e - 1))).toBeLessThan(1e-15);
  });

  it('K − E, also together with K', () => {
    const rows = complete.filter(([modulus]) => modulus < 1);
    expect(worst(rows.map(([modulus, , difference]) => ellipticKMinusE(modulus) / difference - 1))).toBeLessThan(1e-15);
    for (const [modulus] of rows) {
      const together = ellipticKAndKMinusE(modulus);
      expect(together.k).toBe(ellipticK(modulus));
      expect(together.kMinusE).toBe(ellipticKMinusE(modulus));
    }
    expect(ellipticKMinusE(1)).toBe(0);
  });

  it('K − E with k² given, where k’ rounds to 1', () => {
    const rows = reference.small as [number, number][];
    const errors = rows.map(([square, difference]) => ellipticKMinusE(Math.sqrt(1 - square), square) / difference - 1);
    expect(worst(errors)).toBeLessThan(1e-15);
  });

  it('are infinite at k = 1, where E is 1', () => {
    expect(ellipticK(0)).toBe(Infinity);
    expect(ellipticKMinusE(0)).toBe(Infinity);
    expect(ellipticE(0)).toBe(1);
  });

  it('keep Legendre’s relation E K’ + E’ K − K K’ = π/2', () => {
    for (const k of [0.05, 0.3, 0.6, 0.9]) {
      const complement = Math.sqrt((1 - k) * (1 + k));
      const sum =
        ellipticE(complement) * ellipticK(k) + (ellipticE(k) - ellipticK(k)) * ellipticK(complement) - Math.PI / 2;
      expect(Math.abs(sum)).toBeLessThan(4e-15);
    }
  });
});

describe('Carlson’s and Bulirsch’s forms against mpmath at 60 digits', () => {
  it('R_F, arguments from 1e-8 to 1e8 and zero', () => {
    const rows = reference.rf as [number, number, number, number][];
    expect(rows.length).toBe(60);
    expect(worst(rows.map(([x, y, z, value]) => carlsonRF(x, y, z) / value - 1))).toBeLessThan(2e-15);
  });

  it('R_D, arguments from 1e-8 to 1e8 and zero', () => {
    const rows = reference.rd as [number, number, number, number][];
    expect(rows.length).toBe(60);
    expect(worst(rows.map(([x, y, z, value]) => carlsonRD(x, y, z) / value - 1))).toBeLessThan(3e-15);
  });

  it('cel, k’ from 1e-10 to 1 and p from 1e-6 to 1e6', () => {
    const rows = reference.cel as [number, number, number, number, number][];
    expect(rows.length).toBe(120);
    const errors = rows.map(([modulus, p, a, b, value]) => bulirschCel(modulus, p, a, b) / value - 1);
    expect(worst(errors)).toBeLessThan(3e-15);
  });
});
