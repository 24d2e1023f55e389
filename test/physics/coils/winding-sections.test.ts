import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { averageOverSections, type WindingSection } from '../../../src/physics/coils/winding-sections.ts';

const decade = (low: number, high: number) => fc.double({ min: low, max: high, noNaN: true }).map((x) => 10 ** x);
const sections = fc
  .tuple(decade(-2, 0), decade(-4, 1), decade(-3, 1), fc.boolean())
  .map(([inner, build, length_m, solid]): WindingSection => {
    const outerRadius_m = inner * (1 + build);
    return { innerRadius_m: solid ? 0 : inner, outerRadius_m, length_m };
  });

describe('average over winding sections', () => {
  it('is the weighted mean over the parts that one section is cut into, whether the sections overlap or not', () => {
    // Each part has panels of its own, so that agreement says that the panels do not matter.
    let worst = 0;
    let worstSlope = 0;
    fc.assert(
      fc.property(
        sections,
        sections,
        fc.double({ min: 0, max: 3, noNaN: true }),
        fc.double({ min: 0.05, max: 0.95, noNaN: true }),
        (whole, other, apart, cut) => {
          const distance = (apart * (whole.length_m + other.length_m)) / 2;
          const all = averageOverSections(whole, other, distance, true);
          const { innerRadius_m, outerRadius_m, length_m } = whole;
          const middle = innerRadius_m + cut * (outerRadius_m - innerRadius_m);
          const inward = averageOverSections({ innerRadius_m, outerRadius_m: middle, length_m }, other, distance, true);
          const outward = averageOverSections(
            { innerRadius_m: middle, outerRadius_m, length_m },
            other,
            distance,
            true,
          );
          // The lower part ends where the upper one begins; the distance is from the whole's centre to the other's.
          const lower = { ...whole, length_m: cut * length_m };
          const upper = { ...whole, length_m: (1 - cut) * length_m };
          const below = averageOverSections(lower, other, distance + ((1 - cut) * length_m) / 2, true);
          const above = averageOverSections(upper, other, distance - (cut * length_m) / 2, true);
          for (const [one, two] of [
            [inward, outward],
            [below, above],
          ] as const) {
            const mutual = cut * one.mutualPerMu0_m + (1 - cut) * two.mutualPerMu0_m;
            const slope = cut * one.slopePerMu0 + (1 - cut) * two.slopePerMu0;
            worst = Math.max(worst, Math.abs(mutual / all.mutualPerMu0_m - 1));
            // Slopes of the parts may cancel where the centres nearly coincide.
            const size = Math.abs(cut * one.slopePerMu0) + Math.abs((1 - cut) * two.slopePerMu0);
            if (size > 0) worstSlope = Math.max(worstSlope, Math.abs(slope - all.slopePerMu0) / size);
          }
        },
      ),
      { seed: 701, numRuns: 50 },
    );
    expect(worst).toBeLessThan(2e-10);
    expect(worstSlope).toBeLessThan(2e-9);
  });

  it('has a slope that is the derivative of M, where sections overlap too', () => {
    const thick = { innerRadius_m: 0.5, outerRadius_m: 1, length_m: 1 };
    const other = { innerRadius_m: 0.7, outerRadius_m: 1.3, length_m: 0.4 };
    const at = (z: number): number => averageOverSections(thick, other, z, false).mutualPerMu0_m;
    for (const z of [0.05, 0.2, 0.4, 0.9, 3]) {
      const h = 1e-3;
      const difference = (8 * (at(z + h) - at(z - h)) - (at(z + 2 * h) - at(z - 2 * h))) / (12 * h);
      const { slopePerMu0 } = averageOverSections(thick, other, z, true);
      expect(Math.abs(slopePerMu0 / difference - 1)).toBeLessThan(1e-6);
    }
    expect(averageOverSections(thick, other, 0, true).slopePerMu0).toBe(0);
  });
});
