import { describe, expect, it } from 'vitest';
import { quantilesOf } from '../../../src/metrology/statistics/quantiles.ts';
import { InvalidQuantity } from '../../../src/physics/invalid-quantity.ts';
import reference from '../../fixtures/numpy/quantiles.json' with { type: 'json' };

describe('quantiles of values in memory', () => {
  it.each(reference.samples)('agree with numpy, $values.length values', ({ values, quantiles }) => {
    const found = quantilesOf(values, reference.probabilities) as number[];
    expect(found).toHaveLength(quantiles.length);
    found.forEach((value, i) => {
      expect(Math.abs(value / quantiles[i]! - 1)).toBeLessThan(1e-15);
    });
  });

  it('leave the values as they were', () => {
    const values = [3, 1, 2];
    quantilesOf(values, [0.5]);
    expect(values).toEqual([3, 1, 2]);
  });

  it('of no values say so', () => {
    expect(quantilesOf([], [0.5])).toEqual({ unavailable: 'there are no values' });
  });

  it('refuse values and probabilities that are none', () => {
    expect(() => quantilesOf([1, Number.NaN], [0.5])).toThrow(
      new InvalidQuantity('/values/1', 'must be a finite number'),
    );
    expect(() => quantilesOf([1], [0.5, 1.1])).toThrow(
      new InvalidQuantity('/probabilities/1', 'must lie between 0 and 1'),
    );
  });
});
