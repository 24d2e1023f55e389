import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  equalRingsMutualInductance_H,
  equivalentFilaments,
  roundRingSelfInductance_H,
} from '../../../src/physics/coils/ring-section.ts';
import { stackedRingsInductance_H } from '../../../src/physics/coils/stacked-rings.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import reference from '../../fixtures/scipy/rings.json' with { type: 'json' };

const rows = reference as [number, number, number, number, number][];
const worstError = (wireRatio: number) =>
  Math.max(
    ...rows
      .filter(([, , ratio]) => ratio === wireRatio)
      .map(([turns, pitch, ratio, expected]) =>
        Math.abs(stackedRingsInductance_H(turns, pitch, 1, ratio) / VACUUM_PERMEABILITY_H_PER_M / expected - 1),
      ),
  );

describe('stack of coaxial rings of round wire', () => {
  // 1 to 1000 turns at a pitch of 1 to 10 wire diameters; each pair of rings averaged over both sections in the reference,
  // whose own error for touching rings is about 2e-8.
  it.each([
    [1 / 3, 1e-5],
    [0.2, 1e-6],
    [0.1, 1e-7],
    [0.03, 3e-8],
    [0.01, 3e-8],
    [0.001, 3e-8],
  ])('agrees with the sum by quadrature, wire/coil diameter %f, within %f', (wireRatio, tolerance) => {
    expect(rows.filter(([, , ratio]) => ratio === wireRatio).length).toBe(44);
    expect(worstError(wireRatio)).toBeLessThan(tolerance);
  });

  it.each([
    [0.95, 1e-3],
    [1 / 1.5, 3e-4],
  ])('and for wire fatter than asked for, %f, within %f', (wireRatio, tolerance) => {
    expect(worstError(wireRatio)).toBeLessThan(tolerance);
  });

  it('gives with its integral what the plain sum of the same rings gives', () => {
    for (const ratio of [1 / 3, 0.1, 0.01, 1e-4]) {
      for (const spacing of [1, 1.5, 3, 10]) {
        for (const turns of [28.9, 29, 29.5, 30, 35.3, 100, 300.7, 4000]) {
          const pitch = 2 * ratio * spacing;
          const filaments = equivalentFilaments(1, ratio);
          let sum = 0;
          for (let m = Math.ceil(turns) - 1; m > 0; m--) {
            sum += (turns - m) * equalRingsMutualInductance_H(filaments, m * pitch);
          }
          const plain = turns * roundRingSelfInductance_H(1, ratio) + 2 * sum;
          expect(Math.abs(stackedRingsInductance_H(turns, pitch, 1, ratio) / plain - 1)).toBeLessThan(2e-10);
        }
      }
    }
  });

  it('is continuous in turns and grows with them', () => {
    for (const turns of [1, 2, 10, 28, 29, 30, 500]) {
      const at = (n: number) => stackedRingsInductance_H(n, 0.03, 1, 0.01);
      expect(at(turns + 1e-9) / at(turns - 1e-9) - 1).toBeGreaterThan(0);
      expect(at(turns + 1e-9) / at(turns - 1e-9) - 1).toBeLessThan(1e-8);
      expect(at(turns + 0.5)).toBeGreaterThan(at(turns));
      expect(at(turns + 0.5)).toBeLessThan(at(turns + 1));
    }
  });

  it('tends to the endless sheet less the wire’s own correction, at once for any number of turns', () => {
    // Per turn µ0 π a²/pitch − µ0 a (ln(π wire/pitch) − 1/4): Rosa's two corrections for round wire, 5/4 − ln(2 pitch/wire) and
    // ln 2π − 3/2 in the limit of many turns, with the end effect −4 radius/(3π/2 length) below 1e-6 here.
    for (const spacing of [1, 2, 10]) {
      const [turns, pitch] = [1e10, 1e-3];
      const wire = pitch / spacing;
      const perTurn = Math.PI / pitch - (Math.log((Math.PI * wire) / pitch) - 0.25);
      const actual = stackedRingsInductance_H(turns, pitch, 1, wire / 2) / VACUUM_PERMEABILITY_H_PER_M / turns;
      expect(Math.abs(actual / perTurn - 1)).toBeLessThan(5e-7);
    }
  });

  it('scales with size', () => {
    const turns = fc.double({ min: 1, max: 2000, noNaN: true });
    const ratio = fc.double({ min: 1e-4, max: 0.9, noNaN: true });
    fc.assert(
      fc.property(turns, ratio, fc.double({ min: 1, max: 10, noNaN: true }), (n, wire, spacing) => {
        const pitch = 2 * wire * spacing;
        const inductance = stackedRingsInductance_H(n, pitch, 1, wire);
        for (const scale of [1e9, 1e-9]) {
          const scaled = stackedRingsInductance_H(n, pitch * scale, scale, wire * scale) / scale;
          expect(Math.abs(scaled / inductance - 1)).toBeLessThan(1e-13);
        }
      }),
      { seed: 4, numRuns: 200 },
    );
  });
});
