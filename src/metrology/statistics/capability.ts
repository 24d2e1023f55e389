/**
 * Capability indices of a lot against its drawing, with confidence intervals.
 *
 * Convention: s is the standard deviation of all units measured, divisor n − 1, not one within subgroups; of what is so computed AIAG
 * and ISO 22514-2 would say performance, Pp and Ppk. The units are taken as independent values of one normal distribution.
 *
 * | quantity | range tried | worst relative error | against |
 * |---|---|---|---|
 * | Cp interval, of Cp | n from 2 to 1e6 | 6e-16 | mpmath, 40 digits |
 * | Cpk interval, one limit | n from 2 to 200, Cpk from −0.5 to 4 | 3e-14 | scipy, the other order of integration |
 * | Cpk interval, two limits, least favourable mean | the same | 4e-14 | the same |
 * | Cpk interval, two limits, mean up to 4 σ off | the same | no end inside the one that covers exactly | the same |
 */
import { InvalidQuantity } from '../../physics/invalid-quantity.ts';
import { findRoot } from '../../physics/numerics/roots.ts';
import type { Limits } from '../conformity.ts';
import type { Interval } from '../coverage-interval.ts';
import { upperTailQuantile } from '../normal.ts';
import { FAR, noncentralityLimit, normalOverChi } from './noncentral-t.ts';
import { type NonconformingFraction, nonconformingFraction } from './nonconforming.ts';
import { type NormalSample, requireLevel, requireSample, requireSize } from './normal-sample.ts';
import { lowerQuantile, upperQuantile, upperTail } from './scaled-chi.ts';
import type { Unavailable } from './unavailable.ts';

export interface CapabilityIndex {
  readonly value: number;
  /** two-sided, at the confidence asked for */
  readonly interval: Interval;
  /** how the interval was found */
  readonly method: string;
}

export interface Capability {
  /** (upper − lower)/6s */
  readonly cp: CapabilityIndex | Unavailable;
  /** distance from the mean to the nearer limit over 3s; negative where the mean is outside */
  readonly cpk: CapabilityIndex;
  readonly nonconforming: NonconformingFraction;
  readonly confidence: number;
}

/**
 * Capability of the population that `sample` is from. Cp's interval is exact (chi-squared); Cpk's is exact with one limit (noncentral
 * t), and with two it covers at least as often as it says, wherever the population lies between them.
 * Throws `InvalidQuantity`: '/n', '/mean', '/standardDeviation' (see `requireSample`; or so small that an index overflows), '/lower' (no limit, not finite, not below upper),
 * '/upper', '/confidence' (not between 0 and 1).
 */
export function capability(sample: NormalSample, limits: Limits, confidence = 0.95): Capability {
  requireSample(sample);
  requireLimits(limits);
  requireLevel('/confidence', confidence);
  return {
    cp: cpOf(sample, limits, confidence),
    cpk: cpkOf(sample, limits, confidence),
    nonconforming: nonconformingFraction(sample, limits, confidence),
    confidence,
  };
}

/**
 * The approximate interval for Cpk that other programs print, Ĉpk ± z√(1/(9n) + Ĉpk²/(2(n − 1))): A. F. Bissell, Applied Statistics 39
 * (1990) 331-340. For comparison with them only.
 * Throws `InvalidQuantity` '/n', '/confidence'.
 */
export function bissellInterval(cpk: number, n: number, confidence = 0.95): Interval {
  requireSize(n);
  requireLevel('/confidence', confidence);
  const reach = upperTailQuantile((1 - confidence) / 2) * Math.sqrt(1 / (9 * n) + (cpk * cpk) / (2 * (n - 1)));
  return { lower: cpk - reach, upper: cpk + reach };
}

function requireLimits({ lower, upper }: Limits): void {
  if (lower === undefined && upper === undefined) {
    throw new InvalidQuantity('/lower', 'at least one of lower and upper is needed');
  }
  if (lower !== undefined && !Number.isFinite(lower)) throw new InvalidQuantity('/lower', 'must be a finite number');
  if (upper !== undefined && !Number.isFinite(upper)) throw new InvalidQuantity('/upper', 'must be a finite number');
  if (lower !== undefined && upper !== undefined && !(lower < upper)) {
    throw new InvalidQuantity('/lower', `must be below upper (${lower}, ${upper})`);
  }
}

