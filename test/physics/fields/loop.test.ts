import { describe, expect, it } from 'vitest';
import { coaxialLoopsMutualInductance_H } from '../../../src/physics/coils/coaxial-loops.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import { type FieldCoil, fieldAt, fieldMethod } from '../../../src/physics/fields/field.ts';
import { filamentField } from '../../../src/physics/fields/loop.ts';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import { gaussLegendre, integrate } from '../../../src/physics/numerics/quadrature.ts';
import reference from '../../fixtures/mpmath/field-loop.json' with { type: 'json' };
import { relativeError, vectorError } from './vector-error.ts';

const µ0 = VACUUM_PERMEABILITY_H_PER_M;
const loop = (diameter_m: number, wireDiameter_m: number, turns = 1): FieldCoil => ({
  shape: 'round-loop',
  diameter_m,
  wireDiameter_m,
  turns,
});

describe('field of a round loop', () => {
  it('agrees with Biot and Savart’s integral at 60 digits: axis, plane, beside the wire and far away', () => {
    expect(reference.length).toBe(156);
    let worst = 0;
    let worstRadial = 0;
    for (const [diameter, radius_m, axial_m, radial, axial] of reference as [
      number,
      number,
      number,
      number,
      number,
    ][]) {
      const field = fieldAt(loop(diameter, 1e-14 * diameter), 1, { radius_m, axial_m });
      worst = Math.max(worst, vectorError(field, radial, axial));
      // The radial component for itself too: it vanishes with the radius and must keep its digits on the way.
      if (radial !== 0) worstRadial = Math.max(worstRadial, relativeError(field.radial_T, µ0 * radial));
    }
    expect(worst).toBeLessThan(3e-15);
    expect(worstRadial).toBeLessThan(3e-15);
  });

  it('is µ0 N I a²/2(a² + z²)^{3/2} on the axis', () => {
    for (const axial_m of [0, 1e-7, 0.01, 0.3, 40, 5e5]) {
      const expected = (µ0 * 7 * 2.5 * 0.3 ** 2) / (2 * (0.3 ** 2 + axial_m ** 2) ** 1.5);
      const field = fieldAt(loop(0.6, 0.002, 7), 2.5, { radius_m: 0, axial_m });
      expect(relativeError(field.axial_T, expected)).toBeLessThan(2e-15);
      expect(field.radial_T).toBe(0);
    }
  });

  it('makes (4/5)^{3/2} µ0 N I/a between two loops a radius apart, flat to the fourth order', () => {
    const at = (axial_m: number) =>
      fieldAt(loop(1, 1e-3, 100), 2, { radius_m: 0, axial_m: axial_m - 0.25 }).axial_T +
      fieldAt(loop(1, 1e-3, 100), 2, { radius_m: 0, axial_m: axial_m + 0.25 }).axial_T;
    expect(relativeError(at(0), (0.8 ** 1.5 * µ0 * 100 * 2) / 0.5)).toBeLessThan(1e-15);
    // −(144/125)(z/a)⁴
    expect((at(0.005) / at(0) - 1) / 0.01 ** 4).toBeCloseTo(-144 / 125, 2);
  });

  it('sends through a coaxial circle the flux that Maxwell’s mutual inductance says', () => {
    for (const [a, b, z] of [
      [0.2, 0.15, 0],
      [0.2, 0.15, 0.05],
      [0.2, 0.5, 0.3],
      [0.2, 3, 0.4],
      [0.2, 0.01, 2],
    ] as const) {
      // In the loop's own plane B_z changes sign across the wire; the circles here stay clear of it.
      const through = (r: number) =>
        2 * Math.PI * r * fieldAt(loop(2 * a, 1e-6), 1, { radius_m: r, axial_m: z }).axial_T;
      let flux = 0;
      const panels = 12;
      for (let i = 0; i < panels; i++) flux += integrate(through, (b * i) / panels, (b * (i + 1)) / panels, 20);
      expect(relativeError(flux, coaxialLoopsMutualInductance_H(a, b, z))).toBeLessThan(1e-11);
    }
  });

  it('is a dipole’s field far away, in every direction', () => {
    const moment = Math.PI * 0.1 ** 2;
    for (const angle of [0, 0.3, 0.9553, 1.2, Math.PI / 2]) {
      const d = 1e7;
      const field = fieldAt(loop(0.2, 1e-3), 1, { radius_m: d * Math.sin(angle), axial_m: d * Math.cos(angle) });
      const scale = moment / (4 * Math.PI * d ** 3);
      const radial = scale * 3 * Math.sin(angle) * Math.cos(angle);
      const axial = scale * (3 * Math.cos(angle) ** 2 - 1);
      expect(vectorError(field, radial, axial)).toBeLessThan(1e-13);
    }
  });
});

