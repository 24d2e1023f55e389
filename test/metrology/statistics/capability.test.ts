import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { bissellInterval, type CapabilityIndex, capability } from '../../../src/metrology/statistics/capability.ts';
import reference from '../../fixtures/scipy/capability.json' with { type: 'json' };

const indexOf = (found: unknown) => found as CapabilityIndex;
const relative = (found: number, expected: number) => Math.abs(found / expected - 1);

describe('published examples', () => {
  it('NIST/SEMATECH e-Handbook 6.1.6: Cp = 1.0 and Cpk = 0.6667', () => {
    const { cp, cpk } = capability({ n: 50, mean: 16, standardDeviation: 2 }, { lower: 8, upper: 20 });
    expect(indexOf(cp).value).toBeCloseTo(1, 12);
    expect(cpk.value).toBeCloseTo(0.6667, 4);
  });

  it('D. C. Montgomery, Introduction to Statistical Quality Control: Cp 2.29, 95 % from 1.57 to 3.01', () => {
    const { cp } = capability({ n: 20, mean: 50, standardDeviation: 1.75 }, { lower: 38, upper: 62 });
    const { value, interval } = indexOf(cp);
    expect(value).toBeCloseTo(2.29, 2);
    expect(Math.abs(interval.lower - 1.57)).toBeLessThan(0.01);
    expect(Math.abs(interval.upper - 3.01)).toBeLessThan(0.01);
    // Its chi-squared points 8.907 and 32.852 to more digits.
    expect(interval.lower).toBeCloseTo(1.564945, 6);
  });

  it.each([
    [1, 0.0027, 5e-6, 0.002699796],
    [4 / 3, 64e-6, 1e-6, 6.334248e-5],
    [2, 2e-9, 5e-11, 1.973175e-9],
  ])('NIST/SEMATECH e-Handbook 6.1.6, reject table: Cp = %f', (cp, printed, tolerance, exact) => {
    const sample = { n: 100, mean: 10, standardDeviation: 0.5 };
    const { nonconforming } = capability(sample, { lower: 10 - 1.5 * cp, upper: 10 + 1.5 * cp });
    expect(Math.abs(nonconforming.fraction - printed)).toBeLessThan(tolerance);
    expect(relative(nonconforming.fraction, exact)).toBeLessThan(5e-7);
    expect(nonconforming.below).toBeCloseTo(nonconforming.above, 15);
  });
});

describe('the interval for Cpk', () => {
  const oneLimit = reference.rows.filter(([, , off]) => off === null) as number[][];
  const twoLimits = reference.rows.filter(([n, , off]) => off !== null && n !== 3) as number[][];

  it('has cases', () => {
    expect(oneLimit.length).toBeGreaterThan(15);
    expect(twoLimits.length).toBeGreaterThan(40);
  });

  it.each(oneLimit)('with one limit is exact: n = %i, Cpk = %f', (n, cpk, _off, low, high) => {
    // The estimate that the truth falls short of, or exceeds, once in forty times is the one whose interval ends at the truth.
    for (const side of n === 20 ? [{ upper: 10 }, { lower: -10 }] : [{ upper: 10 }]) {
      const at = (estimate: number) => {
        const distance = 3 * estimate;
        const mean = 'upper' in side ? 10 - distance : -10 + distance;
        return capability({ n: n!, mean, standardDeviation: 1 }, side).cpk.interval;
      };
      expect(Math.abs(at(low!).upper - cpk!)).toBeLessThan(1e-12 * Math.max(1, Math.abs(cpk!)));
      expect(Math.abs(at(high!).lower - cpk!)).toBeLessThan(1e-12 * Math.max(1, Math.abs(cpk!)));
    }
  });

  it.each(twoLimits)('with two covers as promised: n = %i, Cpk = %f, mean %f σ off', (n, cpk, off, low, high) => {
    const at = (estimate: number) => {
      const sample = { n: n!, mean: 3 * estimate, standardDeviation: 1 };
      // The far limit plays no part but in that it is there.
      return capability(sample, { lower: 0, upper: 1000 + 12 * Math.abs(estimate) }).cpk.interval;
    };
    const tolerance = 1e-12 * Math.max(1, Math.abs(cpk!));
    expect(at(low!).upper).toBeGreaterThan(cpk! - tolerance);
    expect(at(high!).lower).toBeLessThan(cpk! + tolerance);
    // Exact where the mean is least favourable: in the middle, or as near to it as an index below 0 lets it be.
    if (off === Math.max(0, -3 * cpk!)) expect(Math.abs(at(low!).upper - cpk!)).toBeLessThan(tolerance);
  });

  it('comes near Bissell’s for many units', () => {
    const { cpk } = capability({ n: 5000, mean: 4, standardDeviation: 1 }, { lower: 0, upper: 12 });
    const { lower, upper } = bissellInterval(cpk.value, 5000);
    expect(Math.abs(cpk.interval.lower - lower)).toBeLessThan(2e-3 * cpk.value);
    expect(Math.abs(cpk.interval.upper - upper)).toBeLessThan(5e-3 * cpk.value);
  });

  it('Bissell’s formula, by hand', () => {
    const reach = 1.959963984540054 * Math.sqrt(1 / 180 + 1.5 ** 2 / 38);
    expect(bissellInterval(1.5, 20)).toEqual({
      lower: expect.closeTo(1.5 - reach, 12),
      upper: expect.closeTo(1.5 + reach, 12),
    });
  });
});

