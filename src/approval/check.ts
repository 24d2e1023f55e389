import type { Observation } from '../evidence/observation.ts';
import type { ApprovalRequest } from './request.ts';

export const CHECK_NAMES = [
  'construction-inductance',
  'inductance-at-peak',
  'saturation-current',
  'flux-density',
  'stored-energy',
  'core-energy-capacity',
  'winding-resistance',
  'temperature-rise',
  'turn-off-voltage',
  'turn-off-time',
  'path-energy',
  'stray-field',
  'measured-inductance',
  'measured-saturation',
  'measured-energy',
  'measured-resistance',
  'lot-capability',
  'calibration',
] as const;

export type CheckName = (typeof CHECK_NAMES)[number];

/** A check: what it observes of a request. None where its limit is not given or there is nothing that it could look at. */
export interface Check {
  readonly name: CheckName;
  observe(request: ApprovalRequest): readonly Observation[];
  /** What its observations are of, where they are several; default: measured units. */
  readonly counted?: string;
  /** Pointers to the inputs that could relieve it; those that the request does not give are passed over. */
  readonly levers: readonly string[];
}
