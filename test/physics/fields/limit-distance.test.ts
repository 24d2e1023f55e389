import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import { type FieldCoil, fieldAt, limitDistances } from '../../../src/physics/fields/field.ts';
import { relativeError } from './vector-error.ts';

const µ0 = VACUUM_PERMEABILITY_H_PER_M;

const coils: readonly FieldCoil[] = [
  { shape: 'round-loop', diameter_m: 0.5, wireDiameter_m: 0.01, turns: 4 },
  { shape: 'solenoid', turns: 200, diameter_m: 0.06, length_m: 0.3, wireDiameter_m: 0.0014 },
  { shape: 'solenoid', turns: 12, diameter_m: 0.4, length_m: 1e-3 },
  { shape: 'multilayer', turns: 800, innerDiameter_m: 0.04, outerDiameter_m: 0.1, length_m: 0.05 },
  { shape: 'multilayer', turns: 30, innerDiameter_m: 0, outerDiameter_m: 0.2, length_m: 1e-3 },
  { shape: 'multilayer', turns: 900, innerDiameter_m: 0.01, outerDiameter_m: 0.012, length_m: 3 },
];

const outerRadius_m = (coil: FieldCoil) =>
  coil.shape === 'multilayer' ? coil.outerDiameter_m / 2 : (coil.diameter_m + (coil.wireDiameter_m ?? 0)) / 2;

describe('distance at which the field of a coil falls to a limit', () => {
  it('follows from the closed form on the axis of a loop', () => {
    for (const limit_T of [1e-3, 1e-6, 1e-9, 1e-15]) {
      const { axial_m } = limitDistances({ shape: 'round-loop', diameter_m: 0.2, wireDiameter_m: 1e-3 }, 300, limit_T);
      const expected = Math.sqrt(((µ0 * 300 * 0.01) / (2 * limit_T)) ** (2 / 3) - 0.01);
      expect(relativeError(axial_m!, expected)).toBeLessThan(1e-13);
    }
  });

  it('tends to the dipole’s: µ0 m/(2πd³) on the axis and half of it in the mid-plane', () => {
    for (const coil of coils.slice(0, 3)) {
      if (coil.shape === 'multilayer') continue;
      const moment = (coil.turns ?? 1) * 5 * Math.PI * (coil.diameter_m / 2) ** 2;
      const { axial_m, radial_m } = limitDistances(coil, 5, 1e-24);
      expect(relativeError(axial_m!, Math.cbrt((µ0 * moment) / (2 * Math.PI * 1e-24)))).toBeLessThan(1e-9);
      expect(relativeError(radial_m!, Math.cbrt((µ0 * moment) / (4 * Math.PI * 1e-24)))).toBeLessThan(1e-9);
    }
  });

  it('is where |B| equals the limit, and |B| is below it everywhere beyond', () => {
    for (const coil of coils) {
      for (const limit_T of [5e-4, 1e-5, 1e-8]) {
        const { axial_m, radial_m } = limitDistances(coil, -20, limit_T);
        const onAxis = (z: number) => fieldAt(coil, -20, { radius_m: 0, axial_m: z }).magnitude_T;
        const inPlane = (r: number) => fieldAt(coil, -20, { radius_m: r, axial_m: 0 }).magnitude_T;
        if (axial_m! > 0) expect(relativeError(onAxis(axial_m!), limit_T)).toBeLessThan(1e-12);
        else expect(onAxis(0)).toBeLessThanOrEqual(limit_T);
        if (radial_m! > outerRadius_m(coil)) expect(relativeError(inPlane(radial_m!), limit_T)).toBeLessThan(1e-12);
        else expect(inPlane(radial_m! * (1 + 1e-12))).toBeLessThanOrEqual(limit_T);
        for (let factor = 1.001; factor < 100; factor *= 1.1) {
          expect(onAxis(axial_m! * factor)).toBeLessThan(limit_T);
          expect(inPlane(radial_m! * factor)).toBeLessThan(limit_T);
        }
      }
    }
  });

  it('rests on a field that falls steadily along both rays', () => {
    for (const coil of coils) {
      let [axis, plane] = [Infinity, Infinity];
      for (let step = 0; step < 400; step++) {
        const reach = 1.04 ** step * 1e-4 - 1e-4;
        const onAxis = fieldAt(coil, 1, { radius_m: 0, axial_m: reach }).magnitude_T;
        const inPlane = fieldAt(coil, 1, {
          radius_m: outerRadius_m(coil) * (1 + 1e-15) + reach,
          axial_m: 0,
        }).magnitude_T;
        expect(onAxis).toBeLessThanOrEqual(axis * (1 + 1e-14));
        expect(inPlane).toBeLessThan(plane);
        [axis, plane] = [onAxis, inPlane];
      }
    }
  });

  it('is 0 and the outer radius where the limit is kept everywhere outside, as without a current', () => {
    for (const coil of coils) {
      expect(limitDistances(coil, 1e-9, 1)).toEqual({ axial_m: 0, radial_m: outerRadius_m(coil) });
      expect(limitDistances(coil, 0, 1e-300)).toEqual({ axial_m: 0, radial_m: outerRadius_m(coil) });
    }
    // A long coil's limit may be exceeded within and kept outside.
    const { axial_m, radial_m } = limitDistances(coils[5]!, 10, 1e-3);
    expect(axial_m).toBeGreaterThan(1);
    expect(radial_m).toBe(0.006);
  });

  it('is null or a number for any current and limit, and scales with size', () => {
    const decades = fc.double({ min: -140, max: 140, noNaN: true });
    fc.assert(
      fc.property(fc.constantFrom(...coils), decades, decades, (coil, current, limit) => {
        const { axial_m, radial_m } = limitDistances(coil, 10 ** current, 10 ** limit);
        for (const distance of [axial_m, radial_m]) expect(distance === null || distance >= 0).toBe(true);
      }),
      { seed: 5, numRuns: 200 },
    );
    for (const scale of [1e9, 1e-9]) {
      const coil: FieldCoil = {
        shape: 'multilayer',
        turns: 800,
        innerDiameter_m: 0.04,
        outerDiameter_m: 0.1,
        length_m: 0.05,
      };
      const large: FieldCoil = {
        ...coil,
        innerDiameter_m: 0.04 * scale,
        outerDiameter_m: 0.1 * scale,
        length_m: 0.05 * scale,
      };
      const [one, other] = [limitDistances(coil, 3, 1e-5), limitDistances(large, 3 * scale, 1e-5)];
      expect(relativeError(other.axial_m!, one.axial_m! * scale)).toBeLessThan(1e-13);
      expect(relativeError(other.radial_m!, one.radial_m! * scale)).toBeLessThan(1e-13);
    }
    expect(limitDistances(coils[0]!, 1e120, 1e-320)).toEqual({ axial_m: null, radial_m: null });
  });
});
