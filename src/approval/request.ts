import type { Unit } from '../evidence/unit.ts';
import type { Duty } from './duty.ts';
import type { Part } from './part.ts';

/** What was measured, in favour of or against a part. */
export interface Evidence {
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
