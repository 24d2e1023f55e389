import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { coaxialLoopsMutualInductance_H } from '../../../src/physics/coils/coaxial-loops.ts';
import { type Multilayer, multilayerInductance } from '../../../src/physics/coils/multilayer.ts';
import { currentSheetInductance_H } from '../../../src/physics/coils/nagaoka.ts';
import { roundRingSelfInductance_H } from '../../../src/physics/coils/ring-section.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import fixture from '../../fixtures/mpfr/multilayer.json' with { type: 'json' };

const coil = (turns: number, innerDiameter_m: number, outerDiameter_m: number, length_m: number): Multilayer => ({
  shape: 'multilayer',
  turns,
  innerDiameter_m,
  outerDiameter_m,
  length_m,
});
const inductance = (...dimensions: Parameters<typeof coil>): number =>
  multilayerInductance(coil(...dimensions)).inductance_H;
const off = (value: number, expected: number): number => Math.abs(value / expected - 1);
const refusal = (bad: Multilayer): string => {
  try {
    multilayerInductance(bad);
  } catch (error) {
    if (error instanceof InvalidQuantity) return error.pointer;
    throw error;
  }
  return 'accepted';
};

describe('thick coil of uniform current density', () => {
  it('is within 1e-10 of the exact sheet kernel over both radii, from thin disc to thin tube to long solid coil', () => {
    expect(fixture.cases).toHaveLength(128);
    let worst = 0;
    for (const { innerDiameter_m, outerDiameter_m, length_m, inductancePerMu0_m } of fixture.cases) {
      const value = inductance(1, innerDiameter_m, outerDiameter_m, length_m) / VACUUM_PERMEABILITY_H_PER_M;
      worst = Math.max(worst, off(value, inductancePerMu0_m));
    }
    expect(worst).toBeLessThan(1e-10);
  });

  it('is within 1e-10 of the Bessel-Struve spectral integral', () => {
    const spectral = fixture.cases.filter((c) => c.besselStruve !== undefined);
    expect(spectral).toHaveLength(12);
    for (const { innerDiameter_m, outerDiameter_m, length_m, besselStruve } of spectral) {
      const value = inductance(1, innerDiameter_m, outerDiameter_m, length_m) / VACUUM_PERMEABILITY_H_PER_M;
      expect(off(value, besselStruve!)).toBeLessThan(1e-10);
    }
  });

  it('gives a Brooks coil its published 1.6994 µH a metre of mean radius and turn squared', () => {
    // H. B. Brooks, Design of standards of inductance, Bureau of Standards J. Research 7 (1931) 289 (from memory): build and
    // length c, inner radius c, mean radius 1.5 c.
    expect(inductance(100, 0.04, 0.08, 0.02) / (100 ** 2 * 0.03)).toBeCloseTo(1.6994e-6, 10);
  });

  it('of a small section is a ring whose wire has the section’s geometric mean distance', () => {
    // J. C. Maxwell, Treatise (1873), arts. 692 and 705: ln R of a rectangle from itself. Neglected: (section/radius)² log.
    for (const [build, length] of [
      [1e-6, 1e-6],
      [1e-6, 3e-7],
      [1e-8, 1e-6],
      [1e-6, 1e-9],
      [1e-7, 1e-7],
    ] as const) {
      const ratio = build / length;
      const meanDistance =
        Math.log(build * build + length * length) / 2 -
        (ratio ** 2 * Math.log1p(ratio ** -2)) / 12 -
        (ratio ** -2 * Math.log1p(ratio ** 2)) / 12 +
        (2 / 3) * (ratio * Math.atan(1 / ratio) + Math.atan(ratio) / ratio) -
        25 / 12;
      const [inner, outer] = [2 - build, 2 + build];
      const expected = VACUUM_PERMEABILITY_H_PER_M * (Math.log(8) - meanDistance - 2);
      // The build that is left after rounding the diameters is off by 1e-16/build.
      expect(off(inductance(1, inner, outer, length), expected)).toBeLessThan(1e-11 + 2e-17 / build);
    }
  });

  it('tends to the current sheet as its build vanishes, for every length', () => {
    for (const length of [1e-6, 1e-3, 1, 1e3, 1e6]) {
      const sheet = currentSheetInductance_H(1, 1, length);
      // To first order in build/length and build/diameter; both times a logarithm at most.
      for (const build of [1e-3, 1e-6, 1e-9]) {
        const relative = build * Math.min(1, length);
        const difference = off(inductance(1, 1 - relative, 1 + relative, length), sheet);
        expect(difference).toBeLessThan(2 * build);
      }
    }
  });

  it('scales with size and with the square of the turns', () => {
    const one = inductance(1, 0.04, 0.07, 0.03);
    expect(off(inductance(250, 0.04, 0.07, 0.03), 62500 * one)).toBeLessThan(1e-15);
    for (const scale of [1e-9, 1e9, 1e-150, 1e150]) {
      expect(off(inductance(1, 0.04 * scale, 0.07 * scale, 0.03 * scale), scale * one)).toBeLessThan(1e-12);
    }
  });

  it('stays below the current sheet at its outer diameter and is never continued wrongly between proportions', () => {
    const decade = (low: number, high: number) => fc.double({ min: low, max: high, noNaN: true }).map((x) => 10 ** x);
    fc.assert(
      fc.property(decade(-6, 0), decade(-6, 6), (build, length) => {
        const value = inductance(1, 2 - 2 * build, 2, length);
        expect(value).toBeLessThan(currentSheetInductance_H(1, 2, length));
        // A step of 1e-7 in length changes L by less than that.
        expect(off(inductance(1, 2 - 2 * build, 2, length * (1 + 1e-7)), value)).toBeLessThan(1.01e-7);
      }),
      { seed: 1931, numRuns: 150 },
    );
  });

  it('states an error that covers coils wound of round wire', () => {
    for (const [layers, perLayer] of [
      [10, 10],
      [3, 20],
      [20, 3],
      [1, 12],
      [12, 1],
      [2, 2],
    ] as const) {
      for (const spacing of [1, 1.3, 2]) {
        for (const radius of [1.2, 3, 20]) {
          const { inductance_H, method } = multilayerInductance(
            coil(layers * perLayer, 2 * radius * layers, 2 * (radius + 1) * layers, perLayer),
          );
          const wound = woundOfRings(layers, perLayer, radius * layers, 1 / spacing);
          expect(method.relativeError, `${layers} × ${perLayer}, ${spacing}, ${radius}`).toBeGreaterThan(
            off(wound, inductance_H),
          );
        }
      }
    }
  });

  it('refuses what cannot be', () => {
    expect(refusal(coil(10, 0.02, 0.02, 0.01))).toBe('/outerDiameter_m');
    expect(refusal(coil(10, 0.03, 0.02, 0.01))).toBe('/outerDiameter_m');
    expect(refusal(coil(10, 0, 1e308, 1e-308))).toBe('/length_m');
    expect(refusal(coil(10, 0, 1e-308, 1e308))).toBe('/length_m');
    expect(refusal(coil(1e200, 0, 1, 1))).toBe('/turns');
    expect(refusal(coil(1e-200, 0, 1, 1))).toBe('/turns');
    expect(refusal(coil(1, 0, 1e308, 1e308))).toBe('accepted');
    expect(refusal(coil(1, 0, 1, 1e-59))).toBe('accepted');
    expect(refusal(coil(1, 0, 1, 1e59))).toBe('accepted');
  });
});

/** Rings of round wire on a square lattice of side 1: their self-inductances and the filaments of every pair. */
function woundOfRings(layers: number, perLayer: number, innerRadius: number, wire: number): number {
  const radii = Array.from({ length: layers }, (_, i) => innerRadius + i + 0.5);
  let total = 0;
  for (const a of radii) {
    for (const b of radii) {
      for (let step = 0; step < perLayer; step++) {
        const pairs = step === 0 ? perLayer : 2 * (perLayer - step);
        const one =
          a === b && step === 0 ? roundRingSelfInductance_H(a, wire / 2) : coaxialLoopsMutualInductance_H(a, b, step);
        total += pairs * one;
      }
    }
  }
  return total;
}
