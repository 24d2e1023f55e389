/**
 * Whether a measured value conforms to its limits, measurement uncertainty taken into account.
 *
 * JCGM 106:2012 (clauses 7 and 8), ISO 14253-1:2017, ILAC-G8:09/2019. The true value, given the measured one, is normal
 * with the measured value as its mean and the standard uncertainty as its standard deviation (JCGM 106 7.2, little
 * prior knowledge).
 */
import { InvalidQuantity } from '../physics/invalid-quantity.ts';
import { acceptanceGuardBand, rejectionGuardBand } from './guard-band.ts';
import { probabilityBetween, upperTail } from './normal.ts';

export type RuleKind = 'simple-acceptance' | 'guarded-acceptance' | 'guarded-rejection' | 'three-zone';

/**
 * Decision rule. With P the conformance probability:
 * - `simple-acceptance` passes inside the limits, whatever the uncertainty (JCGM 106 8.2.1);
 * - `guarded-acceptance` passes where P ≥ 1 − risk and else fails (8.3.2: the buyer's side);
 * - `guarded-rejection` fails where P ≤ risk and else passes (8.3.3: the supplier's side);
 * - `three-zone` passes where P ≥ 1 − risk, fails where P ≤ risk, and is inconclusive between (ISO 14253-1).
 *
 * `risk` is the largest accepted probability of a wrong decision, from 1e-300 to 0.5. At 0.5 nothing is inconclusive:
 * P ≥ 0.5 passes (P = 0.5 itself passes, except under guarded-rejection), and with one limit all rules agree with
 * simple acceptance off the limit.
 */
export interface Rule {
  readonly kind: RuleKind;
  readonly risk?: number | undefined;
}

/** Tolerance limits, both belonging to the conforming values; at least one is given. */
export interface Limits {
  readonly lower?: number | undefined;
  readonly upper?: number | undefined;
}

export interface ConformityRequest extends Limits {
  readonly measured: number;
  /** Standard uncertainty in the unit of the measured value; 0 for a value known exactly. */
  readonly standardUncertainty: number;
  /** Default: three-zone with a risk of 0.05. */
  readonly rule?: Rule | undefined;
}

/** The measured values that pass, ends included; a null bound is none. */
export interface AcceptanceInterval {
  readonly lower: number | null;
  readonly upper: number | null;
}

export interface Conformity {
  readonly outcome: 'pass' | 'fail' | 'inconclusive';
  /** Probability that the true value lies within the limits. */
  readonly conformanceProbability: number;
  /** Its complement, computed apart so that 1e-20 is not lost beside 1. */
  readonly nonconformanceProbability: number;
  /** Which measured values would pass; null where none does. */
  readonly acceptance: AcceptanceInterval | null;
  /** Distance from the measured value to the nearest limit, positive inside; capped at the largest double. */
  readonly margin: number;
  /** `margin` in standard uncertainties; null where the uncertainty is 0; capped at the largest double. */
  readonly normalisedMargin: number | null;
}

const DEFAULT_RISK = 0.05;

/** Below this the normal tail leaves the range of doubles. */
const SMALLEST_RISK = 1e-300;

/**
 * Decides on a measured value. Values on a limit conform.
 * Throws `InvalidQuantity`: '/measured', '/standardUncertainty' (negative), '/lower' (none given, or above upper),
 * '/upper', '/rule/risk' (outside [1e-300, 0.5]).
 *
 * | quantity | range tried | worst relative error | against |
 * |---|---|---|---|
 * | conformance and nonconformance probability | down to 1e-300, limits 1e-300 to 1e3 u apart | 3e-13 | mpmath, 60 digits |
 * | acceptance limits' distance from the tolerance limits | risk 1e-300 to 0.5, limits 1e-3 to 1e3 u apart | 1e-14 of max(distance, u) | mpmath, 60 digits |
 */
export function conformity(request: ConformityRequest): Conformity {
  const { measured, standardUncertainty } = request;
  const { kind, risk = DEFAULT_RISK }: Rule = request.rule ?? { kind: 'three-zone' };
  requireUsable(request, risk);
  const u = standardUncertainty;
  const lower = request.lower ?? Number.NEGATIVE_INFINITY;
  const upper = request.upper ?? Number.POSITIVE_INFINITY;
  const judge = (value: number) => {
    const probabilities = conformanceProbabilities(value, u, lower, upper);
    return { ...probabilities, outcome: outcomeOf(kind, risk, probabilities, lower <= value && value <= upper) };
  };
  const { outcome, conforming, nonconforming } = judge(measured);
  const margin = Math.min(measured - lower, upper - measured);
  return {
    outcome,
    conformanceProbability: conforming,
    nonconformanceProbability: nonconforming,
    acceptance: acceptanceInterval(kind, risk, u, lower, upper, (value) => judge(value).outcome === 'pass'),
    margin: capped(margin),
    normalisedMargin:
      u === 0 ? null : capped(Math.min(scaledDifference(lower, measured, u), scaledDifference(measured, upper, u))),
  };
}

