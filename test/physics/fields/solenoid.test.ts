import { describe, expect, it } from 'vitest';
import { coaxialLoopsMutualInductance_H } from '../../../src/physics/coils/coaxial-loops.ts';
import { currentSheetInductance_H } from '../../../src/physics/coils/nagaoka.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import { type FieldCoil, fieldAt, fieldMethod } from '../../../src/physics/fields/field.ts';
import { filamentField } from '../../../src/physics/fields/loop.ts';
import { sheetField } from '../../../src/physics/fields/solenoid.ts';
import { gaussLegendre, integrate } from '../../../src/physics/numerics/quadrature.ts';
import reference from '../../fixtures/mpmath/field-solenoid.json' with { type: 'json' };
import { relativeError, vectorError } from './vector-error.ts';

const µ0 = VACUUM_PERMEABILITY_H_PER_M;
const solenoid = (turns: number, diameter_m: number, length_m: number, wireDiameter_m?: number): FieldCoil => ({
  shape: 'solenoid',
  turns,
  diameter_m,
  length_m,
  ...(wireDiameter_m !== undefined && { wireDiameter_m }),
});

describe('field of a solenoid', () => {
  it('agrees with Biot and Savart’s integral at 60 digits, from pancake to long coil, on the sheet, beside it and far away', () => {
    expect(reference.length).toBe(406);
    let worst = 0;
    for (const [diameter, length, radius_m, axial_m, radial, axial] of reference as number[][]) {
      const field = fieldAt(solenoid(1, diameter!, length!), 1, { radius_m: radius_m!, axial_m: axial_m! });
      worst = Math.max(worst, vectorError(field, radial!, axial!));
    }
    expect(worst).toBeLessThan(4e-14);
  });

  it('keeps the digits of the radial component as it vanishes at the axis', () => {
    const near = reference.filter(([diameter, , radius, axial]) => radius === 0.5e-6 * diameter! && axial !== 0);
    expect(near.length).toBeGreaterThan(20);
    for (const [diameter, length, radius_m, axial_m, radial] of near) {
      const field = fieldAt(solenoid(1, diameter!, length!), 1, { radius_m: radius_m!, axial_m: axial_m! });
      expect(relativeError(field.radial_T, µ0 * radial!)).toBeLessThan(1e-9);
    }
  });

  it('is 1.10 mT in a long coil of 300 turns on 140 mm at 0.410 A', () => {
    // OpenStax, University Physics volume 2 (Ling, Sanny, Moebs 2016), chapter 12, example on the solenoid: n = 2140 /m.
    const field = fieldAt(solenoid(300, 0.002, 0.14), 0.41, { radius_m: 0, axial_m: 0 });
    expect(Math.abs(field.axial_T - 1.1e-3)).toBeLessThan(5e-6);
    expect(field.radial_T).toBe(0);
  });

  it('is the difference of two cosines on the axis', () => {
    for (const [diameter, length] of [
      [0.1, 0.3],
      [0.1, 0.004],
      [0.1, 90],
    ] as const) {
      for (const axial_m of [0, 0.01, length / 2, length, length + 0.2]) {
        const [below, above] = [axial_m + length / 2, axial_m - length / 2];
        const cosines = below / Math.hypot(below, diameter / 2) - above / Math.hypot(above, diameter / 2);
        const field = fieldAt(solenoid(50, diameter, length), 3, { radius_m: 0, axial_m });
        // The difference itself loses digits where both cosines are near 1.
        expect(Math.abs(field.axial_T / ((µ0 * 50 * 3) / (2 * length)) - cosines)).toBeLessThan(1e-15);
      }
    }
  });

  it('jumps by the current per length across the sheet, and is the mean of both sides on it', () => {
    for (const axial_m of [0, 0.05, -0.149]) {
      const at = (radius_m: number) => fieldAt(solenoid(40, 0.2, 0.3), 1.5, { radius_m, axial_m });
      const [inside, on, outside] = [at(0.1 - 1e-15), at(0.1), at(0.1 + 1e-15)];
      expect(relativeError(inside.axial_T - outside.axial_T, (µ0 * 40 * 1.5) / 0.3)).toBeLessThan(1e-12);
      expect(relativeError(on.axial_T, (inside.axial_T + outside.axial_T) / 2)).toBeLessThan(1e-12);
      expect(Math.abs(on.radial_T - inside.radial_T)).toBeLessThan(1e-12 * on.magnitude_T);
    }
  });

  it('has no field on the very edge of the sheet, and a finite one a unit in the last place away', () => {
    for (const axial_m of [0.15, -0.15]) {
      expect(() => fieldAt(solenoid(40, 0.2, 0.3), 1, { radius_m: 0.1, axial_m })).toThrow(/^\/radius_m: .*edge/);
    }
    const beside = fieldAt(solenoid(40, 0.2, 0.3), 1, { radius_m: 0.1 * (1 + Number.EPSILON), axial_m: 0.15 });
    expect(Number.isFinite(beside.magnitude_T)).toBe(true);
  });

  it('sends through a coaxial circle the flux of Maxwell’s mutual inductance with every turn', () => {
    for (const [length, b, z] of [
      [0.3, 0.07, 0],
      [0.3, 0.07, 0.2],
      [0.01, 0.3, 0.1],
      [2, 0.04, 0.95],
      [0.3, 1, 0.5],
    ] as const) {
      const through = (r: number) =>
        2 * Math.PI * r * fieldAt(solenoid(1, 0.2, length), 1, { radius_m: r, axial_m: z }).axial_T;
      const flux =
        b > 0.1 ? integrate(through, 0, 0.1, 60) + integrate(through, 0.1, b, 60) : integrate(through, 0, b, 60);
      const mutual =
        integrate((s) => coaxialLoopsMutualInductance_H(0.1, b, z - s), -length / 2, length / 2, 200) / length;
      expect(relativeError(flux, mutual)).toBeLessThan(1e-9);
    }
  });

  it('holds in ∫B²/2µ0 dV over all space the energy ½LI² of Lorenz’s inductance', () => {
    for (const length of [0.2, 6]) {
      // Panels that shrink by 3 towards the sheet's edge, where B² has a squared logarithm, and grow by 3 far beyond the coil.
      const half = length / 2;
      const energy =
        2 *
        overAll(1, half, (r, z) => {
          const { energyDensity_J_per_m3 } = fieldAt(solenoid(1, 2, length), 1, { radius_m: r, axial_m: z });
          return 2 * Math.PI * r * energyDensity_J_per_m3;
        });
      expect(relativeError(energy, currentSheetInductance_H(1, 2, length) / 2)).toBeLessThan(2e-9);
    }
  });

  it('refuses wire that is thicker than the coil or than the pitch', () => {
    expect(() => fieldMethod(solenoid(2, 0.01, 1, 0.01))).toThrow(/^\/wireDiameter_m: /);
    expect(() => fieldMethod(solenoid(200, 0.1, 0.3, 0.0016))).toThrow(/^\/length_m: /);
    expect(() => fieldMethod(solenoid(200, 0.1, 200 * 0.0015, 0.0015))).not.toThrow();
  });
});

