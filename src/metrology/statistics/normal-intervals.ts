/** Confidence intervals for the mean and the standard deviation of a normal population; exact, equal tails (ISO 2602, ISO 2854). */
import quantile from '@stdlib/stats-base-dists-t-quantile';
import type { Interval } from '../coverage-interval.ts';
import { type NormalSample, requireLevel, requireSample } from './normal-sample.ts';
import { lowerQuantile, upperQuantile } from './scaled-chi.ts';

/**
 * x̄ ± t·s/√n with Student's t of n − 1 degrees of freedom.
 * Throws `InvalidQuantity` as `requireSample`, and '/confidence' (not between 0 and 1).
 */
export function meanInterval(sample: NormalSample, confidence = 0.95): Interval {
  requireSample(sample);
  requireLevel('/confidence', confidence);
  const { n, mean, standardDeviation: s } = sample;
  const reach = (-quantile((1 - confidence) / 2, n - 1) * s) / Math.sqrt(n);
  return { lower: mean - reach, upper: mean + reach };
}

/** s·√((n − 1)/χ²) at the two tails of chi-squared with n − 1 degrees of freedom. Throws as `meanInterval`. */
export function standardDeviationInterval(sample: NormalSample, confidence = 0.95): Interval {
  requireSample(sample);
  requireLevel('/confidence', confidence);
  const { n, standardDeviation: s } = sample;
  const tail = (1 - confidence) / 2;
  return { lower: s / upperQuantile(n - 1, tail), upper: s / lowerQuantile(n - 1, tail) };
}
