import { type Judgement, judge, mostAdverse } from '../evidence/judge.ts';
import type { Observation } from '../evidence/observation.ts';
import { propagateOverRecord } from '../metrology/propagation.ts';
import { exclusiveMinimum } from '../physics/calculations/index.ts';
import type { Caution } from './cautions.ts';
import type { Check } from './check.ts';
import type { CheckResult } from './check-result.ts';
import { CHECKS } from './checks/index.ts';
import { LIMITS } from './limits.ts';
import { reliefOf } from './relief.ts';
import type { ApprovalRequest } from './request.ts';
import { cautionsFor } from './request-cautions.ts';
import { type Verdict, verdictOf } from './verdict.ts';

/** What a request comes to. */
export interface Evaluation {
  readonly verdict: Verdict;
  /** Why, in sentences. */
  readonly reasons: readonly string[];
  readonly checks: readonly CheckResult[];
  readonly cautions: readonly Caution[];
}

const DEFAULT_RISK = 0.05;

/**
 * Decides on a part, for a duty, with its evidence: observes every quantity that has a limit, judges each, says for each that
 * does not pass what would make it pass, and draws the verdict.
 * Throws `InvalidQuantity`, pointing into the request, where its numbers contradict each other or leave a model.
 */
export function evaluate(request: ApprovalRequest): Evaluation {
  const results = CHECKS.flatMap((check) => checkResult(check, request));
  const checks = [...results, ...untestedLimits(request, results)];
  return { ...verdictOf(request, checks), checks, cautions: cautionsFor(request, checks) };
}

function checkResult(check: Check, request: ApprovalRequest): CheckResult[] {
  const judgements = judgementsOf(check, request);
  if (judgements.length === 0) return [];
  const { serial, ...worst } = mostAdverse(judgements);
  const passes = (changed: ApprovalRequest) => judgementsOf(check, changed).every(({ outcome }) => outcome === 'pass');
  const result: CheckResult = {
    check: check.name,
    ...worst,
    ...(worst.outcome !== 'pass' && { relief: reliefOf(check.levers, request, passes) }),
  };
  if (serial === undefined) return [result];
  const passing = judgements.filter(({ outcome }) => outcome === 'pass').length;
  const count = `${passing} of ${judgements.length} ${check.counted ?? 'measured units'} ${passing === 1 ? 'passes' : 'pass'}`;
  return [{ ...result, detail: `${count}; the most adverse: ${worst.detail}`, units: judgements }];
}

/** Every observation of a check, decided with all its uncertainty: model or instrument, and the request's own. */
function judgementsOf(check: Check, request: ApprovalRequest): Judgement[] {
  const risk = request.duty.risk ?? DEFAULT_RISK;
  const observations = check.observe(request);
  const added = requestUncertainties(check, request, observations);
  return observations.map((observation, index) => judge(observation, risk, added[String(index)]?.standardUncertainty));
}

/**
 * What the uncertainty of the request's own numbers adds to each observation of a check, by index: that of the distance to the
 * nearest limit, since limit and quantity may hang on the same number (a saturation flux density, say).
 */
function requestUncertainties(check: Check, request: ApprovalRequest, observations: readonly Observation[]) {
  const { uncertainty } = request;
  const sides = observations.map(nearestSide);
  if (!uncertainty || sides.every((side) => side === undefined)) return {};
  return propagateOverRecord(
    request,
    uncertainty,
    (candidate) => {
      const again = check.observe(candidate);
      return Object.fromEntries(
        sides.flatMap((side, index) => {
          const { value, limit } = again[index] ?? {};
          return side === undefined || value === undefined ? [] : [[String(index), value - (limit?.[side] ?? 0)]];
        }),
      );
    },
    exclusiveMinimum,
  );
}

function nearestSide({ value, limit: { lower, upper } }: Observation): 'lower' | 'upper' | undefined {
  if (value === undefined) return undefined;
  if (lower === undefined) return 'upper';
  if (upper === undefined) return 'lower';
  return value - lower <= upper - value ? 'lower' : 'upper';
}

/** An inconclusive check for each limit that is given and that nothing in the request could be compared with. */
function untestedLimits(request: ApprovalRequest, results: readonly CheckResult[]): CheckResult[] {
  const ran = new Set(results.map(({ check }) => check));
  return LIMITS.filter(({ given, checks }) => given(request) && !checks.some((name) => ran.has(name))).map(
    ({ pointer, checks: [check] }) => ({
      check,
      outcome: 'inconclusive',
      limit: {},
      method: { name: 'none', references: [], relativeError: 1, validity: 'nothing to compute from' },
      detail: `The limit at ${pointer} is given, but the request holds nothing that it could be tested on.`,
      relief: [],
    }),
  );
}
