/**
 * Statistical tolerance intervals of a normal population: x̄ ± k·s holds at least a given part of it, with a given confidence
 * (ISO 16269-6:2014, mean and standard deviation both unknown). Exact factors, for two sides as for one.
 *
 * | function | domain | worst relative error | against |
 * |---|---|---|---|
 * | oneSidedFactor | n from 2 to 1e6, content 0.5 to 0.9999, confidence 0.5 to 0.999999 | 1e-15 | mpmath, 32 digits |
 * | twoSidedFactor | the same | 7e-14 at n = 2, else 4e-15 | mpmath, 32 digits, the other order of integration |
 */
import { integrate } from '../../physics/numerics/quadrature.ts';
import { findRoot } from '../../physics/numerics/roots.ts';
import { probabilityBetween, upperTail, upperTailQuantile } from '../normal.ts';
import { upperTailPoint } from './noncentral-t.ts';
import { type NormalSample, requireLevel, requireSample, requireSize } from './normal-sample.ts';
import { lowerTail as chiLowerTail, upperTail as chiUpperTail, lowerQuantile } from './scaled-chi.ts';

export interface ToleranceRequest {
  /** part of the population that lies within the interval, between 0 and 1 */
  readonly content: number;
  /** probability that an interval so made holds that part */
  readonly confidence: number;
  /** `two-sided` holds the part between two ends, `lower` above one, `upper` below one */
  readonly sides: 'two-sided' | 'lower' | 'upper';
}

export interface ToleranceInterval {
  /** null: open on this side */
  readonly lower: number | null;
  readonly upper: number | null;
  /** standard deviations from the mean to its ends */
  readonly factor: number;
}

/** Throws `InvalidQuantity`: '/n', '/mean', '/standardDeviation' (see `requireSample`), '/content', '/confidence' (not between 0 and 1). */
export function toleranceInterval(sample: NormalSample, request: ToleranceRequest): ToleranceInterval {
  requireSample(sample);
  const { n, mean, standardDeviation: s } = sample;
  const { content, confidence, sides } = request;
  const factor =
    sides === 'two-sided' ? twoSidedFactor(n, content, confidence) : oneSidedFactor(n, content, confidence);
  return {
    lower: sides === 'upper' ? null : mean - factor * s,
    upper: sides === 'lower' ? null : mean + factor * s,
    factor,
  };
}

/**
 * k1: P(at least `content` lies below x̄ + k1·s) = `confidence`. √n·k1 is a quantile of the noncentral t distribution with n − 1 degrees
 * of freedom and noncentrality z√n. Handbooks also print Natrella's approximation, which at n = 6 can be 20 % above.
 * Throws `InvalidQuantity` '/n', '/content', '/confidence'.
 */
export function oneSidedFactor(n: number, content: number, confidence: number): number {
  requireFactor(n, content, confidence);
  const z = content >= 0.5 ? upperTailQuantile(1 - content) : -upperTailQuantile(content);
  const root = Math.sqrt(n);
  return upperTailPoint(1 - confidence, n - 1, z * root) / root;
}

/**
 * k2: P(at least `content` lies within x̄ ± k2·s) = `confidence`. With r(m) the half-width that holds the content about a mean m off,
 * that is ∫ φ(z) P(s/σ ≥ r(z/√n)/k2) dz = confidence (A. Wald, J. Wolfowitz, Annals of Mathematical Statistics 17 (1946) 208-215;
 * R. E. Odeh, D. B. Owen, Tables for Normal Tolerance Limits, 1980), which is solved as it stands; Howe's approximation starts it.
 * Throws `InvalidQuantity` '/n', '/content', '/confidence'.
 */
export function twoSidedFactor(n: number, content: number, confidence: number): number {
  requireFactor(n, content, confidence);
  const nu = n - 1;
  const risk = 1 - confidence;
  const halfWidth = cached((z) => halfWidthHolding(content, z / Math.sqrt(n)));
  // Whichever of the two probabilities is the smaller is compared.
  const excess =
    risk <= 0.5
      ? (k: number) => Math.log(risk / meanOverPositions((z) => chiLowerTail(nu, halfWidth(z) / k)))
      : (k: number) => Math.log(meanOverPositions((z) => chiUpperTail(nu, halfWidth(z) / k)) / confidence);
  const howe = (halfWidth(0) * Math.sqrt(1 + 1 / n)) / (risk <= 0.5 ? lowerQuantile(nu, risk) : 1);
  let [low, high] = [howe * 0.99, howe * 1.01];
  for (let factor = 0.98; excess(low) > 0; factor *= factor) low *= factor;
  for (let factor = 1.02; excess(high) < 0; factor *= factor) high *= factor;
  return findRoot(excess, low, high, 1e-14);
}

function requireFactor(n: number, content: number, confidence: number): void {
  requireSize(n);
  requireLevel('/content', content);
  requireLevel('/confidence', confidence);
}

/** The r with Φ(m + r) − Φ(m − r) = content, for m ≥ 0. */
function halfWidthHolding(content: number, m: number): number {
  const centred = upperTailQuantile((1 - content) / 2);
  if (m === 0) return centred;
  const excess =
    content > 0.5
      ? (r: number) => Math.log((1 - content) / (upperTail(r - m) + upperTail(r + m)))
      : (r: number) => Math.log(probabilityBetween(m - r, m + r, 2 * r) / content);
  // About m = 0 the content takes the least width, and the interval from −centred on holds it already.
  const high = centred + m;
  return excess(centred) >= 0 ? centred : excess(high) <= 0 ? high : findRoot(excess, centred, high);
}

/** ∫ φ(z) f(|z|) dz of a smooth f between 0 and 1, whose terms beyond 9 are under 1e-18. */
function meanOverPositions(f: (z: number) => number): number {
  let sum = 0;
  for (let panel = 0; panel < 4; panel++) {
    sum += integrate((z) => Math.exp((-z * z) / 2) * f(z), 2.25 * panel, 2.25 * (panel + 1), 16);
  }
  return sum * Math.sqrt(2 / Math.PI);
}

function cached(f: (x: number) => number): (x: number) => number {
  const known = new Map<number, number>();
  return (x) => {
    const value = known.get(x) ?? f(x);
    known.set(x, value);
    return value;
  };
}