/** Field at (r, z) of a current spread over a round section of radius b about a circle of radius 1, by quadrature over the section. */
function sectionLoop(b: number, r: number, z: number, density: (a: number) => number): [number, number] {
  const depths = gaussLegendre(24);
  const turns = 1200;
  let [radial, axial, total] = [0, 0, 0];
  for (let i = 0; i < 24; i++) {
    const depth = (b * (1 + depths.nodes[i]!)) / 2;
    for (let j = 0; j < turns; j++) {
      const t = (2 * Math.PI * (j + 0.5)) / turns;
      const a = 1 + depth * Math.cos(t);
      const weight = depths.weights[i]! * depth * density(a);
      const field = filamentField(a, r, a - r, z - depth * Math.sin(t));
      radial += weight * field.radial;
      axial += weight * field.axial;
      total += weight;
    }
  }
  return [radial / total, axial / total];
}

describe('the wire of a round loop', () => {
  it('departs from the filament outside the wire by less than the model’s stated error, and not by much less', () => {
    for (const ratio of [1e-3, 0.05, 0.3, 0.6, 0.9]) {
      const coil = loop(2, 2 * ratio);
      let worst = 0;
      for (const density of [() => 1, (a: number) => 1 / a]) {
        for (const [distance, angle] of [
          [1.01, 0],
          [1.01, 1],
          [1.01, 2],
          [1.01, 3],
          [1.5, 0],
          [4, 1.6],
          [1000, 0],
          [1000, 1.5],
        ] as const) {
          const [r, z] = [1 + distance * ratio * Math.cos(angle), distance * ratio * Math.sin(angle)];
          if (r < 0) continue;
          const [radial, axial] = sectionLoop(ratio, r, z, density);
          worst = Math.max(worst, vectorError(fieldAt(coil, 1, { radius_m: r, axial_m: z }), radial, axial));
        }
      }
      const stated = fieldMethod(coil).relativeError;
      expect(worst).toBeLessThan(stated);
      expect(worst).toBeGreaterThan(0.75 * stated);
    }
  });

  it('has inside a finite field, continuous at the surface, which at the wire’s centre is that of a uniform current in thin wire', () => {
    const coil = loop(2, 0.02);
    const centre = fieldAt(coil, 1, { radius_m: 1, axial_m: 0 });
    const [radial, axial] = sectionLoop(0.01, 1, 0, () => 1);
    expect(vectorError(centre, radial, axial)).toBeLessThan(2e-4);
    for (const angle of [0, 1, 2, 3, 4]) {
      const at = (depth: number) =>
        fieldAt(coil, 1, { radius_m: 1 + 0.01 * depth * Math.cos(angle), axial_m: 0.01 * depth * Math.sin(angle) });
      const [inside, outside] = [at(1 - 1e-9), at(1 + 1e-9)];
      expect(relativeError(inside.magnitude_T, outside.magnitude_T)).toBeLessThan(1e-8);
      // Half way to the surface a uniform current makes half of the surface's field; the ring's curvature adds a part in b/a.
      expect(relativeError(at(0.5).magnitude_T, outside.magnitude_T / 2)).toBeLessThan(0.05);
    }
  });

  it('must be thinner than the loop', () => {
    for (const wire of [0.2, 0.3]) {
      expect(() => fieldMethod(loop(0.2, wire))).toThrow(InvalidQuantity);
      expect(() => fieldMethod(loop(0.2, wire))).toThrow(/^\/wireDiameter_m: /);
    }
  });
});
