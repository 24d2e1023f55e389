import { describe, expect, it } from 'vitest';
import {
  addValue,
  type Moments,
  meanDifference,
  mergeMoments,
  momentsOf,
  NO_VALUES,
  standardDeviation,
  standardError,
} from '../../../src/metrology/statistics/moments.ts';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import nist from '../../fixtures/nist/univariate.json' with { type: 'json' };
import exact from '../../fixtures/python/moments.json' with { type: 'json' };

/** The generator of the fixture's program. */
function generated(n: number, offset: number, spread: number): number[] {
  let x = 1;
  return Array.from({ length: n }, () => {
    x = (48271 * x) % 2147483647;
    return offset + spread * (x / 2147483648 - 0.5);
  });
}

const pairs = (first: number, low: number, high: number) => [
  first,
  ...Array.from({ length: 500 }, () => [low, high]).flat(),
];

/** Orders in which the same values may reach a rollup. */
const ORDERS: Record<string, (values: readonly number[]) => Moments> = {
  'one by one': (values) => momentsOf(values),
  'sorted, one by one': (values) => momentsOf([...values].sort((a, b) => a - b)),
  'blocks of 37, last first': (values) => {
    let moments = NO_VALUES;
    for (let i = 37 * Math.floor(values.length / 37); i >= 0; i -= 37) {
      moments = mergeMoments(moments, momentsOf(values.slice(i, i + 37)));
    }
    return moments;
  },
  'a lopsided tree': function tree(values): Moments {
    if (values.length < 3) return momentsOf(values);
    const cut = Math.ceil(values.length / 3);
    return mergeMoments(tree(values.slice(0, cut)), tree(values.slice(cut)));
  },
  'through JSON': (values) =>
    values.reduce((moments, value) => addValue(JSON.parse(JSON.stringify(moments)), value), NO_VALUES),
};

const s = (moments: Moments) => standardDeviation(moments) as number;
const ulp = (value: number) => 2 ** (Math.floor(Math.log2(Math.abs(value))) - 52);

describe.each(Object.entries(ORDERS))('in any order of merging: %s', (_, merged) => {
  it.each([
    ['Lew', nist.lew.values, nist.lew.mean, nist.lew.standardDeviation],
    ['Michelso', nist.michelso.values, nist.michelso.mean, nist.michelso.standardDeviation],
    ['NumAcc1', [10000001, 10000003, 10000002], 10000002, 1],
    ['NumAcc2', pairs(1.2, 1.1, 1.3), 1.2, 0.1],
    // In units of the last printed decimal, where the doubles are the printed values.
    ['NumAcc3, times ten', pairs(10000002, 10000001, 10000003), 10000002, 1],
    ['NumAcc4, times ten', pairs(100000002, 100000001, 100000003), 100000002, 1],
  ])('gives the certified 15 digits of the NIST set %s', (_name, values, mean, deviation) => {
    const moments = merged(values);
    expect(Math.abs(moments.mean / mean - 1)).toBeLessThan(5e-15);
    // Of Michelso 1.4e-14 is what its decimals lost on becoming doubles.
    expect(Math.abs(s(moments) / deviation - 1)).toBeLessThan(2e-14);
  });

  it.each([
    ['NumAcc3', pairs(1000000.2, 1000000.1, 1000000.3), exact.sets.NumAcc3],
    ['NumAcc4', pairs(10000000.2, 10000000.1, 10000000.3), exact.sets.NumAcc4],
  ])('gives the exact standard deviation of the doubles that stand for %s', (_name, values, expected) => {
    const moments = merged(values);
    expect(Math.abs(moments.mean - expected.mean)).toBeLessThan(1.01 * ulp(expected.mean));
    expect(Math.abs(s(moments) / expected.standardDeviation - 1)).toBeLessThan(1e-14);
    // The certified 0.1 is off by what the decimals lost on becoming doubles, and by no more.
    expect(Math.abs(s(moments) - 0.1)).toBeLessThan(ulp(expected.mean));
  });

  it.each(exact.cases.filter(({ n }) => n <= 1000))(
    '$n values of $offset ± $spread/2: mean and standard deviation',
    ({ n, offset, spread, mean, meanRemainder, standardDeviation: deviation }) => {
      const moments = merged(generated(n, offset, spread));
      const error = moments.mean - mean + (moments.meanRemainder - meanRemainder);
      expect(Math.abs(error)).toBeLessThan(5e-17 * spread);
      expect(Math.abs(s(moments) / deviation - 1)).toBeLessThan(2e-15);
      expect(moments.n).toBe(n);
    },
  );
});