function cpOf(
  { n, standardDeviation: s }: NormalSample,
  limits: Limits,
  confidence: number,
): CapabilityIndex | Unavailable {
  const { lower, upper } = limits;
  if (lower === undefined || upper === undefined) return { unavailable: 'Cp needs a lower and an upper limit' };
  const value = (upper - lower) / (6 * s);
  const tail = (1 - confidence) / 2;
  return {
    value,
    // Cp·s/σ is the true index, and s/σ lies between its quantiles.
    interval: { lower: value * lowerQuantile(n - 1, tail), upper: value * upperQuantile(n - 1, tail) },
    method: 'exact, chi-squared distribution of the variance',
  };
}

function cpkOf({ n, mean, standardDeviation: s }: NormalSample, limits: Limits, confidence: number): CapabilityIndex {
  const { lower, upper } = limits;
  const value = Math.min(
    lower === undefined ? Number.POSITIVE_INFINITY : (mean - lower) / (3 * s),
    upper === undefined ? Number.POSITIVE_INFINITY : (upper - mean) / (3 * s),
  );
  const tail = (1 - confidence) / 2;
  if (!Number.isFinite(value)) {
    throw new InvalidQuantity('/standardDeviation', 'is too small beside the distance to the limits');
  }
  const least = -indexLimit(-value, n, tail);
  if (lower === undefined || upper === undefined) {
    return {
      value,
      interval: { lower: least, upper: indexLimit(value, n, tail) },
      method: 'exact, noncentral t distribution',
    };
  }
  return {
    value,
    interval: { lower: least, upper: centredIndexLimit(value, n, tail) },
    method: 'noncentral t distribution, guaranteed: the least favourable position of the mean for each end',
  };
}

/** The index whose estimate from one limit falls to `estimate` or below with probability `tail`: 3√n times it has a noncentral t. */
function indexLimit(estimate: number, n: number, tail: number): number {
  const scale = 3 * Math.sqrt(n);
  return noncentralityLimit(scale * estimate, n - 1, tail) / scale;
}

/**
 * The same from two limits. With the mean a·σ off their middle and the index k held, the estimate is, in units of 3s/σ, 3k plus the
 * lesser of −Z/√n and 2a + Z/√n, which can only grow with a. So it falls to `estimate` or below most often at the least a: 0, or −3k
 * where k < 0, as the limits then can't be nearer to each other than touching. (At a = ∞ one limit is left, which gives the lower
 * end: S. Kushler, P. Hurley, Journal of Quality Technology 24 (1992) 188-195, *from memory*.)
 */
function centredIndexLimit(estimate: number, n: number, tail: number): number {
  const scale = 3 * Math.sqrt(n);
  const excess = (k: number) => {
    const apart = (2 / 3) * Math.max(0, -3 * k);
    // Beyond this s/σ the estimate is small enough wherever the sample's mean has fallen.
    const certain = estimate > 0 ? Math.max(0, k + apart / 2) / estimate : Number.POSITIVE_INFINITY;
    const within = (index: number) => normalOverChi(n - 1, scale * estimate, scale * index, 0, certain);
    const beyond = certain === Number.POSITIVE_INFINITY ? 0 : upperTail(n - 1, certain);
    const onOneSide = within(k);
    const onTheOther = apart === 0 ? onOneSide : within(k + apart);
    return Math.log(tail / (beyond + onOneSide + onTheOther));
  };
  // Two ways to be small have at most twice the probability of one.
  const low = indexLimit(estimate, n, tail);
  // So far inside or outside, where the sample's mean has fallen no longer matters, nor does the other limit.
  if (Math.abs(scale * estimate) > FAR) return low;
  const high = indexLimit(estimate, n, tail / 2);
  return excess(low) >= 0 ? low : excess(high) <= 0 ? high : findRoot(excess, low, high, 1e-13);
}
