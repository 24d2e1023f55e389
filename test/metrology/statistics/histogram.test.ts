import { describe, expect, it } from 'vitest';
import { binning, binsOf, EMPTY_BINS } from '../../../src/metrology/statistics/bins.ts';
import { type Histogram, histogramOf } from '../../../src/metrology/statistics/histogram.ts';
import { normalSample } from './normal-sample-generator.ts';

const DRAWING = binning({ lower: 0.9e-3, upper: 1.1e-3 });
const histogram = (values: readonly number[], range = {}) =>
  histogramOf(DRAWING, binsOf(DRAWING, values), range) as Histogram;

/** Counted straight from the values. */
function expectExact({ edges, counts, below, above }: Histogram, values: readonly number[]): void {
  counts.forEach((count, i) => {
    expect(count).toBe(values.filter((value) => value >= edges[i]! && value < edges[i + 1]!).length);
  });
  expect(below).toBe(values.filter((value) => value < edges[0]!).length);
  expect(above).toBe(values.filter((value) => value >= edges.at(-1)!).length);
  expect(edges).toHaveLength(counts.length + 1);
}

describe('histograms', () => {
  it.each([20, 100, 1000, 30_000])('of %i units count every one, in a fair number of bars', (n) => {
    const values = normalSample(n, 1e-3, 1.3e-5, 21);
    const found = histogram(values);
    expectExact(found, values);
    expect(found.counts.length).toBeGreaterThan(3);
    expect(found.counts.length).toBeLessThanOrEqual(60);
    // Freedman and Diaconis' width for a normal lot is 2.7 σ n^(−1/3); a power of two is at most √2 away.
    const width = found.edges[1]! - found.edges[0]!;
    const rule = 2.7 * 1.3e-5 * n ** (-1 / 3);
    if (found.counts.length < 30) expect(Math.abs(Math.log2(width / rule))).toBeLessThan(n < 100 ? 1 : 0.6);
  });

  it('reach as far as asked and put the limits on edges', () => {
    const values = normalSample(2000, 1e-3, 2e-6, 22);
    const { edges, counts } = histogram(values, { from: 0.9e-3, to: 1.1e-3, mostBars: 80 });
    expect(edges[0]).toBe(0.9e-3);
    expect(edges.some((edge) => Math.abs(edge / 1.1e-3 - 1) < 1e-15)).toBe(true);
    expect(counts.length).toBeLessThanOrEqual(80);
    expect(counts.reduce((sum, count) => sum + count)).toBe(2000);
  });

  it('leave strays out of the bars but count them', () => {
    const values = [...normalSample(500, 1e-3, 1e-5, 23), 0, 5e-3, 1, 9.9e37, -1e30];
    const found = histogram(values);
    expectExact(found, values);
    expect(found).toMatchObject({ below: 2, above: 3 });
    expect(found.counts.length).toBeGreaterThan(10);
  });

  it('of a coarse instrument, half the readings equal, show the others too', () => {
    const values = [
      ...Array<number>(60).fill(1e-3),
      ...Array<number>(20).fill(1.01e-3),
      ...Array<number>(20).fill(0.99e-3),
    ];
    const found = histogram(values);
    expectExact(found, values);
    expect(found).toMatchObject({ below: 0, above: 0 });
    expect(found.counts.filter((count) => count > 0)).toEqual([20, 60, 20]);
  });

  it('of one unit are one bar; of none there is none', () => {
    expect(histogram([1e-3]).counts).toEqual([1]);
    expect(histogramOf(DRAWING, EMPTY_BINS)).toHaveProperty('unavailable');
    expect(histogramOf(DRAWING, binsOf(DRAWING, [9.9e37]))).toHaveProperty('unavailable');
  });

  it.each([
    [{ from: Number.NaN }, '/from'],
    [{ to: Number.POSITIVE_INFINITY }, '/to'],
    [{ from: 2, to: 1 }, '/from'],
    [{ mostBars: 1 }, '/mostBars'],
    [{ mostBars: 2.5 }, '/mostBars'],
  ])('refuse %j', (range, pointer) => {
    expect(() => histogram([1e-3], range)).toThrow(expect.objectContaining({ pointer }));
  });
});
