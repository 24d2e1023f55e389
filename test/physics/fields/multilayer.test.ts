import { describe, expect, it } from 'vitest';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import { type FieldCoil, fieldAt, fieldMethod } from '../../../src/physics/fields/field.ts';
import { filamentField } from '../../../src/physics/fields/loop.ts';
import { integrate } from '../../../src/physics/numerics/quadrature.ts';
import reference from '../../fixtures/mpmath/field-multilayer.json' with { type: 'json' };
import { relativeError, vectorError } from './vector-error.ts';

const µ0 = VACUUM_PERMEABILITY_H_PER_M;
const multilayer = (turns: number, innerDiameter_m: number, outerDiameter_m: number, length_m: number): FieldCoil => ({
  shape: 'multilayer',
  turns,
  innerDiameter_m,
  outerDiameter_m,
  length_m,
});

describe('field of a multilayer coil', () => {
  it('agrees with Biot and Savart’s integral at 50 digits: bore, winding, faces, corners and far away', () => {
    expect(reference.length).toBe(324);
    let worst = 0;
    for (const [inner, outer, length, radius_m, axial_m, radial, axial] of reference as number[][]) {
      const field = fieldAt(multilayer(1, inner!, outer!, length!), 1, { radius_m: radius_m!, axial_m: axial_m! });
      worst = Math.max(worst, vectorError(field, radial!, axial!));
    }
    expect(worst).toBeLessThan(1e-12);
  });

  it('is the elementary logarithm on the axis', () => {
    for (const [inner, outer, length] of [
      [0.05, 0.1, 0.08],
      [0, 0.1, 0.02],
      [0.0999, 0.1, 0.5],
      [0.01, 0.1, 1e-4],
    ] as const) {
      for (const axial_m of [0, length / 4, length / 2 + 0.01, 0.3]) {
        const end = (x: number) =>
          x * (Math.asinh(outer / 2 / Math.abs(x)) - (inner ? Math.asinh(inner / 2 / Math.abs(x)) : 0));
        const expected =
          ((µ0 * 90 * 4) / (length * (outer - inner))) * (end(axial_m + length / 2) - end(axial_m - length / 2));
        const field = fieldAt(multilayer(90, inner, outer, length), 4, { radius_m: 0, axial_m });
        // The formula, not the code, loses digits to the difference of its ends.
        expect(relativeError(field.axial_T, expected)).toBeLessThan(1e-10);
        expect(field.radial_T).toBe(0);
      }
    }
  });

  const coil = multilayer(500, 0.04, 0.1, 0.06);

  it('has no sources: as much flux leaves any coaxial cylinder as enters it', () => {
    for (const [r, low, high] of [
      [0.035, 0.01, 0.02],
      [0.035, -0.01, 0.05],
      [0.06, 0.02, 0.2],
      [0.01, -0.03, 0.03],
    ] as const) {
      const ends = along('radius', 0, r, (x) => {
        const at = (axial_m: number) => fieldAt(coil, 1, { radius_m: x, axial_m }).axial_T;
        return 2 * Math.PI * x * (at(high) - at(low));
      });
      const side = along(
        'height',
        low,
        high,
        (axial_m) => 2 * Math.PI * r * fieldAt(coil, 1, { radius_m: r, axial_m }).radial_T,
      );
      const size = along(
        'height',
        low,
        high,
        (axial_m) => 2 * Math.PI * r * fieldAt(coil, 1, { radius_m: r, axial_m }).magnitude_T,
      );
      expect(Math.abs(ends + side)).toBeLessThan(1e-8 * size);
    }
  });

  it('circulates round a rectangle of the section as Ampère says: µ0 times the current through it', () => {
    const section = (0.05 - 0.02) * 0.06;
    for (const [r1, r2, z1, z2] of [
      [0.03, 0.04, -0.01, 0.02],
      [0.01, 0.06, -0.1, 0.1],
      [0.021, 0.049, 0.028, 0.029],
      [0.06, 0.09, 0, 0.05],
    ] as const) {
      const enclosed =
        (Math.max(0, Math.min(r2, 0.05) - Math.max(r1, 0.02)) * Math.max(0, Math.min(z2, 0.03) - Math.max(z1, -0.03))) /
        section;
      const outwards = (axial_m: number) =>
        along('radius', r1, r2, (radius_m) => fieldAt(coil, 1, { radius_m, axial_m }).radial_T);
      const upwards = (radius_m: number) =>
        along('height', z1, z2, (axial_m) => fieldAt(coil, 1, { radius_m, axial_m }).axial_T);
      const circulation = outwards(z2) - outwards(z1) - upwards(r2) + upwards(r1);
      expect(Math.abs(circulation / (µ0 * 500) - enclosed)).toBeLessThan(1e-7);
    }
  });

  it('tends to the field of a solenoid as the wall grows thin, and of a loop as the section shrinks', () => {
    for (const point of [
      { radius_m: 0.02, axial_m: 0.01 },
      { radius_m: 0.2, axial_m: 0.3 },
      { radius_m: 0, axial_m: 90 },
    ]) {
      const thin = fieldAt(multilayer(10, 0.1 - 1e-9, 0.1 + 1e-9, 0.3), 1, point);
      const sheet = fieldAt({ shape: 'solenoid', turns: 10, diameter_m: 0.1, length_m: 0.3 }, 1, point);
      expect(relativeError(thin.magnitude_T, sheet.magnitude_T)).toBeLessThan(1e-12);
      const small = fieldAt(multilayer(10, 0.1 - 1e-9, 0.1 + 1e-9, 1e-9), 1, point);
      const loop = fieldAt({ shape: 'round-loop', turns: 10, diameter_m: 0.1, wireDiameter_m: 1e-9 }, 1, point);
      expect(relativeError(small.magnitude_T, loop.magnitude_T)).toBeLessThan(1e-12);
    }
  });

  it('needs an outer diameter above the inner one', () => {
    expect(() => fieldMethod(multilayer(9, 0.1, 0.1, 0.1))).toThrow(/^\/outerDiameter_m: /);
    expect(() => fieldMethod(multilayer(9, 0.2, 0.1, 0.1))).toThrow(/^\/outerDiameter_m: /);
  });
});

