import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type FieldCoil, fieldAt, fieldMethod, isFieldCoil } from '../../../src/physics/fields/field.ts';
import { relativeError } from './vector-error.ts';

const sized = (size: number): readonly FieldCoil[] => [
  { shape: 'round-loop', diameter_m: 0.5 * size, wireDiameter_m: 0.01 * size, turns: 4 },
  { shape: 'solenoid', turns: 200, diameter_m: 0.06 * size, length_m: 0.3 * size, wireDiameter_m: 0.0014 * size },
  { shape: 'multilayer', turns: 800, innerDiameter_m: 0.04 * size, outerDiameter_m: 0.1 * size, length_m: 0.05 * size },
];

describe('field of a coil at a point', () => {
  const coordinate = fc.double({ min: 0, max: 1, noNaN: true }).map((x) => (x < 1e-9 ? 0 : x));

  it('is linear in the current, mirrored in the mid-plane, and one over the size', () => {
    fc.assert(
      fc.property(fc.nat(2), coordinate, coordinate, (shape, radius_m, axial_m) => {
        const coil = sized(1)[shape]!;
        const field = fieldAt(coil, 2, { radius_m, axial_m });
        expect(field.magnitude_T).toBe(Math.hypot(field.radial_T, field.axial_T));
        const twice = fieldAt(coil, -4, { radius_m, axial_m });
        expect(twice.radial_T).toBe(-2 * field.radial_T + 0);
        expect(twice.axial_T).toBe(-2 * field.axial_T + 0);
        const below = fieldAt(coil, 2, { radius_m, axial_m: -axial_m });
        expect(below.radial_T).toBe(-field.radial_T + 0);
        expect(below.axial_T).toBe(field.axial_T);
        for (const size of [2 ** 30, 2 ** -30]) {
          const scaled = fieldAt(sized(size)[shape]!, 2 * size, { radius_m: radius_m * size, axial_m: axial_m * size });
          expect(scaled.radial_T).toBe(field.radial_T);
          expect(scaled.axial_T).toBe(field.axial_T);
        }
      }),
      { seed: 3, numRuns: 300 },
    );
  });

  it('scales by 1e9 and 1e-9 to rounding', () => {
    for (const size of [1e9, 1e-9]) {
      for (const shape of [0, 1, 2]) {
        for (const [r, z] of [
          [0, 0],
          [0.013, 0.02],
          [0.3, 0.1],
          [7, 40],
        ] as const) {
          const field = fieldAt(sized(1)[shape]!, 2, { radius_m: r, axial_m: z });
          const scaled = fieldAt(sized(size)[shape]!, 2 * size, { radius_m: r * size, axial_m: z * size });
          expect(relativeError(scaled.magnitude_T, field.magnitude_T)).toBeLessThan(1e-12);
        }
      }
    }
  });

  it('has exactly no radial component on the axis and in the mid-plane', () => {
    for (const coil of sized(1)) {
      for (const x of [0, 1e-9, 0.01, 0.04, 0.25, 0.6, 1e5]) {
        expect(fieldAt(coil, 1, { radius_m: 0, axial_m: x }).radial_T).toBe(0);
        expect(fieldAt(coil, 1, { radius_m: x, axial_m: 0 }).radial_T).toBe(0);
      }
    }
  });

  it('stores B²/2µ0: 3.98e5 J/m³ at 1 T', () => {
    // OpenStax, University Physics volume 2 (Ling, Sanny, Moebs 2016), equation 14.18, printed to three digits.
    for (const coil of sized(1)) {
      const { magnitude_T, energyDensity_J_per_m3 } = fieldAt(coil, 5, { radius_m: 0.01, axial_m: 0.01 });
      expect(Math.abs(energyDensity_J_per_m3 / magnitude_T ** 2 - 3.98e5)).toBeLessThan(500);
    }
  });

  it('is a finite number anywhere, however extreme the proportions, or an error that says so', () => {
    const decade = fc.double({ min: -300, max: 300, noNaN: true }).map((x) => 10 ** x);
    const coil = fc
      .tuple(fc.constantFrom('round-loop', 'solenoid', 'multilayer'), decade, decade)
      .map(([shape, x, y]): FieldCoil => {
        if (shape === 'round-loop') return { shape, diameter_m: Math.max(x, y) * 1.5, wireDiameter_m: Math.min(x, y) };
        if (shape === 'solenoid') return { shape, turns: 3, diameter_m: x, length_m: y };
        return { shape: 'multilayer', turns: 3, innerDiameter_m: 0.3 * x, outerDiameter_m: x, length_m: y };
      });
    fc.assert(
      fc.property(coil, decade, decade, decade, (it, current_A, radius_m, axial_m) => {
        try {
          for (const value of Object.values(fieldAt(it, current_A, { radius_m, axial_m }))) {
            expect(Number.isFinite(value)).toBe(true);
          }
        } catch (error) {
          expect(String(error)).toMatch(/InvalidQuantity: .*(exceeds the range of numbers|edge)/);
        }
      }),
      { seed: 11, numRuns: 3000 },
    );
    for (const coil of sized(1)) {
      for (const radius_m of [0, 1e-308, 1e308]) {
        for (const axial_m of [0, 1e-308, -1e308]) {
          expect(Number.isFinite(fieldAt(coil, 1, { radius_m, axial_m }).magnitude_T)).toBe(true);
        }
      }
      expect(() => fieldAt(coil, 1e300, { radius_m: 0, axial_m: 0 })).toThrow(/range of numbers/);
    }
  });

  it('says by which method, and which windings it takes', () => {
    for (const coil of sized(1)) {
      const method = fieldMethod(coil);
      expect(method.references.length).toBeGreaterThan(0);
      expect(method.relativeError).toBeGreaterThan(0);
      expect(method.relativeError).toBeLessThan(0.02);
      expect(isFieldCoil(coil)).toBe(true);
    }
    expect(isFieldCoil({ shape: 'toroid' })).toBe(false);
  });
});
