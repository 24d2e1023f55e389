import type { Approval } from './approval.ts';

/** What tells a repeat of a request from a new one. */
export interface Idempotency {
  readonly key: string;
  readonly inputDigest: string;
}

export interface ApprovalFilter {
  readonly part?: string;
  readonly verdict?: Approval['verdict'];
  /** Only approvals recorded after the one at this position. */
  readonly after?: number;
  readonly limit: number;
}

/** A recorded approval and its position in the chain, which lists are paged by. */
export interface Recorded {
  readonly position: number;
  readonly approval: Approval;
}

/** The port through which approvals are recorded and read. An implementation acknowledges only what survives kill -9. */
export interface ApprovalStore {
  /**
   * Appends what `make` returns when given the digest of the record before it (null for the first); calls are serialised, so that
   * the chain has no forks. With an idempotency key that is stored already: the stored approval, when the input digest is the
   * same; otherwise a `CoilproofError` `idempotency-conflict`.
   */
  append(make: (previous: string | null) => Approval, idempotency?: Idempotency): Promise<Recorded>;
  get(id: string): Promise<Approval | undefined>;
  list(filter: ApprovalFilter): Promise<Recorded[]>;
  /** Rejects where the store does not answer. */
  ping(): Promise<void>;
}
