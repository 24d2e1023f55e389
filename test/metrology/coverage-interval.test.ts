import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { coverageIntervals } from '../../src/metrology/coverage-interval.ts';

/** JCGM 101:2008 7.7 word for word, over a full sort, places counted from 1. */
function byDefinition(values: Float64Array, coverage: number) {
  const y = Array.from(values).sort((a, b) => a - b);
  const M = y.length;
  const q = Number.isInteger(coverage * M) ? coverage * M : Math.floor(coverage * M + 0.5);
  const r = Number.isInteger((M - q) / 2) ? (M - q) / 2 : Math.floor((M - q + 1) / 2);
  const interval = (place: number) => ({ lower: y[place - 1]!, upper: y[place + q - 1]! });
  let shortest = interval(1);
  for (let place = 2; place <= M - q; place++) {
    const candidate = interval(place);
    if (candidate.upper - candidate.lower < shortest.upper - shortest.lower) shortest = candidate;
  }
  return { symmetric: interval(r), shortest };
}

describe('coverage intervals', () => {
  it('are the order statistics of JCGM 101 7.7, few or many, at any coverage', () => {
    const values = fc
      .tuple(fc.constantFrom(20, 101, 4096, 4097, 30_000), fc.integer({ min: 1, max: 2 ** 31 - 1 }))
      .map(([length, seed]) => {
        let state = seed;
        return Float64Array.from({ length }, () => {
          state = (Math.imul(state, 1664525) + 1013904223) | 0;
          // Skewed, with many ties.
          return Math.round(((state >>> 8) / 2 ** 24) ** 3 * 1e4) / 100;
        });
      });
    fc.assert(
      fc.property(values, fc.constantFrom(0.95, 0.9, 0.6827, 0.5, 0.3), (y, coverage) => {
        expect(coverageIntervals([y.slice(0, 7000), y.slice(7000)], coverage)).toEqual(byDefinition(y, coverage));
      }),
      { seed: 101, numRuns: 30 },
    );
  });

  it('are exact where the first values are not like the rest', () => {
    for (const direction of [1, -1]) {
      const ordered = Float64Array.from({ length: 50_000 }, (_, i) => direction * i ** 1.5);
      expect(coverageIntervals([ordered], 0.95)).toEqual(byDefinition(ordered, 0.95));
    }
    const late = Float64Array.from({ length: 50_000 }, (_, i) => (i < 5000 ? 0 : i % 1009));
    expect(coverageIntervals([late], 0.95)).toEqual(byDefinition(late, 0.95));
  });

  it('leave the values as they were', () => {
    const values = Float64Array.from({ length: 9000 }, (_, i) => Math.sin(i));
    const before = values.slice();
    coverageIntervals([values], 0.95);
    expect(values).toEqual(before);
  });
});
