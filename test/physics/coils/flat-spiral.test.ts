import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  type FlatSpiral,
  flatSpiralInductance,
  spiralCurrentSheet_H,
  spiralModifiedWheeler_H,
} from '../../../src/physics/coils/flat-spiral.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../../../src/physics/constants.ts';
import reference from '../../fixtures/scipy/flat-spiral.json' with { type: 'json' };

const OUTLINES = ['circle', 'square', 'hexagon', 'octagon'] as const;
type Outline = FlatSpiral['outline'];

function spiral(
  outline: Outline,
  turns: number,
  width: number,
  spacing: number,
  thickness = 0,
  outerDiameter_m = 2,
): FlatSpiral {
  const radius = outerDiameter_m / 2;
  return {
    shape: 'flat-spiral',
    outline,
    turns,
    outerDiameter_m,
    trackWidth_m: width * radius,
    trackSpacing_m: spacing * radius,
    ...(thickness === 0 ? {} : { trackThickness_m: thickness * radius }),
  };
}

describe('flat spiral, sum over concentric turns', () => {
  it('agrees with direct product integration over the sections of every pair of turns', () => {
    expect(reference.sums.length).toBe(40);
    for (const [outline, turns, width, spacing, thickness, expected] of reference.sums as [
      Outline,
      number,
      number,
      number,
      number,
      number,
    ][]) {
      const { inductance_H } = flatSpiralInductance(spiral(outline, turns, width, spacing, thickness));
      const error = Math.abs((inductance_H * 4 * Math.PI) / VACUUM_PERMEABILITY_H_PER_M / expected - 1);
      expect(error).toBeLessThan(outline === 'circle' ? 2e-9 : 1e-8);
    }
  });

  it('differs from spirals that draw in evenly by no more than it says', () => {
    expect(reference.archimedean.length).toBe(11);
    for (const [turns, width, spacing, expected] of reference.archimedean as [number, number, number, number][]) {
      const { inductance_H, method } = flatSpiralInductance(spiral('circle', turns, width, spacing));
      const even_H = (VACUUM_PERMEABILITY_H_PER_M / (4 * Math.PI)) * expected;
      expect(Math.abs(even_H / inductance_H - 1)).toBeLessThan(method.relativeError);
    }
  });

  it('differs from a turn whose current keeps to the inside of the bend by no more than it says', () => {
    expect(reference.bend.length).toBe(7);
    for (const [width, expected] of reference.bend as [number, number][]) {
      const { inductance_H, method } = flatSpiralInductance(spiral('circle', 1, width, 1));
      const bent_H = (VACUUM_PERMEABILITY_H_PER_M / (4 * Math.PI)) * expected;
      expect(bent_H).toBeLessThan(inductance_H);
      expect(1 - bent_H / inductance_H).toBeLessThan(method.relativeError);
    }
  });

  it('of one narrow turn is Maxwell’s ring, µ0 a [ln(8a/g) − 2] with g = 0.22313 w of a strip', () => {
    const width = 1e-5;
    const a = 1 - width / 2;
    const ring = VACUUM_PERMEABILITY_H_PER_M * a * (Math.log((8 * a) / (Math.exp(-1.5) * width)) - 2);
    expect(Math.abs(flatSpiralInductance(spiral('circle', 1, width, 1)).inductance_H / ring - 1)).toBeLessThan(1e-9);
  });

  it('of one narrow square turn has Grover’s constant −0.77401 with the strip’s mean distance', () => {
    const width = 1e-5;
    const side = 2 * (1 - width / 2);
    const square =
      ((2 * VACUUM_PERMEABILITY_H_PER_M * side) / Math.PI) * (Math.log(side / (Math.exp(-1.5) * width)) - 0.77401);
    expect(Math.abs(flatSpiralInductance(spiral('square', 1, width, 1)).inductance_H / square - 1)).toBeLessThan(2e-6);
  });

  it('grows steadily with turns, parts of turns included, and does not jump at whole ones', () => {
    for (const outline of OUTLINES) {
      const at = (turns: number) => flatSpiralInductance(spiral(outline, turns, 0.05, 0.03, 0.01)).inductance_H;
      let last = 0;
      for (let turns = 1; turns <= 5; turns += 0.25) {
        expect(at(turns)).toBeGreaterThan(last);
        last = at(turns);
      }
      for (const whole of [2, 5]) {
        expect(Math.abs(at(whole - 1e-9) / at(whole) - 1)).toBeLessThan(1e-7);
        expect(Math.abs(at(whole + 1e-9) / at(whole) - 1)).toBeLessThan(1e-7);
      }
    }
  });

  it('orders the outlines of one diameter by their area', () => {
    const at = (outline: Outline) => flatSpiralInductance(spiral(outline, 5, 0.05, 0.03)).inductance_H;
    expect(at('square')).toBeGreaterThan(at('hexagon'));
    expect(at('hexagon')).toBeGreaterThan(at('octagon'));
    expect(at('octagon')).toBeGreaterThan(at('circle'));
  });

  it('scales with size, and a vanishing thickness is a strip', () => {
    const part = fc.double({ min: 0.1, max: 1, noNaN: true });
    fc.assert(
      fc.property(fc.constantFrom(...OUTLINES), fc.integer({ min: 1, max: 12 }), part, part, (outline, turns, a, b) => {
        const pitch = (0.95 * b) / turns;
        const [width, spacing] = [a * pitch, (1 - a) * pitch + 1e-6];
        const unit = flatSpiralInductance(spiral(outline, turns, width, spacing)).inductance_H;
        for (const scale of [1e9, 1e-9]) {
          const scaled =
            flatSpiralInductance(spiral(outline, turns, width, spacing, 0, 2 * scale)).inductance_H / scale;
          expect(Math.abs(scaled / unit - 1)).toBeLessThan(1e-12);
        }
        const thin = flatSpiralInductance(spiral(outline, turns, width, spacing, width * 1e-9)).inductance_H;
        expect(Math.abs(thin / unit - 1)).toBeLessThan(1e-8);
      }),
      { seed: 3, numRuns: 40 },
    );
  });

  it('takes a thousand turns and ten thousand: n² times the inductance of the same winding', () => {
    for (const outline of OUTLINES) {
      const perTurn2 = (turns: number) =>
        flatSpiralInductance(spiral(outline, turns, 0.3 / turns, 0.3 / turns)).inductance_H / turns ** 2;
      expect(perTurn2(1000) / perTurn2(10_000)).toBeCloseTo(1, 2);
    }
  });
});

