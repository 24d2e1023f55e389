import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { sortByDistribution } from '../../src/metrology/distribution-sort.ts';

describe('sorting by distribution', () => {
  const any = fc.oneof(
    fc.double({ noNaN: true, noDefaultInfinity: true }),
    fc.double({ min: -1, max: 1, noNaN: true }),
    fc.constantFrom(0, 1, Number.MIN_VALUE, Number.MAX_VALUE, -Number.MAX_VALUE),
  );

  it('puts what the general sort does in the same order', () => {
    fc.assert(
      fc.property(fc.array(any, { maxLength: 300 }), (values) => {
        const sorted = sortByDistribution(Float64Array.from(values));
        expect(Array.from(sorted, (x) => x + 0)).toEqual(values.toSorted((a, b) => a - b).map((x) => x + 0));
      }),
      { seed: 55, numRuns: 1000 },
    );
  });

  it.each<[string, (i: number) => number]>([
    ['evenly spread', (i) => (i * 7919) % 50_021],
    ['a tail', (i) => -Math.log((((i * 7919) % 50_021) + 1) / 50_022)],
    ['ties', (i) => i % 10],
    ['one far off', (i) => (i === 77 ? 1e300 : Math.sin(i))],
    ['all equal', () => 3],
    ['smaller than the smallest normal number', (i) => ((i * 31) % 101) * Number.MIN_VALUE],
  ])('of 50 000 values: %s', (_, value) => {
    const values = Float64Array.from({ length: 50_000 }, (_x, i) => value(i));
    expect(sortByDistribution(values.slice())).toEqual(values.slice().sort());
  });
});
