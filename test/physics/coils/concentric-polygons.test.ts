import { describe, expect, it } from 'vitest';
import { circleArcShare } from '../../../src/physics/coils/concentric-circles.ts';
import { concentricPolygons_m, polygonPartShare } from '../../../src/physics/coils/concentric-polygons.ts';
import reference from '../../fixtures/mpmath/concentric-polygons.json' with { type: 'json' };

describe('Neumann’s integral of concentric polygons', () => {
  it('agrees with quadrature along the sides, 3 to 8 sides, from all but coincident to very unequal', () => {
    expect(reference.pairs.length).toBe(52);
    for (const [sides, mean, difference, z, expected] of reference.pairs as [
      number,
      number,
      number,
      number,
      number,
    ][]) {
      const error = Math.abs(concentricPolygons_m(sides, mean, difference, z) / expected - 1);
      // Far from each other in size or distance the sides' parts cancel, by the square of the ratio.
      const [outer, inner] = [mean + difference / 2, mean - difference / 2];
      expect(error).toBeLessThan(1e-14 * ((outer + z) / inner) ** 2);
    }
  });

  it('gives the published high-frequency constants of regular polygons (Grover 1946, ch. 8)', () => {
    // L = (µ0/2π) n s [ln(s/ρ) + C]: a filament on the axis against one on the surface, ρ away.
    const z = 1e-8;
    for (const [sides, constant] of [
      [3, -1.40546],
      [4, -0.77401],
      [8, 0.21198],
    ] as const) {
      const side = 2 * Math.tan(Math.PI / sides);
      const bracket = concentricPolygons_m(sides, 1, 0, z) / (2 * sides * side);
      expect(Math.abs(bracket - Math.log(side / z) - constant)).toBeLessThan(1.1e-5);
    }
  });

  it('scales with size', () => {
    for (const scale of [1e9, 1e-9]) {
      const ratio =
        concentricPolygons_m(8, scale, 0.2 * scale, 0.1 * scale) / scale / concentricPolygons_m(8, 1, 0.2, 0.1);
      expect(ratio).toBeCloseTo(1, 13);
    }
  });
});

describe('a part of a turn', () => {
  it('of a polygon agrees with quadrature', () => {
    expect(reference.polygonParts.length).toBe(54);
    for (const [sides, share, offset, expected] of reference.polygonParts as [number, number, number, number][]) {
      expect(Math.abs(polygonPartShare(sides, share, offset) / expected - 1)).toBeLessThan(1e-14);
    }
  });

  it('of a circle agrees with the double integral over the arc', () => {
    expect(reference.circleArcs.length).toBe(10);
    for (const [share, offset, expected] of reference.circleArcs as [number, number, number][]) {
      expect(Math.abs(circleArcShare(share, offset) / expected - 1)).toBeLessThan(1e-14);
    }
  });

  it('grows from nothing to one', () => {
    for (const share of [(f: number) => circleArcShare(f, 0.01), (f: number) => polygonPartShare(4, f, 0.01)]) {
      expect(share(1)).toBe(1);
      expect(share(1 - 1e-12)).toBeCloseTo(1, 10);
      expect(share(1e-9)).toBeLessThan(1e-8);
      let last = 0;
      for (let f = 0.01; f < 1; f += 0.01) {
        expect(share(f)).toBeGreaterThan(last);
        last = share(f);
      }
    }
  });
});