describe('flat spiral, published expressions', () => {
  it('lie within a few per cent of the sum where their authors fitted them', () => {
    for (const outline of OUTLINES) {
      for (const [turns, width, spacing] of [
        [2, 0.12, 0.02],
        [4, 0.08, 0.03],
        [8, 0.06, 0.02],
        [12, 0.04, 0.01],
      ] as const) {
        const coil = spiral(outline, turns, width, spacing, 0.01);
        const { inductance_H, closedForm_H, method } = flatSpiralInductance(coil);
        expect(closedForm_H).toBe(spiralCurrentSheet_H(coil));
        expect(Math.abs(closedForm_H / inductance_H - 1)).toBeLessThan(0.08);
        expect(method.relativeError).toBeGreaterThanOrEqual(Math.abs(closedForm_H / inductance_H - 1));
        const wheeler = spiralModifiedWheeler_H(coil);
        if (outline === 'circle') expect(wheeler).toBeUndefined();
        else expect(Math.abs(wheeler! / inductance_H - 1)).toBeLessThan(0.1);
      }
    }
  });

  it('agree with the monomial fit of the same paper (Mohan et al. 1999, Table III) for a square', () => {
    // L[nH] = 1.62e-3 dout^-1.21 w^-0.147 davg^2.40 n^1.78 s^-0.030, lengths in µm.
    const coil: FlatSpiral = {
      shape: 'flat-spiral',
      outline: 'square',
      turns: 5,
      outerDiameter_m: 300e-6,
      trackWidth_m: 12e-6,
      trackSpacing_m: 3e-6,
    };
    const average = 300 - (5 * 12 + 4 * 3);
    const monomial = 1.62e-3 * 300 ** -1.21 * 12 ** -0.147 * average ** 2.4 * 5 ** 1.78 * 3 ** -0.03;
    expect(Math.abs(spiralCurrentSheet_H(coil) / (monomial * 1e-9) - 1)).toBeLessThan(0.05);
    expect(Math.abs(spiralModifiedWheeler_H(coil)! / (monomial * 1e-9) - 1)).toBeLessThan(0.05);
    expect(Math.abs(flatSpiralInductance(coil).inductance_H / (monomial * 1e-9) - 1)).toBeLessThan(0.05);
  });
});

describe('flat spiral, what cannot be', () => {
  const refused = (coil: FlatSpiral) => expect(() => flatSpiralInductance(coil)).toThrow('/turns');
  it('refuses turns that do not fit, a part of a turn without room, less than one and too many', () => {
    refused(spiral('circle', 5, 0.1, 0.125));
    refused(spiral('square', 4.5, 0.15, 0.07));
    refused(spiral('circle', 0.5, 0.1, 0.1));
    refused(spiral('circle', 10_001, 1e-8, 1e-8));
    expect(() => flatSpiralInductance(spiral('circle', 1, 0.1, 0.1, 2.01))).toThrow('/trackThickness_m');
    expect(() => flatSpiralInductance(spiral('circle', 1, 1e-101, 0.1))).toThrow('/trackWidth_m');
    expect(flatSpiralInductance(spiral('circle', 5, 0.1, 0.1249)).inductance_H).toBeGreaterThan(0);
  });
});
