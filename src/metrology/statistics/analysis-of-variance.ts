/**
 * One-way analysis of variance from groups' moments: do rigs (or days, or lots) differ in the mean by more than the spread within
 * them explains?
 *
 * All sums are of differences between means, remainders included, so that groups at 1e12 apart by 0.1 keep their digits.
 *
 * | quantity | range tried | worst relative error | against |
 * |---|---|---|---|
 * | F, Welch's F, sums of squares, both standard deviations | 1e-3 ± 1e-5 to 1e12 ± 0.1 | 1e-15 | exact fractions |
 * | F and the standard deviation within | stiff sets as NIST's SmLs01 to 09, about 1, 1e6 and 1e12 | 1e-14 | certified values |
 * | pValue | usual designs, p down to 1e-45 | 4e-14 | mpmath, 40 digits |
 * | pValue | degrees of freedom 1 to 500 between and 1 to 1e6 within, p down to 1e-290 | 6e-10, 2e-8 at F = 1e6 | mpmath, 30 digits |
 */
import cdf from '@stdlib/stats-base-dists-f-cdf';
import { type Moments, meanDifference } from './moments.ts';
import { requireLevel } from './normal-sample.ts';
import type { Unavailable } from './unavailable.ts';

export interface VarianceTest {
  /** variance ratio */
  readonly F: number;
  readonly degreesOfFreedom: { readonly between: number; readonly within: number };
  /** probability of an F at least this large were the groups' true means equal */
  readonly pValue: number;
  /** whether pValue is below the significance level */
  readonly differ: boolean;
}

export interface VarianceAnalysis extends VarianceTest {
  readonly sumOfSquares: { readonly between: number; readonly within: number };
  /** pooled, √(mean square within) */
  readonly withinStandardDeviation: number;
  /** standard deviation of the groups' true means, by the mean squares' expectations; 0 where those would make its square negative */
  readonly betweenStandardDeviation: number;
  /** without supposing that the groups spread alike */
  readonly welch: VarianceTest | Unavailable;
}

/**
 * Fisher's analysis of variance (NIST/SEMATECH e-Handbook 7.4.3) for k ≥ 2 groups of any sizes, at least one of more than one value;
 * groups without values are left out. It supposes normal values with one standard deviation in all groups; `welch` does not. Of a
 * million units ever smaller differences are significant: whether they matter is for betweenStandardDeviation to say.
 * The component between groups is (MS between − MS within)/n₀, n₀ = (N − Σnᵢ²/N)/(k − 1) (S. R. Searle, G. Casella, C. E. McCulloch,
 * Variance Components, 1992, 3.6, from memory).
 * Throws `InvalidQuantity` '/significance' (not between 0 and 1).
 */
export function analyseVariance(groups: readonly Moments[], significance = 0.05): VarianceAnalysis | Unavailable {
  requireLevel('/significance', significance);
  const filled = groups.filter(({ n }) => n > 0);
  if (filled.length < 2)
    return { unavailable: `groups are compared from two on, there ${filled.length === 1 ? 'is one' : 'are none'}` };
  const N = total(filled, ({ n }) => n);
  const [between, within] = [filled.length - 1, N - filled.length];
  if (within === 0) return { unavailable: 'no group has two values to tell the spread within it' };
  const squaresWithin = total(filled, ({ sumOfSquares }) => sumOfSquares);
  if (squaresWithin === 0) return { unavailable: 'the values within each group are equal: they tell no spread' };
  const squaresBetween = weightedSquares(
    filled,
    filled.map(({ n }) => n),
  ).sum;
  const meanSquareWithin = squaresWithin / within;
  const meanSquareBetween = squaresBetween / between;
  const effectiveSize = (N - total(filled, ({ n }) => n * (n / N))) / between;
  return {
    ...test(meanSquareBetween / meanSquareWithin, between, within, significance),
    sumOfSquares: { between: squaresBetween, within: squaresWithin },
    withinStandardDeviation: Math.sqrt(meanSquareWithin),
    betweenStandardDeviation: Math.sqrt(Math.max(0, (meanSquareBetween - meanSquareWithin) / effectiveSize)),
    welch: welch(filled, significance),
  };
}

/** B. L. Welch, Biometrika 38 (1951) 330-336. */
function welch(groups: readonly Moments[], significance: number): VarianceTest | Unavailable {
  if (groups.some(({ n, sumOfSquares }) => n < 2 || sumOfSquares === 0)) {
    return { unavailable: 'needs a spread within each group' };
  }
  const k = groups.length;
  const weights = groups.map(({ n, sumOfSquares }) => (n * (n - 1)) / sumOfSquares);
  const { sum, sumOfWeights } = weightedSquares(groups, weights);
  const imbalance = total(groups, ({ n }, i) => (1 - weights[i]! / sumOfWeights) ** 2 / (n - 1));
  const F = sum / (k - 1) / (1 + (2 * (k - 2) * imbalance) / (k * k - 1));
  return test(F, k - 1, (k * k - 1) / (3 * imbalance), significance);
}

function test(F: number, between: number, within: number, significance: number): VarianceTest {
  // The upper tail as the lower one of 1/F, which keeps its digits where 1 − P would not.
  const pValue = F === 0 ? 1 : cdf(1 / F, within, between);
  return { F, degreesOfFreedom: { between, within }, pValue, differ: pValue < significance };
}

/** Σ wᵢ (meanᵢ − their weighted mean)², from differences to the first mean. */
function weightedSquares(
  groups: readonly Moments[],
  weights: readonly number[],
): { sum: number; sumOfWeights: number } {
  const differences = groups.map((group) => meanDifference(groups[0]!, group));
  const sumOfWeights = total(weights, (weight) => weight);
  const centre = total(weights, (weight, i) => weight * differences[i]!) / sumOfWeights;
  return { sum: total(weights, (weight, i) => weight * (differences[i]! - centre) ** 2), sumOfWeights };
}

function total<T>(items: readonly T[], of: (item: T, index: number) => number): number {
  return items.reduce((sum, item, index) => sum + of(item, index), 0);
}
