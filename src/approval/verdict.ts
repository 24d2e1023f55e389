import { measuredIn } from '../evidence/lot-summary.ts';
import type { CheckResult } from './check-result.ts';
import type { ApprovalRequest } from './request.ts';

export type Verdict = 'approve' | 'reject' | 'refer';

/**
 * Any check that fails rejects. Otherwise any that is inconclusive, no check at all, or fewer measured units than the duty asks
 * for refers the part to an engineer. Otherwise it is approved.
 */
export function verdictOf(
  request: ApprovalRequest,
  checks: readonly CheckResult[],
): { readonly verdict: Verdict; readonly reasons: readonly string[] } {
  const named = (outcome: CheckResult['outcome']) =>
    checks.filter((result) => result.outcome === outcome).map(({ check }) => check);
  const failed = named('fail');
  const open = named('inconclusive');
  const { units = [], lotSummaries = [] } = request.evidence ?? {};
  const measured = lotSummaries.reduce((sum, lot) => sum + measuredIn(lot), units.length);
  const minimum = request.duty.evidence?.minimumUnits ?? 0;
  const doubts = [
    ...(open.length > 0 ? [`Inconclusive: ${open.join(', ')}.`] : []),
    ...(checks.length === 0 ? ['No limit is given that the part could be checked against.'] : []),
    ...(measured < minimum ? [`The duty asks for ${minimum} measured units; there are ${measured}.`] : []),
  ];
  if (failed.length > 0) return { verdict: 'reject', reasons: [`Failed: ${failed.join(', ')}.`, ...doubts] };
  if (doubts.length > 0) return { verdict: 'refer', reasons: doubts };
  return { verdict: 'approve', reasons: [`All ${checks.length} checks pass.`] };
}
