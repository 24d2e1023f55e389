import type { Caution } from './cautions.ts';
import type { CheckResult } from './check-result.ts';
import type { Duty } from './duty.ts';
import { evaluate } from './evaluate.ts';
import type { Part } from './part.ts';
import { type Digests, digestOf, seal } from './record.ts';
import type { ApprovalRequest, Evidence } from './request.ts';
import type { ApprovalStore, Recorded } from './store.ts';
import type { Verdict } from './verdict.ts';

/** A recorded decision: what was asked, what was found, by which engine, and digests that show any later change. */
export interface Approval {
  readonly id: string;
  readonly verdict: Verdict;
  readonly reasons: readonly string[];
  readonly part: Part;
  readonly duty: Duty;
  readonly evidence?: Evidence;
  readonly uncertainty?: Readonly<Record<string, number>>;
  readonly checks: readonly CheckResult[];
  readonly cautions: readonly Caution[];
  readonly engine: { readonly version: string };
  readonly digests: Digests;
  readonly recordedAt: string;
}

/** What approving needs from outside: a store, a version, and the two things that no pure function can have. */
export interface ApprovalDesk {
  readonly store: ApprovalStore;
  readonly engineVersion: string;
  readonly now: () => Date;
  readonly newId: () => string;
}

/** Evaluates a request and records the approval; resolves once the record is durable. */
export async function approve(
  desk: ApprovalDesk,
  request: ApprovalRequest,
  idempotencyKey?: string,
): Promise<Recorded> {
  const evaluation = evaluate(request);
  const id = desk.newId();
  const idempotency =
    idempotencyKey === undefined ? undefined : { key: idempotencyKey, inputDigest: digestOf(request) };
  return desk.store.append((previous) => {
    const { checks, cautions, verdict, reasons } = evaluation;
    const content = { id, verdict, reasons, ...request, checks, cautions, engine: { version: desk.engineVersion } };
    return seal(request, { ...content, recordedAt: desk.now().toISOString() }, previous);
  }, idempotency);
}