/** ∫∫ f dr dz over r > 0, z > 0, for an f that is singular at (edgeR, edgeZ), jumps on r = edgeR, and falls fast far away. */
function overAll(edgeR: number, edgeZ: number, f: (r: number, z: number) => number): number {
  const nodesR = towards(edgeR);
  const nodesZ = towards(edgeZ);
  let sum = 0;
  for (const [r, weightR] of nodesR) for (const [z, weightZ] of nodesZ) sum += weightR * weightZ * f(r, z);
  return sum;
}

function towards(edge: number): [number, number][] {
  const { nodes, weights } = gaussLegendre(8);
  const result: [number, number][] = [];
  for (const [side, reach] of [
    [-1, edge],
    [1, 1e4],
  ] as const) {
    for (let far = reach; far > 1e-9; far /= 3) {
      const near = far / 3 > 1e-9 ? far / 3 : 0;
      const half = (far - near) / 2;
      nodes.forEach((node, i) => {
        result.push([edge + side * (near + half * (1 + node)), half * weights[i]!]);
      });
    }
  }
  return result;
}

describe('the turns of a solenoid', () => {
  it('depart from the sheet by less than the model’s stated error on the axis and a radius outside', () => {
    for (const turns of [1, 3, 10, 40]) {
      for (const length of [0.03, 0.3, 3, 30]) {
        const stated = fieldMethod(solenoid(turns, 2, length)).relativeError;
        const pitch = length / turns;
        let worst = 0;
        const points: [number, number][] = [];
        for (let i = 0; i <= 20; i++) {
          const angle = (Math.PI / 2) * (i / 20);
          points.push([2, (length / 2) * (i / 20)], [1 + Math.cos(angle), length / 2 + Math.sin(angle)]);
          points.push([i / 20, length / 2 + 1], [0, (length / 2) * (i / 20)], [2 + i ** 2, length / 2 + i]);
        }
        for (const [r, z] of points) {
          let [radial, axial] = [0, 0];
          for (let turn = 0; turn < turns; turn++) {
            const field = filamentField(1, r, 1 - r, z + length / 2 - (turn + 0.5) * pitch);
            radial += field.radial / turns;
            axial += field.axial / turns;
          }
          const sheet = sheetField(1, r, 1 - r, z, z - length / 2, z + length / 2);
          worst = Math.max(worst, Math.hypot(sheet.radial - radial, sheet.axial - axial) / Math.hypot(radial, axial));
        }
        expect(worst).toBeLessThan(stated);
      }
    }
  });
});
