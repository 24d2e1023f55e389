/**
 * Guard bands solved exactly for one limit or two (JCGM 106:2012 8.3), in standard uncertainties.
 *
 * The published factors (1.645 for 95 %, 0.83 U of ISO 14253-1) are those of a single limit. Between two limits both
 * tails count, so the band is the root of P(x) = Φ((upper − x)/u) − Φ((lower − x)/u) at the probability asked for.
 * `width` below is (upper − lower)/u, Infinity with a single limit.
 */
import { findRoot } from '../physics/numerics/roots.ts';
import { probabilityBetween, upperTail, upperTailQuantile } from './normal.ts';

/** Beyond so many standard uncertainties a tail is less than the smallest risk, 1e-300. */
const FAR = 40;

/**
 * How far inside each limit a measured value must lie so that the probability of nonconformance is at most `risk`;
 * null where even the middle has more.
 */
export function acceptanceGuardBand(risk: number, width: number): number | null {
  if (2 * upperTail(width / 2) > risk) return null;
  const oneSided = upperTailQuantile(risk);
  const excess = (band: number) => (upperTail(band) + upperTail(width - band)) / risk - 1;
  if (!(excess(oneSided) > 0)) return oneSided;
  return findRoot(excess, oneSided, Math.min(width / 2, FAR));
}

/**
 * How far outside each limit (inside, where negative) a measured value may lie before its probability of conformance
 * falls to `risk`; null where even the middle has no more.
 */
export function rejectionGuardBand(risk: number, width: number): number | null {
  if (probabilityBetween(-width / 2, width / 2, width) <= risk) return null;
  const oneSided = upperTailQuantile(risk);
  const excess = (band: number) => probabilityBetween(band, band + width, width) / risk - 1;
  if (!(excess(oneSided) < 0)) return oneSided;
  return findRoot(excess, Math.max(-width / 2, -FAR), oneSided);
}