function requireUsable({ measured, standardUncertainty, lower, upper }: ConformityRequest, risk: number): void {
  if (!Number.isFinite(measured)) throw new InvalidQuantity('/measured', 'must be a finite number');
  if (!(standardUncertainty >= 0 && standardUncertainty < Number.POSITIVE_INFINITY)) {
    throw new InvalidQuantity('/standardUncertainty', 'must be a finite number, zero or positive');
  }
  if (lower === undefined && upper === undefined) {
    throw new InvalidQuantity(
      '/lower',
      'at least one of lower and upper is needed: without a limit nothing can conform',
    );
  }
  if (lower !== undefined && !Number.isFinite(lower)) throw new InvalidQuantity('/lower', 'must be a finite number');
  if (upper !== undefined && !Number.isFinite(upper)) throw new InvalidQuantity('/upper', 'must be a finite number');
  if (lower !== undefined && upper !== undefined && lower > upper) {
    throw new InvalidQuantity('/lower', `must not exceed upper (${lower} > ${upper})`);
  }
  if (!(risk >= SMALLEST_RISK && risk <= 0.5)) {
    throw new InvalidQuantity('/rule/risk', `must lie between ${SMALLEST_RISK} and 0.5`);
  }
}

interface Probabilities {
  readonly conforming: number;
  readonly nonconforming: number;
}

function conformanceProbabilities(value: number, u: number, lower: number, upper: number): Probabilities {
  if (u === 0) {
    return lower <= value && value <= upper ? { conforming: 1, nonconforming: 0 } : { conforming: 0, nonconforming: 1 };
  }
  const aboveLower = scaledDifference(lower, value, u);
  const belowUpper = scaledDifference(value, upper, u);
  // Each side's tail is a positive number without cancellation, so their sum is too.
  const nonconforming = Math.min(1, upperTail(aboveLower) + upperTail(belowUpper));
  const conforming =
    nonconforming <= 0.5
      ? 1 - nonconforming
      : probabilityBetween(-aboveLower, belowUpper, scaledDifference(lower, upper, u));
  return { conforming, nonconforming };
}

/** Comparisons with 1 − risk are made on the complement: 1 − 1e-20 is not a double. */
function outcomeOf(kind: RuleKind, risk: number, p: Probabilities, inside: boolean): Conformity['outcome'] {
  switch (kind) {
    case 'simple-acceptance':
      return inside ? 'pass' : 'fail';
    case 'guarded-acceptance':
      return p.nonconforming <= risk ? 'pass' : 'fail';
    case 'guarded-rejection':
      return p.conforming <= risk ? 'fail' : 'pass';
    case 'three-zone':
      if (p.nonconforming <= risk) return 'pass';
      return p.conforming <= risk ? 'fail' : 'inconclusive';
  }
}

function acceptanceInterval(
  kind: RuleKind,
  risk: number,
  u: number,
  lower: number,
  upper: number,
  passes: (value: number) => boolean,
): AcceptanceInterval | null {
  const band =
    u === 0 || kind === 'simple-acceptance' ? 0 : inwardGuardBand(kind, risk, scaledDifference(lower, upper, u));
  if (band === null) return null;
  const from = lower === Number.NEGATIVE_INFINITY ? null : outermostPassing(lower, band, u, 1, passes);
  const to = upper === Number.POSITIVE_INFINITY ? null : outermostPassing(upper, band, u, -1, passes);
  // No double may lie between two real bounds, or the bounds beyond every double.
  if (from === undefined || to === undefined || (from !== null && to !== null && from > to)) return null;
  return { lower: from, upper: to };
}

function inwardGuardBand(kind: RuleKind, risk: number, width: number): number | null {
  if (kind !== 'guarded-rejection') return acceptanceGuardBand(risk, width);
  const outward = rejectionGuardBand(risk, width);
  return outward === null ? null : -outward;
}

/**
 * `limit` moved inward by `band` standard uncertainties, then by units in the last place until the decision itself
 * passes it, so that an acceptance limit sent back as a measured value is accepted. Undefined where no double does.
 */
function outermostPassing(
  limit: number,
  band: number,
  u: number,
  inward: 1 | -1,
  passes: (value: number) => boolean,
): number | undefined {
  const shift = inward * band * u;
  // |band| stays under 40, so a 64th of each term is finite where the shift alone overflows and the sum may not.
  const bound = Number.isFinite(shift) ? limit + shift : 64 * (limit / 64 + inward * band * (u / 64));
  if (bound === inward * Number.POSITIVE_INFINITY) return undefined;
  const start = capped(bound);
  if (passes(start)) return start;
  // What the position and, through u, the probability can resolve.
  const unit = (Number.EPSILON / 2) * Math.max(Math.abs(limit), Math.abs(start), u);
  for (let units = 1; units <= 1024; units *= 2) {
    const moved = start + inward * Math.max(units * unit, Number.MIN_VALUE);
    if (passes(moved)) return moved;
  }
  return undefined;
}

/** (to − from)/u for u > 0, also where the difference of finite values overflows. */
function scaledDifference(from: number, to: number, u: number): number {
  const difference = to - from;
  const overflows = !Number.isFinite(difference) && Number.isFinite(from) && Number.isFinite(to);
  return overflows ? to / u - from / u : difference / u;
}

function capped(value: number): number {
  return Math.max(-Number.MAX_VALUE, Math.min(Number.MAX_VALUE, value));
}
