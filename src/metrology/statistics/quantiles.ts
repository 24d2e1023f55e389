/**
 * Sample quantiles of values in memory, definition 7 of R. J. Hyndman and Y. Fan, The American Statistician 50 (1996) 361-365: the
 * p-quantile of n values is the linear interpolation at (n − 1)p between the order statistics counted from 0. It is the default of R,
 * numpy, Julia and of spreadsheets' PERCENTILE.INC; other programs' defaults differ by up to one order statistic.
 */
import { InvalidQuantity } from '../../physics/invalid-quantity.ts';
import type { Unavailable } from './unavailable.ts';

/**
 * The quantiles of `values` (any order) at `probabilities`, in their order.
 * Throws `InvalidQuantity` '/values/i' (not finite) or '/probabilities/i' (outside [0, 1]).
 */
export function quantilesOf(values: ArrayLike<number>, probabilities: readonly number[]): number[] | Unavailable {
  requireProbabilities(probabilities);
  const sorted = Float64Array.from(values);
  const odd = sorted.findIndex((value) => !Number.isFinite(value));
  if (odd >= 0) throw new InvalidQuantity(`/values/${odd}`, 'must be a finite number');
  if (sorted.length === 0) return { unavailable: 'there are no values' };
  sorted.sort();
  return probabilities.map((probability) => {
    const { rank, fraction } = rankOf(probability, sorted.length);
    const low = sorted[rank]!;
    return fraction === 0 ? low : low + fraction * (sorted[rank + 1]! - low);
  });
}

/** Where the quantile lies among n order statistics counted from 0: `fraction` of the way from `rank` to the next. */
export function rankOf(probability: number, n: number): { rank: number; fraction: number } {
  const position = (n - 1) * probability;
  const rank = Math.floor(position);
  return { rank, fraction: position - rank };
}

export function requireProbabilities(probabilities: readonly number[]): void {
  const odd = probabilities.findIndex((probability) => !(probability >= 0 && probability <= 1));
  if (odd >= 0) throw new InvalidQuantity(`/probabilities/${odd}`, 'must lie between 0 and 1');
}
