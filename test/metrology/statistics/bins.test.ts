import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addToBins,
  type Binning,
  type Bins,
  binEdge,
  binning,
  binsOf,
  binWidth,
  countOf,
  EMPTY_BINS,
  MOST_BINS,
  mergeBins,
} from '../../../src/metrology/statistics/bins.ts';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import { normalSample } from './normal-sample-generator.ts';

const DRAWING = binning({ lower: 0.9e-3, upper: 1.1e-3 });

/** Every value lies in the bin that counts it, to rounding. */
function expectCounted(where: Binning, bins: Bins, values: readonly number[]): void {
  const inside = Float64Array.from(values)
    .sort()
    .subarray(bins.below, values.length - bins.above);
  let next = 0;
  let strangers = 0;
  bins.indices.forEach((index, i) => {
    const [low, high] = [binEdge(where, bins.halvings, index), binEdge(where, bins.halvings, index + 1)];
    for (let k = 0; k < bins.counts[i]!; k++, next++) {
      const value = inside[next]!;
      const rounding = 4 * Number.EPSILON * (Math.abs(where.origin) + Math.abs(value - where.origin));
      if (!(value >= low - rounding && value <= high + rounding)) strangers++;
    }
  });
  expect(strangers).toBe(0);
  expect(next).toBe(inside.length);
}

describe('where bins lie', () => {
  it.each([
    [
      { lower: 2, upper: 5 },
      { origin: 2, scale: 3 },
    ],
    [{ lower: -4 }, { origin: -4, scale: 4 }],
    [{ upper: 0.5 }, { origin: 0.5, scale: 0.5 }],
    [{ upper: 0 }, { origin: 0, scale: 1 }],
    [
      { lower: 7, upper: 7 },
      { origin: 7, scale: 7 },
    ],
  ])('%j', (limits, expected) => expect(binning(limits)).toEqual(expected));

  it.each([
    [{}, '/lower'],
    [{ lower: Number.NaN, upper: 1 }, '/lower'],
    [{ upper: Number.POSITIVE_INFINITY }, '/upper'],
    [{ lower: 2, upper: 1 }, '/lower'],
  ])('%j is refused', (limits, pointer) => {
    expect(() => binning(limits)).toThrow(expect.objectContaining({ name: 'InvalidQuantity', pointer }));
  });

  it('puts both limits on edges, however wide the bins are', () => {
    for (const halvings of [0, 1, 5, 32]) {
      expect(binEdge(DRAWING, halvings, 0)).toBe(0.9e-3);
      expect(Math.abs(binEdge(DRAWING, halvings, 2 ** halvings) / 1.1e-3 - 1)).toBeLessThan(3e-16);
    }
  });
});

describe('counting', () => {
  it('keeps up to 256 units apart', () => {
    const values = normalSample(256, 1e-3, 1e-5, 1);
    const bins = binsOf(DRAWING, values);
    expect(bins.indices).toHaveLength(256);
    expect(binWidth(DRAWING, bins)).toBe(DRAWING.scale * 2 ** -32);
    expectCounted(DRAWING, bins, values);
  });

  it.each([
    ['as wide as the limits', 1e-3, 3e-5],
    ['much narrower than the limits', 1.02e-3, 1e-9],
    ['beside them', 3e-3, 1e-5],
  ])('a hundred thousand units of a normal lot, %s: bins of 0.03 to 0.1 standard deviations', (_, mean, deviation) => {
    const values = normalSample(100_000, mean, deviation, 2);
    const bins = binsOf(DRAWING, values);
    expect(bins.indices.length).toBeLessThanOrEqual(MOST_BINS);
    expect(binWidth(DRAWING, bins)).toBeGreaterThan(0.03 * deviation);
    expect(binWidth(DRAWING, bins)).toBeLessThan(0.1 * deviation);
    expect(countOf(bins)).toBe(100_000);
    expectCounted(DRAWING, bins, values);
    expect(JSON.stringify(bins).length).toBeLessThan(4096);
  });

  it('strays cost a bin each, and an overflow code none', () => {
    const lot = normalSample(10_000, 1e-3, 1e-5, 3);
    const alone = binsOf(DRAWING, lot);
    const strays = [0, -1, 1, 17, 50, 9.9e37, 9.9e37, -1e30];
    const together = binsOf(DRAWING, [...lot, ...strays]);
    expect(together).toMatchObject({ above: 2, below: 1 });
    expect(binWidth(DRAWING, together)).toBeLessThanOrEqual(2 * binWidth(DRAWING, alone));
    expect(countOf(together)).toBe(10_008);
  });

  it('the widest of spreads still fits', () => {
    const values = Array.from({ length: 2000 }, (_, i) => DRAWING.scale * 2 ** 19 * Math.sin(i));
    const bins = binsOf(DRAWING, values);
    expect(bins.indices.length).toBeLessThanOrEqual(MOST_BINS);
    expectCounted(DRAWING, bins, values);
  });

  it('1e6 ± 1e-3, limits as close', () => {
    const where = binning({ lower: 1e6 - 3e-3, upper: 1e6 + 3e-3 });
    const values = normalSample(5000, 1e6, 1e-3, 4);
    expectCounted(where, binsOf(where, values), values);
  });

  it('refuses what is no number', () => {
    expect(() => binsOf(DRAWING, [1e-3, Number.NaN])).toThrow(new InvalidQuantity('/1', 'must be a finite number'));
    expect(() => addToBins(DRAWING, EMPTY_BINS, Number.POSITIVE_INFINITY)).toThrow(InvalidQuantity);
  });
});

describe('merging', () => {
  const lots = fc.array(
    fc.oneof(
      fc.double({ min: 0.9e-3, max: 1.1e-3, noNaN: true }),
      fc.double({ min: -10, max: 10, noNaN: true }),
      fc.constantFrom(0, 1e-3, 1.1e-3, 9.9e37),
    ),
    { maxLength: 900, size: 'max' },
  );

  it('gives the bins of all values together, whatever the parts and their order', () => {
    fc.assert(
      fc.property(lots, fc.integer({ min: 1, max: 200 }), fc.boolean(), (values, size, backwards) => {
        const parts: Bins[] = [];
        for (let i = 0; i < values.length; i += size) parts.push(binsOf(DRAWING, values.slice(i, i + size)));
        if (backwards) parts.reverse();
        expect(parts.reduce(mergeBins, EMPTY_BINS)).toEqual(binsOf(DRAWING, values));
      }),
      { seed: 5, numRuns: 25 },
    );
  });

  it('also one by one and through JSON', () => {
    const values = normalSample(1500, 1e-3, 1e-5, 6);
    const stored = values.reduce<Bins>(
      (bins, value) => JSON.parse(JSON.stringify(addToBins(DRAWING, bins, value))),
      EMPTY_BINS,
    );
    expect(stored).toEqual(binsOf(DRAWING, values));
  });

  it('scales with the values and the limits', () => {
    const values = normalSample(3000, 1e-3, 1e-5, 7);
    for (const scale of [2 ** 30, 2 ** -30]) {
      const where = binning({ lower: 0.9e-3 * scale, upper: 1.1e-3 * scale });
      expect(
        binsOf(
          where,
          values.map((value) => value * scale),
        ),
      ).toEqual(binsOf(DRAWING, values));
    }
  });
});