describe('the fraction nonconforming', () => {
  it.each(reference.rows.filter(([, , off]) => off === null) as number[][])(
    'with one limit has the exact interval: n = %i, Cpk = %f',
    (n, _cpk, _off, low, high, fraction) => {
      const at = (estimate: number) =>
        capability({ n: n!, mean: 10 - 3 * estimate, standardDeviation: 1 }, { upper: 10 }).nonconforming.interval;
      expect(relative(at(low!).lower, fraction!)).toBeLessThan(1e-10);
      expect(relative(at(high!).upper, fraction!)).toBeLessThan(1e-10);
    },
  );

  it('keeps its digits far out: 30 and 37 standard deviations', () => {
    const far = capability({ n: 1000, mean: 0, standardDeviation: 1 }, { lower: -30, upper: 37 }).nonconforming;
    // erfc(x/√2)/2 by mpmath.
    expect(relative(far.below, 4.906713927148187e-198)).toBeLessThan(2e-13);
    expect(relative(far.above, 5.725571222524577e-300)).toBeLessThan(2e-13);
    expect(far.fraction).toBe(far.below);
    expect(far.interval.lower).toBeLessThan(far.fraction);
    expect(far.interval.upper).toBeGreaterThan(far.fraction);
  });

  it('is near 1 where the mean is outside', () => {
    const outside = capability({ n: 50, mean: 25, standardDeviation: 1 }, { lower: 0, upper: 20 }).nonconforming;
    expect(outside.fraction).toBeCloseTo(1 - 2.866515718791939e-7, 12);
    expect(outside.interval.upper).toBeLessThanOrEqual(1);
  });
});

describe('properties', () => {
  const cases = fc.record({
    n: fc.integer({ min: 2, max: 5000 }),
    cpk: fc.double({ min: -0.8, max: 5, noNaN: true }),
    confidence: fc.constantFrom(0.8, 0.95, 0.999),
  });

  it('intervals hold their estimates and widen with confidence', () => {
    fc.assert(
      fc.property(cases, ({ n, cpk, confidence }) => {
        const sample = { n, mean: 3 * cpk, standardDeviation: 1 };
        const limits = { lower: 0, upper: 40 };
        const found = capability(sample, limits, confidence);
        const wider = capability(sample, limits, 1 - (1 - confidence) / 2);
        for (const [narrow, wide] of [
          [indexOf(found.cp).interval, indexOf(wider.cp).interval],
          [found.cpk.interval, wider.cpk.interval],
          [found.nonconforming.interval, wider.nonconforming.interval],
        ] as const) {
          expect(wide.lower).toBeLessThanOrEqual(narrow.lower);
          expect(wide.upper).toBeGreaterThanOrEqual(narrow.upper);
        }
        const { value, interval } = found.cpk;
        expect(value).toBeGreaterThanOrEqual(interval.lower);
        expect(value).toBeLessThanOrEqual(interval.upper);
      }),
      { seed: 8, numRuns: 6 },
    );
  });

  it('scale and mirror with the unit', () => {
    const plain = capability({ n: 30, mean: 4, standardDeviation: 1 }, { lower: 0, upper: 12 });
    for (const scale of [2 ** 30, 2 ** -30]) {
      const sample = { n: 30, mean: 4 * scale, standardDeviation: scale };
      expect(capability(sample, { lower: 0, upper: 12 * scale })).toEqual(plain);
    }
    const mirrored = capability({ n: 30, mean: -4, standardDeviation: 1 }, { lower: -12, upper: 0 });
    expect(mirrored.cpk).toEqual(plain.cpk);
    expect(mirrored.nonconforming.interval.upper).toBeCloseTo(plain.nonconforming.interval.upper, 15);
  });
});

