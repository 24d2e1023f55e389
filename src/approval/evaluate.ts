import { propagateOverRecord } from '../metrology/propagation.ts';
import type { Caution } from './cautions.ts';
import type { Check, Observation } from './check.ts';
import { CHECKS } from './checks/index.ts';
import { type CheckResult, judge, mostAdverse } from './judge.ts';
import { LIMITS } from './limits.ts';
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
 * Decides on a part, for a duty, with its evidence: observes every quantity that has a limit, judges each, and draws the verdict.
 * Throws `InvalidQuantity`, pointing into the request, where its numbers contradict each other or leave a model.
 */
export function evaluate(request: ApprovalRequest): Evaluation {
  const risk = request.duty.risk ?? DEFAULT_RISK;
  const observed = CHECKS.map((check) => ({ check, observations: check.observe(request) })).filter(
    ({ observations }) => observations.length > 0,
  );
  const added = requestUncertainties(request, observed);
  const results = observed.map(({ check, observations }) => checkResult(check, observations, risk, added));
  const checks = [...results, ...untestedLimits(request, results)];
  return { ...verdictOf(request, checks), checks, cautions: cautionsFor(request) };
}

interface ObservedCheck {
  readonly check: Check;
  readonly observations: readonly Observation[];
}

function checkResult(
  { name }: Check,
  observations: readonly Observation[],
  risk: number,
  added: ReadonlyMap<string, number>,
): CheckResult {
  const judgements = observations.map((observation, index) => judge(observation, risk, added.get(`${name}/${index}`) ?? 0));
  const { serial, ...worst } = mostAdverse(judgements);
  if (serial === undefined) return { check: name, ...worst };
  const failing = judgements.filter(({ outcome }) => outcome !== 'pass').length;
  const count = `${judgements.length - failing} of ${judgements.length} measured ${judgements.length === 1 ? 'unit passes' : 'units pass'}`;
  return { check: name, ...worst, detail: `${count}; the most adverse: ${worst.detail}`, units: judgements };
}

/**
 * What the uncertainty of the request's own numbers adds to each observation, by check and index: that of the distance to the
 * nearest limit, since limit and quantity may hang on the same number (a saturation flux density, say).
 */
function requestUncertainties(request: ApprovalRequest, observed: readonly ObservedCheck[]): ReadonlyMap<string, number> {
  const { uncertainty } = request;
  if (!uncertainty || Object.keys(uncertainty).length === 0) return new Map();
  const distances = (candidate: ApprovalRequest) =>
    Object.fromEntries(
      observed.flatMap(({ check, observations }) => {
        const again = check.observe(candidate);
        return observations.flatMap((reference, index) => {
          const now = again[index];
          if (reference.value === undefined || now?.value === undefined) return [];
          return [[`${check.name}/${index}`, distanceToLimit(now, nearestSide(reference))]];
        });
      }),
    );
  const outputs = propagateOverRecord(request, uncertainty, distances);
  return new Map(Object.entries(outputs).map(([name, { standardUncertainty }]) => [name, standardUncertainty]));
}

type Side = 'lower' | 'upper';

function nearestSide({ value = 0, limit: { lower, upper } }: Observation): Side {
  if (lower === undefined) return 'upper';
  if (upper === undefined) return 'lower';
  return value - lower <= upper - value ? 'lower' : 'upper';
}

const distanceToLimit = ({ value = 0, limit }: Observation, side: Side): number => value - (limit[side] ?? 0);

/** An inconclusive check for each limit that is given and that nothing in the request could be compared with. */
function untestedLimits(request: ApprovalRequest, results: readonly CheckResult[]): CheckResult[] {
  const ran = new Set(results.map(({ check }) => check));
  return LIMITS.filter(({ given, checks }) => given(request) && !checks.some((name) => ran.has(name))).map(
    ({ pointer, checks: [check] }) => ({
      check,
      outcome: 'inconclusive',
      limit: {},
      method: { name: 'none', references: [], relativeError: 1, validity: 'nothing to compute from' },
      detail: `The limit at ${pointer} is given, but the request holds neither a construction nor evidence that it could be tested on.`,
    }),
  );
}
