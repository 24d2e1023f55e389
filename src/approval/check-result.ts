import type { Judgement } from '../evidence/judge.ts';
import type { CheckName } from './check.ts';
import type { Relief } from './relief.ts';

/** A check's answer: its most adverse observation, and every unit's where it looked at measured units. */
export interface CheckResult extends Omit<Judgement, 'serial'> {
  readonly check: CheckName;
  /** On what did not pass: for each input, the smallest change that would make it pass. */
  readonly relief?: readonly Relief[];
  readonly units?: readonly Judgement[];
}