/** ∫ f along a line, with panels that shrink by 3 towards its ends and towards the planes of the winding's faces. */
function along(line: 'radius' | 'height', low: number, high: number, f: (x: number) => number): number {
  const faces = line === 'radius' ? [0.02, 0.05] : [-0.03, 0.03];
  const edges = [low, ...faces.filter((x) => x > low && x < high), high];
  return edges.slice(1).reduce((sum, edge, i) => sum + graded(f, edges[i]!, edge), 0);
}

function graded(f: (x: number) => number, low: number, high: number): number {
  const length = high - low;
  let sum = 0;
  for (let far = length / 2; far > 1e-6 * length; far /= 3) {
    const near = far / 3 > 1e-6 * length ? far / 3 : 0;
    sum += integrate(f, low + near, low + far, 12) + integrate(f, high - far, high - near, 12);
  }
  return sum;
}

describe('the turns of a multilayer coil', () => {
  it('depart from the even current density by less than the model’s stated error an outer radius outside', () => {
    for (const inner of [0, 0.3, 0.7, 0.95]) {
      for (const length of [0.05, 0.5, 2]) {
        for (const [layers, perLayer] of [
          [1, 1],
          [2, 2],
          [4, 4],
          [2, 8],
          [3, 12],
        ] as const) {
          const wall = 1 - inner;
          const [width, height] = [wall / layers, length / perLayer];
          const turns = layers * perLayer;
          if (turns > 1 && Math.max(width, height) > 2 * Math.min(width, height)) continue;
          const coil = multilayer(turns, 2 * inner, 2, length);
          let worst = 0;
          for (let i = 0; i <= 12; i++) {
            const angle = (Math.PI / 2) * (i / 12);
            for (const [r, z] of [
              [2, (length / 2) * (i / 12)],
              [1 + Math.cos(angle), length / 2 + Math.sin(angle)],
              [i / 12, length / 2 + 1],
              [2 + i ** 2, i],
            ] as const) {
              let [radial, axial] = [0, 0];
              for (let layer = 0; layer < layers; layer++) {
                for (let turn = 0; turn < perLayer; turn++) {
                  const a = inner + (layer + 0.5) * width;
                  const field = filamentField(a, r, a - r, z + length / 2 - (turn + 0.5) * height);
                  radial += field.radial;
                  axial += field.axial;
                }
              }
              worst = Math.max(worst, vectorError(fieldAt(coil, 1, { radius_m: r, axial_m: z }), radial, axial));
            }
          }
          expect(worst).toBeLessThan(fieldMethod(coil).relativeError);
        }
      }
    }
  });
});
