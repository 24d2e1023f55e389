/** The fraction of a normal population outside its limits. */
import type { Limits } from '../conformity.ts';
import type { Interval } from '../coverage-interval.ts';
import { upperTail } from '../normal.ts';
import { noncentralityLimit } from './noncentral-t.ts';
import type { NormalSample } from './normal-sample.ts';

export interface NonconformingFraction {
  /** estimate, `below` + `above` */
  readonly fraction: number;
  /** below the lower limit; 0 without one */
  readonly below: number;
  readonly above: number;
  readonly interval: Interval;
  readonly method: string;
}

/**
 * Estimate by the normal distribution with the sample's own mean and standard deviation (slightly biased for small n), right down to
 * 1e-300. Interval: with one limit exact, from the noncentral t distribution of √n(limit − x̄)/s (W. Q. Meeker, G. J. Hahn, L. A.
 * Escobar, Statistical Intervals, 2nd ed., 2017, sec. 4.5, from memory); with two the sums of each side's limits at half the
 * error probability (Bonferroni), which cover at least as often as they say.
 * `limits` and `sample` are supposed to be checked.
 */
export function nonconformingFraction(
  { n, mean, standardDeviation: s }: NormalSample,
  { lower, upper }: Limits,
  confidence: number,
): NonconformingFraction {
  // Distances from the mean outwards to each limit, in standard deviations.
  const sides = [lower === undefined ? null : (mean - lower) / s, upper === undefined ? null : (upper - mean) / s];
  const [below, above] = sides.map((distance) => (distance === null ? 0 : upperTail(distance)));
  const given = sides.filter((distance) => distance !== null);
  const tail = (1 - confidence) / 2 / given.length;
  const root = Math.sqrt(n);
  const least = given.map((distance) => upperTail(noncentralityLimit(root * distance, n - 1, tail) / root));
  const most = given.map((distance) => upperTail(-noncentralityLimit(-root * distance, n - 1, tail) / root));
  const sum = (parts: readonly number[]) => parts.reduce((total, part) => total + part, 0);
  return {
    fraction: Math.min(1, below! + above!),
    below: below!,
    above: above!,
    interval: { lower: Math.min(1, sum(least)), upper: Math.min(1, sum(most)) },
    method:
      given.length === 1
        ? 'normal; interval exact, noncentral t distribution'
        : 'normal; interval from the noncentral t distribution at each limit, Bonferroni',
  };
}
