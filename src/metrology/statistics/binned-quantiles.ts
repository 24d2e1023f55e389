/** Quantiles from bins, each with a bound on what binning can have cost. */
import { type Binning, type Bins, binEdge, countOf } from './bins.ts';
import { rankOf, requireProbabilities } from './quantiles.ts';
import type { Unavailable } from './unavailable.ts';

export interface BinnedQuantile {
  readonly probability: number;
  readonly value: number;
  /** the quantile of the values themselves lies no further from `value` than this */
  readonly errorBound: number;
}

/** Smallest and largest of the values counted, as their moments hold them. */
export interface Extremes {
  readonly minimum: number | null;
  readonly maximum: number | null;
}

/**
 * Quantiles of the counted values by definition 7 of Hyndman and Fan (see quantiles.ts), the order statistics put at even distances
 * within their bins; `errorBound` follows from the bins' edges and the extremes and holds for any values.
 *
 * | units of a normal lot | bound, in standard deviations | worst error found, 1st to 99th percentile | standard error of the median |
 * |---|---|---|---|
 * | up to 256 | 2⁻³² of the tolerance | 2⁻³² of the tolerance | 0.08 or more |
 * | 1000 | 0.03 | 0.018 | 0.040 |
 * | 1e4 | 0.04 | 0.015 | 0.013 |
 * | 1e5 | 0.06 | 0.003 | 0.0040 |
 * | 1e6 | 0.06 | 0.002 | 0.0013 |
 *
 * Throws `InvalidQuantity` '/probabilities/i' (outside [0, 1]).
 */
export function quantilesFromBins(
  where: Binning,
  bins: Bins,
  extremes: Extremes,
  probabilities: readonly number[],
): (BinnedQuantile | ({ readonly probability: number } & Unavailable))[] {
  requireProbabilities(probabilities);
  const n = countOf(bins);
  return probabilities.map((probability) => {
    if (n === 0) return { probability, unavailable: 'there are no values' };
    const { rank, fraction } = rankOf(probability, n);
    const low = orderStatistic(where, bins, extremes, rank, n);
    const high = fraction === 0 ? low : orderStatistic(where, bins, extremes, rank + 1, n);
    if (low === null || high === null) {
      return { probability, unavailable: 'it lies among values too far from the limits to be told apart' };
    }
    return {
      probability,
      value: low.value + fraction * (high.value - low.value),
      errorBound: (1 - fraction) * low.errorBound + fraction * high.errorBound,
    };
  });
}

interface Located {
  readonly value: number;
  readonly errorBound: number;
}

/** The value of this rank, counted from 0; null among those below or above all bins, of which only the extremes are known. */
function orderStatistic(where: Binning, bins: Bins, extremes: Extremes, rank: number, n: number): Located | null {
  if (rank === 0 && extremes.minimum !== null) return { value: extremes.minimum, errorBound: 0 };
  if (rank === n - 1 && extremes.maximum !== null) return { value: extremes.maximum, errorBound: 0 };
  let before = bins.below;
  if (rank < before) return null;
  for (let i = 0; i < bins.indices.length; i++) {
    const count = bins.counts[i]!;
    if (rank < before + count) {
      const from = Math.max(binEdge(where, bins.halvings, bins.indices[i]!), extremes.minimum ?? -Infinity);
      const to = Math.min(binEdge(where, bins.halvings, bins.indices[i]! + 1), extremes.maximum ?? Infinity);
      // Rounding can put an extreme a unit in the last place outside its own bin.
      const width = Math.max(0, to - from);
      const place = (rank - before + 0.5) / count;
      const value = from + place * width;
      // A value's place was rounded three times on its way to a bin's number.
      const rounding = 4 * Number.EPSILON * (Math.abs(where.origin) + Math.abs(value - where.origin));
      return { value, errorBound: Math.max(place, 1 - place) * width + rounding };
    }
    before += count;
  }
  return null;
}
