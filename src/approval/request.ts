import type { LotSummary } from '../evidence/lot-summary.ts';
import type { SentUnit, Unit } from '../evidence/unit.ts';
import type { Duty } from './duty.ts';
import type { Part } from './part.ts';

/** What was measured, in favour of or against a part. */
export interface Evidence {
  /** ids of registered lots of the part */
  readonly lots?: readonly string[];
  /** what those lots came to, once they are looked up */
  readonly lotSummaries?: readonly LotSummary[];
  readonly units?: readonly Unit[];
}

/** What an approval decides on. */
export interface ApprovalRequest {
  readonly part: Part;
  readonly duty: Duty;
  readonly evidence?: Evidence;
  /** standard uncertainty of numbers in this request, by RFC 6901 pointer */
  readonly uncertainty?: Readonly<Record<string, number>>;
}

/** A request as it comes: units may still hold raw pulses. */
export type SentRequest = Omit<ApprovalRequest, 'evidence'> & {
  readonly evidence?: { readonly lots?: readonly string[]; readonly units?: readonly SentUnit[] };
};
