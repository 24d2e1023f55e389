import { conformity } from '../metrology/conformity.ts';
import type { Method } from '../physics/method.ts';
import type { Limit, Observation } from './observation.ts';
import { inWords, percent } from './wording.ts';

export type Outcome = 'pass' | 'fail' | 'inconclusive';

export interface Observed {
  readonly value: number;
  readonly unit: string;
  readonly standardUncertainty: number;
  /** the true value is at least this: the sweep ended before the quantity was reached */
  readonly atLeast?: boolean;
}

/** One observation, decided. */
export interface Judgement {
  readonly outcome: Outcome;
  readonly limit: Limit;
  readonly method: Method;
  /** A sentence that an engineer can read. */
  readonly detail: string;
  readonly observed?: Observed;
  /** Distance from the observed value to the nearest limit, in its unit; positive inside. */
  readonly margin?: number;
  readonly conformanceProbability?: number;
  readonly serial?: string;
}

const SEVERITY: Record<Outcome, number> = { pass: 0, inconclusive: 1, fail: 2 };

/**
 * Decides an observation in three zones (ISO 14253-1, JCGM 106): passes where the true value conforms with a probability of at
 * least 1 − risk, fails where with at most risk, and is inconclusive between.
 * `requestUncertainty` is what the uncertainty of the request's own numbers adds to the observation's.
 */
export function judge(observation: Observation, risk: number, requestUncertainty = 0): Judgement {
  const { what, unit, limit, method, value, serial } = observation;
  const common = { limit, method, ...(serial !== undefined && { serial }) };
  if (value === undefined) {
    const [outcome, because] = withoutValue(observation);
    return { ...common, outcome, detail: `${what}: ${because}; the limit is ${limitInWords(limit, unit)}.` };
  }
  const standardUncertainty = Math.hypot(observation.standardUncertainty ?? 0, requestUncertainty);
  const decided = conformity({ measured: value, standardUncertainty, ...limit, rule: { kind: 'three-zone', risk } });
  const doubt = doubtOf(observation, decided.outcome);
  const outcome = doubt === undefined ? decided.outcome : 'inconclusive';
  return {
    ...common,
    outcome,
    observed: { value, unit, standardUncertainty, ...(observation.atLeast && { atLeast: true }) },
    margin: decided.margin,
    conformanceProbability: decided.conformanceProbability,
    detail: sentence(observation, { ...decided, value, standardUncertainty, outcome, doubt, risk }),
  };
}

/** The outcome of an observation that has no value, and why. */
function withoutValue({ metBecause, missedBecause, undecided }: Observation): [Outcome, string] {
  if (metBecause !== undefined) return ['pass', metBecause];
  if (missedBecause !== undefined) return ['fail', missedBecause];
  return ['inconclusive', undecided ?? 'it could not be observed'];
}

/** Why the numbers alone must not decide, where something of the observation says so. */
function doubtOf(observation: Observation, outcome: Outcome): string | undefined {
  if (observation.undecided !== undefined) return observation.undecided;
  if (observation.atLeast && outcome !== 'pass') return 'the sweep ends before the quantity is reached';
  if (observation.passIsUndecided !== undefined && outcome === 'pass') return observation.passIsUndecided;
  return undefined;
}

interface Decided {
  readonly value: number;
  readonly standardUncertainty: number;
  readonly outcome: Outcome;
  readonly margin: number;
  readonly conformanceProbability: number;
  readonly doubt: string | undefined;
  readonly risk: number;
}

function sentence({ what, unit, limit, atLeast }: Observation, d: Decided): string {
  const observed = `${what} is ${atLeast ? 'at least ' : ''}${inWords(d.value, unit)}`;
  const uncertainty =
    d.standardUncertainty > 0 ? ` (standard uncertainty ${inWords(d.standardUncertainty, unit)})` : '';
  const against = `, ${d.margin >= 0 ? 'inside' : 'outside'} the limit ${limitInWords(limit, unit)} by ${inWords(Math.abs(d.margin), unit)}`;
  if (d.doubt !== undefined) return `${observed}${uncertainty}${against}, but ${d.doubt}.`;
  if (d.outcome === 'inconclusive') {
    return `${observed}${uncertainty}${against}: with a conformance probability of ${percent(d.conformanceProbability)} neither met nor missed at a risk of ${percent(d.risk)}.`;
  }
  return `${observed}${uncertainty}${against}.`;
}

function limitInWords({ lower, upper }: Limit, unit: string): string {
  if (lower !== undefined && upper !== undefined) return `of ${inWords(lower, unit)} to ${inWords(upper, unit)}`;
  if (lower !== undefined) return `of at least ${inWords(lower, unit)}`;
  return `of at most ${inWords(upper ?? 0, unit)}`;
}

/** Of several judgements, the most adverse: the worst outcome, and of those the one deepest in doubt. */
export function mostAdverse(judgements: readonly Judgement[]): Judgement {
  return judgements.reduce((worst, candidate) => {
    const bySeverity = SEVERITY[candidate.outcome] - SEVERITY[worst.outcome];
    if (bySeverity !== 0) return bySeverity > 0 ? candidate : worst;
    return adversity(candidate) > adversity(worst) ? candidate : worst;
  });
}

/** Larger is worse. In standard uncertainties, since the conformance probability saturates at 0 and 1. */
function adversity({ margin, observed }: Judgement): number {
  if (margin === undefined || observed === undefined) return Number.POSITIVE_INFINITY;
  return -margin / (observed.standardUncertainty || Number.MIN_VALUE);
}
