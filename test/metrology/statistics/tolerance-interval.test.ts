import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { upperTailQuantile } from '../../../src/metrology/normal.ts';
import { lowerQuantile } from '../../../src/metrology/statistics/scaled-chi.ts';
import {
  oneSidedFactor,
  toleranceInterval,
  twoSidedFactor,
} from '../../../src/metrology/statistics/tolerance-interval.ts';
import reference from '../../fixtures/mpmath/tolerance-factors.json' with { type: 'json' };

/** M. G. Natrella, Experimental Statistics, NBS Handbook 91 (1963), as the NIST/SEMATECH e-Handbook 7.2.6.3 prints it. */
function natrella(n: number, content: number, confidence: number): number {
  const zp = upperTailQuantile(1 - content);
  const zg = upperTailQuantile(1 - confidence);
  const a = 1 - (zg * zg) / (2 * (n - 1));
  const b = zp * zp - (zg * zg) / n;
  return (zp + Math.sqrt(zp * zp - a * b)) / a;
}

/** W. G. Howe, Journal of the American Statistical Association 64 (1969) 610-620, as the e-Handbook has it. */
function howe(n: number, content: number, confidence: number): number {
  return (upperTailQuantile((1 - content) / 2) * Math.sqrt(1 + 1 / n)) / lowerQuantile(n - 1, 1 - confidence);
}

describe('factors', () => {
  it.each(reference.rows as number[][])('n = %i, content %f, confidence %f', (n, content, confidence, k1, k2) => {
    expect(Math.abs(oneSidedFactor(n!, content!, confidence!) - k1!)).toBeLessThan(1e-14 * Math.max(k1!, 1));
    expect(Math.abs(twoSidedFactor(n!, content!, confidence!) / k2! - 1)).toBeLessThan(1e-13);
  });

  it('NIST/SEMATECH e-Handbook 7.2.6.3, N = 43, content 0.90, confidence 0.99: its approximations 2.217 and 1.8752, and the exact', () => {
    expect(howe(43, 0.9, 0.99)).toBeCloseTo(2.217, 3);
    expect(twoSidedFactor(43, 0.9, 0.99)).toBeCloseTo(2.2228, 4);
    expect(natrella(43, 0.9, 0.99)).toBeCloseTo(1.8752, 4);
    expect(oneSidedFactor(43, 0.9, 0.99)).toBeCloseTo(1.874, 3);
  });

  it('the same with N = 6: the approximation 5.2808 is 20 % above the exact', () => {
    expect(natrella(6, 0.9, 0.99)).toBeCloseTo(5.2808, 4);
    expect(natrella(6, 0.9, 0.99) / oneSidedFactor(6, 0.9, 0.99)).toBeCloseTo(1.2, 1);
  });

  it('fall to the normal quantile with many units', () => {
    expect(twoSidedFactor(1_000_000, 0.95, 0.5)).toBeCloseTo(1.959964, 5);
    expect(oneSidedFactor(1_000_000, 0.95, 0.5)).toBeCloseTo(1.644854, 5);
  });

  it('fall with n and rise with content and confidence, also below one half', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 2, max: 300 }),
        fc.double({ min: 0.05, max: 0.999, noNaN: true }),
        fc.double({ min: 0.55, max: 0.999, noNaN: true }),
        (n, content, confidence) => {
          for (const factor of [oneSidedFactor, twoSidedFactor]) {
            const k = factor(n, content, confidence);
            expect(factor(n, content + (1 - content) / 3, confidence)).toBeGreaterThan(k);
            expect(factor(n, content, confidence + (1 - confidence) / 3)).toBeGreaterThan(k);
          }
          expect(twoSidedFactor(n + 1, content, confidence)).toBeLessThan(twoSidedFactor(n, content, confidence));
        },
      ),
      { seed: 9, numRuns: 5 },
    );
  });

  it('one side of a small part mirrors one side of the rest', () => {
    // At least 10 % lies below with confidence 0.2 where at least 90 % lies above with confidence 0.8 less often than not.
    expect(oneSidedFactor(10, 0.1, 0.2)).toBeCloseTo(-oneSidedFactor(10, 0.9, 0.8), 12);
  });
});

describe('intervals', () => {
  const sample = { n: 10, mean: 5, standardDeviation: 0.5 };

  it.each(['two-sided', 'lower', 'upper'] as const)('%s', (sides) => {
    const { lower, upper, factor } = toleranceInterval(sample, { content: 0.99, confidence: 0.95, sides });
    // ISO 16269-6 factors for n = 10.
    expect(factor).toBeCloseTo(sides === 'two-sided' ? 4.437 : 3.981, 3);
    expect(lower).toBe(sides === 'upper' ? null : 5 - 0.5 * factor);
    expect(upper).toBe(sides === 'lower' ? null : 5 + 0.5 * factor);
  });

  it.each([
    [{ ...sample, n: 1 }, {}, '/n'],
    [{ ...sample, standardDeviation: -1 }, {}, '/standardDeviation'],
    [sample, { content: 1 }, '/content'],
    [sample, { confidence: 0 }, '/confidence'],
  ])('%j with %j is refused', (bad, request, pointer) => {
    const whole = { content: 0.9, confidence: 0.9, sides: 'two-sided', ...request } as const;
    expect(() => toleranceInterval(bad, whole)).toThrow(expect.objectContaining({ name: 'InvalidQuantity', pointer }));
  });
});
