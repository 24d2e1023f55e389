import { describe, expect, it } from 'vitest';
import { momentsOf } from '../../../src/metrology/statistics/moments.ts';
import { meanInterval, standardDeviationInterval } from '../../../src/metrology/statistics/normal-intervals.ts';
import { sampleOf } from '../../../src/metrology/statistics/normal-sample.ts';
import reference from '../../fixtures/mpmath/noncentral-t.json' with { type: 'json' };

describe('confidence intervals', () => {
  // NIST/SEMATECH e-Handbook 1.3.5.2, heat flow meter calibration; *from memory*.
  it('for the mean: n = 195, mean 9.261460, s = 0.022789: 9.258242 to 9.264679', () => {
    const { lower, upper } = meanInterval({ n: 195, mean: 9.26146, standardDeviation: 0.022789 });
    // Their last digit rests on more digits of s than are printed.
    expect(lower).toBeCloseTo(9.258242, 5);
    expect(upper).toBeCloseTo(9.264679, 5);
  });

  it.each(reference.chiQuantiles.filter(([, p]) => p === 0.025) as number[][])(
    'for the standard deviation, %i degrees of freedom',
    (nu, _p, low, high) => {
      const { lower, upper } = standardDeviationInterval({ n: nu! + 1, mean: 0, standardDeviation: 2 });
      expect(Math.abs((lower * high!) / 2 - 1)).toBeLessThan(1e-13);
      expect(Math.abs((upper * low!) / 2 - 1)).toBeLessThan(1e-13);
    },
  );

  it('refuse samples and levels that are none', () => {
    const sample = { n: 5, mean: 0, standardDeviation: 1 };
    expect(() => meanInterval({ ...sample, n: 1 })).toThrow(expect.objectContaining({ pointer: '/n' }));
    expect(() => meanInterval(sample, 1)).toThrow(expect.objectContaining({ pointer: '/confidence' }));
    expect(() => standardDeviationInterval({ ...sample, standardDeviation: 0 })).toThrow(
      expect.objectContaining({ pointer: '/standardDeviation' }),
    );
  });
});

describe('the sample that moments are of', () => {
  it('has what they tell', () => {
    expect(sampleOf(momentsOf([1, 3]))).toEqual({ n: 2, mean: 2, standardDeviation: Math.SQRT2 });
  });

  it.each([
    [[], 'a standard deviation needs two values, there are none'],
    [[1], 'a standard deviation needs two values, there is one'],
    [[2, 2, 2], 'all 3 values are equal: they tell no spread'],
  ])('%j: %s', (values, unavailable) => expect(sampleOf(momentsOf(values))).toEqual({ unavailable }));
});