describe('many values', () => {
  it.each(exact.cases.filter(({ n }) => n > 1000))(
    '$n of $offset ± $spread/2, one by one',
    ({ n, offset, spread, mean, meanRemainder, standardDeviation: deviation }) => {
      const moments = momentsOf(generated(n, offset, spread));
      expect(Math.abs(moments.mean - mean + (moments.meanRemainder - meanRemainder))).toBeLessThan(5e-17 * spread);
      expect(Math.abs(s(moments) / deviation - 1)).toBeLessThan(3e-14);
    },
  );

  it('scales: 1e9 and 1e-9 times the values give that times the moments', () => {
    for (const scale of [2 ** 30, 2 ** -30]) {
      const plain = momentsOf(generated(100, 3, 1));
      const scaled = momentsOf(generated(100, 3, 1).map((value) => value * scale));
      expect(scaled.mean).toBe(plain.mean * scale);
      expect(scaled.sumOfSquares).toBe(plain.sumOfSquares * scale * scale);
    }
  });

  it('one stray of 1e9 among units near 1 leaves the others their digits', () => {
    const others = momentsOf(generated(1000, 1, 1e-3));
    const one = mergeMoments(momentsOf([1e9]), others);
    const other = mergeMoments(others, momentsOf([1e9]));
    expect(one).toEqual(other);
    expect(Math.abs(one.mean / ((1e9 + 1000 * others.mean) / 1001) - 1)).toBeLessThan(1e-15);
  });
});

describe('few values', () => {
  it('none', () => {
    expect(momentsOf([])).toEqual(NO_VALUES);
    expect(NO_VALUES.minimum).toBeNull();
    expect(mergeMoments(NO_VALUES, NO_VALUES)).toEqual(NO_VALUES);
    expect(standardDeviation(NO_VALUES)).toEqual({
      unavailable: 'a standard deviation needs two values, there are none',
    });
    expect(standardError(NO_VALUES)).toHaveProperty('unavailable');
  });

  it('one', () => {
    const one = addValue(NO_VALUES, 3);
    expect(one).toEqual({ n: 1, mean: 3, meanRemainder: 0, sumOfSquares: 0, minimum: 3, maximum: 3 });
    expect(standardDeviation(one)).toEqual({ unavailable: 'a standard deviation needs two values, there is one' });
  });

  it('two', () => {
    const two = momentsOf([3, 1]);
    expect(two).toMatchObject({ n: 2, mean: 2, minimum: 1, maximum: 3 });
    expect(standardDeviation(two)).toBe(Math.SQRT2);
    expect(standardError(two)).toBe(1);
  });

  it('a difference of means finer than the last place of either', () => {
    const low = momentsOf([1e15, 1e15 + 0.125]);
    const high = momentsOf([1e15 + 0.125, 1e15 + 0.125]);
    expect(meanDifference(low, high)).toBe(0.0625);
  });

  it('refuses what is no number, with its place', () => {
    expect(() => momentsOf([1, Number.NaN])).toThrow(new InvalidQuantity('/1', 'must be a finite number'));
    expect(() => addValue(NO_VALUES, Number.POSITIVE_INFINITY)).toThrow(InvalidQuantity);
  });
});
