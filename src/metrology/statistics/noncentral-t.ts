/**
 * The noncentral t distribution, that of (Z + δ)/(s/σ) with a standard normal Z and ν degrees of freedom in s: what one-sided
 * tolerance factors, Cpk and the fraction outside a limit rest on.
 *
 * P(T ≤ t) = ∫₀^∞ f(s) Φ(ts − δ) ds with f the density of s/σ (Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2,
 * 2nd ed., 1995, 31.4, from memory). f and Φ are log-concave and positive, so the integral is taken from its peak outwards, whatever
 * the size of ν and δ; the series in incomplete beta functions (R. V. Lenth, AS 243, 1989) underflows beyond δ ≈ 37.
 *
 * | function | domain | worst relative error | against |
 * |---|---|---|---|
 * | lowerTail, upperTail | ν from 1 to 1e6, δ from −100 to 15,000, probabilities from 1e-290 to 1 | 2e-13 | mpmath, 32 digits |
 * | upperTailPoint, noncentralityLimit | the same, tails from 1e-12 to 0.99 | 8e-14 of \|t\| + √(1 + δ²/2ν) | mpmath, 32 digits |
 *
 * A tail's error is on top of what t and δ as doubles leave of their difference, 4e-16 δ/√(1 + δ²/2ν) times the tail's quantile.
 */
import { findRoot } from '../../physics/numerics/roots.ts';
import { upperTail as normalUpperTail, upperTailQuantile } from '../normal.ts';
import { integrateLogConcave } from './log-concave.ts';
import { chiMode, logDensity, lowerQuantile, upperQuantile } from './scaled-chi.ts';

const LOG_ROOT_TWO_PI = Math.log(2 * Math.PI) / 2;

/** P(T ≤ t), for ν ≥ 1 degrees of freedom and noncentrality δ. */
export function lowerTail(t: number, nu: number, delta: number): number {
  return Math.min(1, normalOverChi(nu, t, delta, 0, Number.POSITIVE_INFINITY));
}

/** P(T > t). */
export function upperTail(t: number, nu: number, delta: number): number {
  return lowerTail(-t, nu, -delta);
}

/** The t with P(T ≤ t) = 1 − p, 0 < p < 1; `p` is the upper tail, so that it can be small. */
export function upperTailPoint(p: number, nu: number, delta: number): number {
  // Whichever tail is the smaller is compared, on a logarithmic scale.
  const excess =
    p <= 0.5 ? (t: number) => ratio(p, upperTail(t, nu, delta)) : (t: number) => ratio(lowerTail(t, nu, delta), 1 - p);
  const spread = Math.sqrt(1 + (delta * delta) / (2 * nu));
  return increasingRoot(excess, delta, spread);
}

/**
 * The δ with P(T ≤ t; δ) = p, 0 < p < 1: the upper confidence limit at 1 − p for the noncentrality of an observed t. The lower limit
 * is that of −t, with its sign changed.
 */
export function noncentralityLimit(t: number, nu: number, p: number): number {
  if (Math.abs(t) > FAR) return t * (t > 0 ? pointAbove(nu, p) : pointAbove(nu, 1 - p));
  const excess =
    p <= 0.5
      ? (delta: number) => ratio(p, lowerTail(t, nu, delta))
      : (delta: number) => ratio(upperTail(t, nu, delta), 1 - p);
  const spread = Math.sqrt(1 + (t * t) / (2 * nu));
  const z = p <= 0.5 ? upperTailQuantile(p) : -upperTailQuantile(1 - p);
  return increasingRoot(excess, t + z * spread, spread);
}

/** From this t on the spread of Z is below 1e-15 of δ even with 1e6 degrees of freedom: T is δ/(s/σ). */
export const FAR = 1e9;

/** The x with P(s/σ > x) = p. */
function pointAbove(nu: number, p: number): number {
  return p <= 0.5 ? upperQuantile(nu, p) : lowerQuantile(nu, 1 - p);
}

/** ∫ f(s) Φ(ts − δ) ds from `from` to `to`. */
export function normalOverChi(nu: number, t: number, delta: number, from: number, to: number): number {
  const chi = logDensity(nu);
  const logarithm = (s: number) => chi(s) + logUpperTail(delta - t * s);
  // f'/f + t φ/Φ falls from s = 0 on.
  const slope = (s: number) => (nu - 1) / s - nu * s + t * hazard(delta - t * s);
  // Φ rises from 0 to 1 between these, which is a narrow step in f where δ is large and ν small.
  const step = t === 0 ? [] : [(delta - 9) / t, delta / t, (delta + 9) / t];
  // δ − ts is rounded, and Φ in its tail feels that some ten times over.
  const noise = 10 * Number.EPSILON * Math.abs(delta);
  return integrateLogConcave(logarithm, modeOf(slope, chiMode(nu), from, to), from, to, step, noise);
}

/** The place in [from, to] where the falling `slope` changes sign, or the end nearest to it. */
function modeOf(slope: (s: number) => number, start: number, from: number, to: number): number {
  let high = Math.max(start, 0.5, from);
  while (high < to && slope(high) > 0) high *= 2;
  if (high >= to) {
    if (slope(to) >= 0) return to;
    high = to;
  }
  let low = high;
  while (slope(low) < 0) {
    if (low === from || low < INDISTINCT) return from;
    low = Math.max(from, low / 2);
  }
  return low === high ? low : findRoot(slope, low, high, 1e-10);
}

/** A slope that still falls here says that the peak is at 0: that of f with one degree of freedom can be. */
const INDISTINCT = 1e-30;

/** Root of the increasing `f`, looked for from `start` on in growing steps. */
function increasingRoot(f: (x: number) => number, start: number, firstStep: number): number {
  const direction = f(start) > 0 ? -1 : 1;
  let step = firstStep;
  let near = start;
  let far = start + direction * step;
  while (f(far) * direction < 0) {
    near = far;
    step *= 2;
    far += direction * step;
  }
  return direction > 0 ? findRoot(f, near, far) : findRoot(f, far, near);
}

/** ln(a/b), finite where either has underflowed. */
function ratio(a: number, b: number): number {
  return Math.log(Math.max(a, Number.MIN_VALUE)) - Math.log(Math.max(b, Number.MIN_VALUE));
}

/** ln P(Z > x), at any x. */
function logUpperTail(x: number): number {
  return x < 10 ? Math.log(normalUpperTail(x)) : -(x * x) / 2 - LOG_ROOT_TWO_PI - Math.log(hazard(x));
}

/** φ(x)/P(Z > x), at any x. */
function hazard(x: number): number {
  if (x < 10) return Math.exp(-(x * x) / 2 - LOG_ROOT_TWO_PI) / normalUpperTail(x);
  // Laplace's continued fraction, DLMF 7.9.3: 20 terms are exact to rounding from x = 10 on.
  let rest = x;
  for (let k = 20; k >= 1; k--) rest = x + k / rest;
  return rest;
}
