import type { UnitStore } from '../evidence/unit-store.ts';
import type { Caution } from './cautions.ts';
import type { CheckResult } from './check-result.ts';
import type { Compute } from './compute.ts';
import type { Duty } from './duty.ts';
import { evaluate } from './evaluate.ts';
import type { Part } from './part.ts';
import { type Digests, digestOf, seal } from './record.ts';
import { type Reference, resolveRequest } from './references.ts';
import type { Registry } from './registry.ts';
import type { Evidence, SentRequest } from './request.ts';
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
  /** what of the request stood for something registered, and its tag then */
  readonly references: readonly Reference[];
  readonly engine: { readonly version: string };
  readonly digests: Digests;
  readonly recordedAt: string;
}

/** What approving needs from outside: a store, a version, and the two things that no pure function can have. */
export interface ApprovalDesk {
  readonly store: ApprovalStore;
  readonly registry: Registry;
  readonly units: UnitStore;
  readonly compute: Compute;
  readonly engineVersion: string;
  readonly now: () => Date;
  readonly newId: () => string;
}

/**
 * Evaluates a request, with what it refers to put in its place, and records the approval; resolves once the record is durable.
 * The input digest is of the request as it was sent.
 */
export async function approve(desk: ApprovalDesk, asSent: SentRequest, idempotencyKey?: string): Promise<Recorded> {
  const { request, references } = await resolveRequest(asSent, desk);
  const { verdict, reasons, checks, cautions } = evaluate(request);
  const engine = { version: desk.engineVersion };
  const content = { id: desk.newId(), verdict, reasons, ...request, checks, cautions, references, engine };
  const idempotency = idempotencyKey === undefined ? undefined : { key: idempotencyKey, inputDigest: digestOf(asSent) };
  return desk.store.append(
    (previous) => seal(asSent, { ...content, recordedAt: desk.now().toISOString() }, previous),
    idempotency,
  );
}
