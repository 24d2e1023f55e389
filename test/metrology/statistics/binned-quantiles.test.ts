import { describe, expect, it } from 'vitest';
import { type BinnedQuantile, quantilesFromBins } from '../../../src/metrology/statistics/binned-quantiles.ts';
import { binning, binsOf, EMPTY_BINS } from '../../../src/metrology/statistics/bins.ts';
import { momentsOf, NO_VALUES } from '../../../src/metrology/statistics/moments.ts';
import { quantilesOf } from '../../../src/metrology/statistics/quantiles.ts';
import reference from '../../fixtures/numpy/quantiles.json' with { type: 'json' };
import { normalSample } from './normal-sample-generator.ts';

const DRAWING = binning({ lower: 0.9e-3, upper: 1.1e-3 });
const PROBABILITIES = [0, 0.0001, 0.001, 0.01, 0.05, 0.25, 1 / 3, 0.5, 0.75, 0.95, 0.99, 0.999, 1];

function binned(values: readonly number[], probabilities: readonly number[] = PROBABILITIES) {
  return quantilesFromBins(DRAWING, binsOf(DRAWING, values), momentsOf(values), probabilities);
}

describe('quantiles from bins', () => {
  it.each(reference.samples.slice(-3))('of $values.length units are those of the values', ({ values, quantiles }) => {
    const found = binned(values, reference.probabilities) as BinnedQuantile[];
    found.forEach(({ value, errorBound }, i) => {
      expect(Math.abs(value - quantiles[i]!)).toBeLessThanOrEqual(errorBound);
      expect(errorBound).toBeLessThan(3e-10 * DRAWING.scale);
    });
  });

  it.each([
    [1000, 1e-3, 3e-5],
    [10_000, 1.05e-3, 1e-8],
    [100_000, 1e-3, 1e-5],
    [100_000, 2e-2, 1e-5],
  ])('of %i units of %f ± %f lie within their bounds, and near', (n, mean, deviation) => {
    const values = normalSample(n, mean, deviation, 11);
    const exact = quantilesOf(values, PROBABILITIES) as number[];
    (binned(values) as BinnedQuantile[]).forEach(({ probability, value, errorBound }, i) => {
      expect(Math.abs(value - exact[i]!)).toBeLessThanOrEqual(errorBound);
      expect(errorBound).toBeLessThan(0.1 * deviation);
      // Well under the quantile's own standard error, which for the median is 1.25 σ/√n.
      if (probability >= 0.01 && probability <= 0.99) {
        expect(Math.abs(value - exact[i]!)).toBeLessThan((n > 10_000 ? 0.004 : 0.02) * deviation);
      }
    });
  });

  it('the least and the greatest are exact', () => {
    const values = normalSample(5000, 1e-3, 1e-5, 12);
    const [least, greatest] = binned(values, [0, 1]);
    expect(least).toEqual({ probability: 0, value: Math.min(...values), errorBound: 0 });
    expect(greatest).toEqual({ probability: 1, value: Math.max(...values), errorBound: 0 });
  });

  it('among values beyond all bins they say so', () => {
    const values = [1e-3, 1.01e-3, 9.9e37, 9.9e37, 9.9e37];
    const [median, first] = binned(values, [0.5, 0.25]);
    expect(median).toEqual({ probability: 0.5, unavailable: expect.stringContaining('too far') });
    expect(first).toMatchObject({ value: expect.closeTo(1.01e-3, 12) });
  });

  it('of no values say so, of one are it', () => {
    expect(quantilesFromBins(DRAWING, EMPTY_BINS, NO_VALUES, [0.5])).toEqual([
      { probability: 0.5, unavailable: 'there are no values' },
    ]);
    expect(binned([1.02e-3], [0, 0.3, 1])).toEqual(
      [0, 0.3, 1].map((probability) => ({ probability, value: 1.02e-3, errorBound: 0 })),
    );
  });

  it('refuse probabilities that are none', () => {
    expect(() => binned([1e-3], [-0.1])).toThrow(expect.objectContaining({ pointer: '/probabilities/0' }));
  });
});
