import { describe, expect, it } from 'vitest';
import {
  analyseVariance,
  type VarianceAnalysis,
  type VarianceTest,
} from '../../../src/metrology/statistics/analysis-of-variance.ts';
import { mergeMoments, momentsOf, NO_VALUES } from '../../../src/metrology/statistics/moments.ts';
import reference from '../../fixtures/mpmath/analysis-of-variance.json' with { type: 'json' };

const analysed = (groups: readonly (readonly number[])[], significance?: number) =>
  analyseVariance(
    groups.map((group) => momentsOf(group)),
    significance,
  ) as VarianceAnalysis;
const relative = (found: number, expected: number) => Math.abs(found / expected - 1);

describe('one-way analysis of variance', () => {
  it.each(reference.cases)('$name', ({ groups, F, pValue, between, within, welch, ...components }) => {
    const found = analysed(groups);
    expect(relative(found.F, F)).toBeLessThan(1e-14);
    expect(relative(found.pValue, pValue)).toBeLessThan(2e-13);
    expect(relative(found.sumOfSquares.between, between)).toBeLessThan(1e-14);
    expect(relative(found.sumOfSquares.within, within)).toBeLessThan(1e-14);
    expect(relative(found.withinStandardDeviation, components.withinStandardDeviation)).toBeLessThan(1e-13);
    expect(Math.abs(found.betweenStandardDeviation - components.betweenStandardDeviation)).toBeLessThan(
      1e-14 * components.withinStandardDeviation,
    );
    expect(found.differ).toBe(pValue < 0.05);
    if (welch) {
      const { F: welchF, degreesOfFreedom, pValue: welchP } = found.welch as VarianceTest;
      expect(relative(welchF, welch.F)).toBeLessThan(1e-14);
      expect(relative(degreesOfFreedom.within, welch.within)).toBeLessThan(1e-14);
      expect(relative(welchP, welch.pValue)).toBeLessThan(2e-13);
    } else expect(found.welch).toHaveProperty('unavailable');
  });

  /**
   * NIST StRD SmLs01 to 09 (S. D. Simon, J. P. Lesage 1989): nine treatments, 0.4 + offset and pairs of 0.1 above and below, every
   * second one 0.1 up or down; certified F is the number of replicates. In units of 0.1, which doubles hold.
   */
  it.each([1, 1e6, 1e12].flatMap((offset) => [21, 201, 2001].map((replicates) => [offset, replicates] as const)))(
    'the stiff sets of NIST, values about %f, %i replicates: all digits',
    (offset, replicates) => {
      const groups = Array.from({ length: 9 }, (_, group) => {
        const centre = 10 * offset + 4 + (group === 0 ? 0 : group % 2 ? -1 : 1);
        return [centre, ...Array.from({ length: (replicates - 1) / 2 }, () => [centre - 1, centre + 1]).flat()];
      });
      const found = analysed(groups);
      expect(relative(found.F, replicates)).toBeLessThan(1e-14);
      expect(relative(found.withinStandardDeviation, 1)).toBeLessThan(1e-15);
      expect(found.degreesOfFreedom).toEqual({ between: 8, within: 9 * (replicates - 1) });
    },
  );

  it('two groups: F is the square of Student’s t', () => {
    // Student's sleep data (Biometrika 6 (1908) 1-25), as statistics programs' manuals analyse it: t = −1.8608, p = 0.07919 with 18 degrees of freedom.
    const { F, pValue, welch } = analysed([
      [0.7, -1.6, -0.2, -1.2, -0.1, 3.4, 3.7, 0.8, 0.0, 2.0],
      [1.9, 0.8, 1.1, 0.1, -0.1, 4.4, 5.5, 1.6, 4.6, 3.4],
    ]);
    expect(Math.sqrt(F)).toBeCloseTo(1.8608, 4);
    expect(pValue).toBeCloseTo(0.07919, 5);
    // and Welch's 17.776 degrees of freedom, p = 0.07939
    expect((welch as VarianceTest).degreesOfFreedom.within).toBeCloseTo(17.776, 3);
    expect((welch as VarianceTest).pValue).toBeCloseTo(0.07939, 5);
  });

  it.each([2, 10, 300, 1000, 333_334])('of three groups of %i: p in closed form, (1 + 2F/d)^(−d/2)', (n) => {
    const d = 3 * (n - 1);
    for (const ratio of [1e-6, 0.01, 0.5, 1, 3, 20, 600]) {
      // Means −m, 0, m and a mean square of 1 within: F = n m².
      const group = (mean: number) => ({ ...momentsOf([mean]), n, sumOfSquares: n - 1 });
      const m = Math.sqrt(ratio / n);
      const { F, pValue } = analyseVariance([group(-m), group(0), group(m)]) as VarianceAnalysis;
      expect(relative(F, ratio)).toBeLessThan(1e-14);
      expect(relative(pValue, Math.exp((-d / 2) * Math.log1p((2 * ratio) / d)))).toBeLessThan(1e-10);
    }
  });

  it('needs the groups’ moments alone, merged from anything', () => {
    const [first, second] = [
      [1, 2, 3, 4],
      [2, 4, 6, 9],
    ];
    const pieces = mergeMoments(momentsOf(first!.slice(0, 1)), momentsOf(first!.slice(1)));
    expect(analyseVariance([pieces, NO_VALUES, momentsOf(second!)])).toEqual(analysed([first!, second!]));
  });

  it('does not change with the unit', () => {
    const groups = reference.cases[1]!.groups;
    const plain = analysed(groups);
    for (const scale of [2 ** 30, 2 ** -30]) {
      const scaled = analysed(groups.map((group) => group.map((value) => value * scale)));
      expect(scaled.F).toBe(plain.F);
      expect(scaled.betweenStandardDeviation).toBe(plain.betweenStandardDeviation * scale);
    }
  });

  it('judges at the level asked for', () => {
    const groups = reference.cases[2]!.groups;
    expect(analysed(groups).differ).toBe(true);
    expect(analysed(groups, 0.01).differ).toBe(false);
    expect(() => analysed(groups, 1)).toThrow(expect.objectContaining({ pointer: '/significance' }));
  });

  it('equal means are no sign of a difference', () => {
    expect(
      analysed([
        [1, 3],
        [0, 4],
      ]),
    ).toMatchObject({ F: 0, pValue: 1, differ: false, betweenStandardDeviation: 0 });
  });

  it.each([
    ['no group', []],
    ['one group', [[1, 2]]],
    ['one group that holds values', [[1, 2], []]],
    ['single values only', [[1], [2]]],
    [
      'no spread within',
      [
        [1, 1],
        [2, 2],
      ],
    ],
  ])('%s: says why not', (_, groups) => expect(analysed(groups)).toEqual({ unavailable: expect.any(String) }));

  it('Welch’s needs a spread in each', () => {
    expect(
      analysed([
        [1, 2],
        [3, 3],
      ]).welch,
    ).toEqual({ unavailable: 'needs a spread within each group' });
  });
});
