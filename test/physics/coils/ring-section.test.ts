import { describe, expect, it } from 'vitest';
import {
  equalRingsMutualInductance_H,
  equivalentFilaments,
  roundRingSelfInductance_H,
} from '../../../src/physics/coils/ring-section.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import series from '../../fixtures/mpmath/ring-series.json' with { type: 'json' };
import harmonics from '../../fixtures/mpmath/round-loop.json' with { type: 'json' };
import rings from '../../fixtures/scipy/rings.json' with { type: 'json' };
import quadrature from '../../fixtures/scipy/round-loop-quadrature.json' with { type: 'json' };

const selfOverRadius = (ratio: number) => roundRingSelfInductance_H(1, ratio) / VACUUM_PERMEABILITY_H_PER_M;

describe('ring of round section, self-inductance', () => {
  it('agrees with toroidal harmonics at 60 digits for wire/loop diameter from 1e-6 to 0.99', () => {
    expect(harmonics.length).toBe(18);
    const errors = (harmonics as [number, number][]).map(([ratio, expected]) => selfOverRadius(ratio) / expected - 1);
    expect(Math.max(...errors.map(Math.abs))).toBeLessThan(5e-15);
  });

  it('agrees with quadrature over both sections of Maxwell’s formula', () => {
    for (const [ratio, expected] of quadrature as [number, number, number][]) {
      expect(Math.abs(selfOverRadius(ratio) / expected - 1), `ratio ${ratio}`).toBeLessThan(2e-10);
    }
  });

  it('rests on a recurrence that sixty coefficients follow exactly', () => {
    const coefficients = series as [string, number][];
    expect(coefficients.length).toBe(61);
    const common = BigInt(Math.max(...coefficients.map(([, exponent]) => exponent)));
    const a = coefficients.map(([numerator, exponent]) => BigInt(numerator) << (common - BigInt(exponent)));
    for (let n = 1n; n < 61n; n++) {
      const f = 4n * n * n * (n + 1n) * (n + 2n);
      const g = (2n * n - 3n) * (2n * n - 1n) * (2n * n * n - 2n * n - 3n);
      const h = (n - 3n) * (n - 2n) * (2n * n - 5n) * (2n * n - 3n);
      const older = n > 1n ? a[Number(n) - 2]! : 0n;
      expect(f * a[Number(n)]!).toBe(g * a[Number(n) - 1]! - h * older);
    }
  });

  it('stays finite and falling up to a section that touches the axis', () => {
    expect(selfOverRadius(1 - 1e-15)).toBeLessThan(selfOverRadius(0.999));
    expect(selfOverRadius(1 - 1e-15)).toBeGreaterThan(0.6);
  });

  it('scales with size', () => {
    for (const ratio of [1e-6, 0.1, 0.9]) {
      for (const scale of [1e9, 1e-9]) {
        const scaled = roundRingSelfInductance_H(scale, ratio * scale) / scale;
        expect(Math.abs(scaled / roundRingSelfInductance_H(1, ratio) - 1)).toBeLessThan(2e-15);
      }
    }
  });
});

describe('two equal rings, mutual inductance', () => {
  // Rows of two turns hold it: L = 2 M₀ + 2 M.
  const pairs = (rings as [number, number, number, number, number][]).filter(([turns]) => turns === 2);
  it.each([
    [0.95, 2.5e-3],
    [1 / 1.5, 6e-4],
    [1 / 3, 2.5e-5],
    [0.2, 2e-6],
    [0.1, 2e-7],
    [0.01, 1e-7],
    [0.001, 1e-7],
  ])('agrees with quadrature over both sections, wire/loop diameter %f, within %f', (ratio, tolerance) => {
    const cases = pairs.filter(([, , wireRatio]) => wireRatio === ratio);
    expect(cases.length).toBe(4);
    for (const [, distance, , expected] of cases) {
      const mutual = expected / 2 - selfOverRadius(ratio);
      const actual = equalRingsMutualInductance_H(equivalentFilaments(1, ratio), distance);
      expect(Math.abs(actual / VACUUM_PERMEABILITY_H_PER_M / mutual - 1)).toBeLessThan(tolerance);
    }
  });
});