describe('units almost alike', () => {
  it.each([2, 3, 50, 10_000])('up to 1e200 deviations inside the limits: the interval keeps its shape, n = %i', (n) => {
    const shape = (distance: number) => {
      const limits = { lower: -distance, upper: distance };
      const { cpk, cp, nonconforming } = capability({ n, mean: 0, standardDeviation: 1 }, limits);
      expect(nonconforming.fraction).toBe(0);
      expect(indexOf(cp).value).toBeCloseTo(distance / 3, -Math.log10(distance) + 10);
      return [cpk.interval.lower / cpk.value, cpk.interval.upper / cpk.value];
    };
    const [lower, upper] = shape(1e8 / Math.sqrt(n));
    for (const distance of [9e8, 1.1e9, 1e12, 1e100, 1e200]) {
      const [low, high] = shape(distance / Math.sqrt(n));
      expect(relative(low!, lower!)).toBeLessThan(1e-11);
      // Of the other limit 1/distance is left.
      expect(relative(high!, upper!)).toBeLessThan(1e-7);
    }
  });

  it.each([2, 100, 1_000_000])('and units anywhere, n = %i: intervals are finite and hold their estimates', (n) => {
    for (const mean of [-1e12, -1, 1e-300, 10, 1e5, 9e8]) {
      for (const limits of [{ lower: 0 }, { lower: 0, upper: 1e-9 + 2 * Math.abs(mean) }]) {
        const { cpk, nonconforming } = capability({ n, mean, standardDeviation: 1 }, limits, 0.9);
        for (const [value, { lower, upper }] of [
          [cpk.value, cpk.interval],
          [nonconforming.fraction, nonconforming.interval],
        ] as const) {
          expect(lower).toBeLessThanOrEqual(value);
          expect(upper).toBeGreaterThanOrEqual(value);
          expect(Number.isFinite(upper - lower)).toBe(true);
        }
      }
    }
  });

  it('so alike that the index overflows are refused', () => {
    expect(() => capability({ n: 9, mean: 0, standardDeviation: 1e-300 }, { upper: 1e10 })).toThrow(
      expect.objectContaining({ pointer: '/standardDeviation' }),
    );
  });
});

describe('what cannot be', () => {
  const sample = { n: 10, mean: 1, standardDeviation: 0.1 };

  it('Cp with one limit says why', () => {
    expect(capability(sample, { upper: 2 }).cp).toEqual({ unavailable: 'Cp needs a lower and an upper limit' });
  });

  it.each([
    [{ ...sample, n: 1 }, { upper: 2 }, 0.95, '/n'],
    [{ ...sample, n: 2.5 }, { upper: 2 }, 0.95, '/n'],
    [{ ...sample, mean: Number.NaN }, { upper: 2 }, 0.95, '/mean'],
    [{ ...sample, standardDeviation: 0 }, { upper: 2 }, 0.95, '/standardDeviation'],
    [sample, {}, 0.95, '/lower'],
    [sample, { lower: 2, upper: 2 }, 0.95, '/lower'],
    [sample, { upper: Number.POSITIVE_INFINITY }, 0.95, '/upper'],
    [sample, { upper: 2 }, 1, '/confidence'],
    [sample, { upper: 2 }, 0, '/confidence'],
  ])('%j, %j, %f is refused at %s', (bad, limits, confidence, pointer) => {
    expect(() => capability(bad, limits, confidence)).toThrow(
      expect.objectContaining({ name: 'InvalidQuantity', pointer }),
    );
  });
});
