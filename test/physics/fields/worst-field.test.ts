import { describe, expect, it } from 'vitest';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import { type FieldCoil, fieldAt, worstFieldAtDistance } from '../../../src/physics/fields/field.ts';
import { relativeError } from './vector-error.ts';

const coils: readonly (readonly [FieldCoil, reach_m: number])[] = [
  [{ shape: 'round-loop', diameter_m: 0.5, wireDiameter_m: 0.01 }, 0.255],
  [
    { shape: 'solenoid', turns: 200, diameter_m: 0.06, length_m: 0.3, wireDiameter_m: 0.0014 },
    Math.hypot(0.0307, 0.15),
  ],
  [{ shape: 'solenoid', turns: 900, diameter_m: 0.02, length_m: 2 }, Math.hypot(0.01, 1)],
  [
    { shape: 'multilayer', turns: 800, innerDiameter_m: 0.04, outerDiameter_m: 0.1, length_m: 0.05 },
    Math.hypot(0.05, 0.025),
  ],
  [
    { shape: 'multilayer', turns: 30, innerDiameter_m: 0.1, outerDiameter_m: 0.2, length_m: 1e-3 },
    Math.hypot(0.1, 5e-4),
  ],
];

describe('largest field at a distance from a coil', () => {
  it('is the dipole’s, on the axis, far away', () => {
    const moment = 200 * 3 * Math.PI * 0.03 ** 2;
    const worst = worstFieldAtDistance(coils[1]![0], 3, 1e6);
    expect(
      relativeError(worst.magnitude_T, (VACUUM_PERMEABILITY_H_PER_M * moment) / (2 * Math.PI * 1e18)),
    ).toBeLessThan(1e-9);
    expect(worst).toMatchObject({ radius_m: 0, axial_m: 1e6 });
  });

  it('is in the plane of a loop, beside the wire, where the sphere is close to it', () => {
    const worst = worstFieldAtDistance(coils[0]![0], 3, 0.26);
    expect(worst).toMatchObject({ radius_m: 0.26, axial_m: 0 });
    expect(worst.magnitude_T).toBe(fieldAt(coils[0]![0], 3, { radius_m: 0.26, axial_m: 0 }).magnitude_T);
  });

  it('is exceeded by none of many other points of the sphere, nor beyond it', () => {
    for (const [coil, reach_m] of coils) {
      for (const clearance of [1e-6, 1e-3, 0.02, 0.3, 2, 100]) {
        const distance_m = reach_m * (1 + clearance);
        const worst = worstFieldAtDistance(coil, 7, distance_m);
        expect(relativeError(Math.hypot(worst.radius_m, worst.axial_m), distance_m)).toBeLessThan(1e-15);
        const there = fieldAt(coil, 7, worst).magnitude_T;
        expect(there).toBe(worst.magnitude_T);
        for (let i = 0; i <= 200; i++) {
          // Evenly spread, and crowded about the worst point.
          const even = (Math.PI / 2) * (i / 200);
          const close = Math.atan2(worst.radius_m, worst.axial_m) + (i % 2 ? 1 : -1) * 10 ** (-i / 20);
          for (const [angle, stretch] of [
            [even, 1],
            [Math.abs(close), 1],
            [even, 1.01],
          ] as const) {
            const point = {
              radius_m: Math.abs(stretch * distance_m * Math.sin(angle)),
              axial_m: stretch * distance_m * Math.cos(angle),
            };
            expect(fieldAt(coil, 7, point).magnitude_T).toBeLessThanOrEqual(there * (1 + 1e-12));
          }
        }
      }
    }
  });

  it('wants a sphere that encloses the winding', () => {
    for (const [coil, reach_m] of coils) {
      for (const distance_m of [reach_m * (1 - 1e-9), reach_m / 2, 1e-9]) {
        expect(() => worstFieldAtDistance(coil, 1, distance_m)).toThrow(/^\/distance_m: .*enclose/);
      }
    }
  });
});
