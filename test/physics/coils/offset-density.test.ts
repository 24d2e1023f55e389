import { describe, expect, it } from 'vitest';
import { axialOffsets, type OffsetPiece, radialOffsets } from '../../../src/physics/coils/offset-density.ts';

/** ∫ density·zⁿ over a piece, exact: the density is linear. */
function moment({ start, width }: OffsetPiece, [from, to]: readonly [number, number], power: number): number {
  if (width === 0) return from * start ** power;
  // Simpson's rule twice over is exact to the fifth power.
  const [m1, m2] = [0.5 - Math.sqrt(0.15), 0.5 + Math.sqrt(0.15)];
  const at = (s: number): number => (from + (to - from) * s) * (start + width * s) ** power;
  return (width * (5 * at(m1) + 8 * at(0.5) + 5 * at(m2))) / 18;
}
const sum = (values: number[]): number => values.reduce((a, b) => a + b, 0);
const off = (value: number, expected: number): number => Math.abs(value / expected - 1);

describe('axial offset of two uniform points', () => {
  const lengths = [0, 1e-9, 1e-3, 0.7, 1, 40];
  const distances = [0, 1e-12, 1e-6, 0.149, 0.15, 0.35, 0.5, 0.8500000001, 1, 20.5, 1e6];

  it('has mass 1, mean the distance, and the variance of both', () => {
    for (const l1 of lengths) {
      for (const l2 of lengths) {
        for (const d of distances) {
          const pieces = axialOffsets(l1, l2, d);
          expect(off(sum(pieces.map((p) => moment(p, p.density, 0))), 1)).toBeLessThan(1e-12);
          const square = d * d + (l1 * l1 + l2 * l2) / 12;
          expect(Math.abs(sum(pieces.map((p) => moment(p, p.density, 2))) - square)).toBeLessThanOrEqual(
            1e-12 * square,
          );
          // The folded odd density has the signed offset's mean: to all its digits, however small beside the lengths.
          const mean = sum(pieces.map((p) => moment(p, p.oddDensity, 1)));
          expect(Math.abs(mean - d)).toBeLessThanOrEqual(1e-12 * d);
        }
      }
    }
  });

  it('is the same in exchange and has densities that are not negative', () => {
    for (const d of distances) {
      expect(axialOffsets(0.7, 40, d)).toEqual(axialOffsets(40, 0.7, d));
      for (const { density, oddDensity, width } of axialOffsets(0.7, 1, d)) {
        expect(width).toBeGreaterThan(0);
        expect(Math.min(...density, ...oddDensity)).toBeGreaterThan(-1e-15);
      }
    }
  });
});

describe('radial offset of two uniform radii', () => {
  it('has mass 1, mean the difference of the mean radii, and the variance of both', () => {
    for (const [a1, b1] of [
      [0, 1],
      [0.5, 0.5],
      [0.999999, 1],
      [0.2, 0.8],
    ] as const) {
      for (const [a2, b2] of [
        [0.1, 1.4],
        [1, 1],
        [0.3, 0.300001],
        [3, 5],
        [0.2, 0.8],
      ] as const) {
        const pieces = radialOffsets([a1, b1], [a2, b2]);
        const mean = (a2 + b2 - a1 - b1) / 2;
        const square = mean * mean + ((b1 - a1) ** 2 + (b2 - a2) ** 2) / 12;
        expect(off(sum(pieces.map((p) => moment(p, p.density, 0))), 1)).toBeLessThan(1e-12);
        // The mean of the radii above is itself rounded.
        const moment2 = sum(pieces.map((p) => moment(p, p.density, 2)));
        expect(Math.abs(moment2 - square)).toBeLessThan(1e-12 * square + 1e-15 * Math.abs(mean));
        // With the smaller radius and the offset both means come back: their sum is that of the mean radii.
        const radii = pieces.map(({ width, density, lower, upper, start }) => {
          const middle = (s: number): number =>
            (density[0] + (density[1] - density[0]) * s) *
            (lower[0] + upper[0] + (lower[1] + upper[1] - lower[0] - upper[0]) * s + start + width * s);
          const [m1, m2] = [0.5 - Math.sqrt(0.15), 0.5 + Math.sqrt(0.15)];
          return ((width || 1) * (5 * middle(m1) + 8 * middle(0.5) + 5 * middle(m2))) / 18;
        });
        expect(off(sum(radii), (a1 + b1 + a2 + b2) / 2)).toBeLessThan(1e-12);
      }
    }
  });
});
