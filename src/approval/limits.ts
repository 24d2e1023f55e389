import type { CheckName } from './check.ts';
import type { ApprovalRequest } from './request.ts';

/** A limit that a request can give, and the checks that test it. */
export interface RequestedLimit {
  readonly pointer: string;
  readonly given: (request: ApprovalRequest) => boolean;
  readonly checks: readonly [CheckName, ...CheckName[]];
}

/** Every limit, so that one which is given but which nothing in the request can be compared with is never passed over in silence. */
export const LIMITS: readonly RequestedLimit[] = [
  {
    pointer: '/part/drawing/inductance',
    given: ({ part }) => part.drawing !== undefined,
    checks: ['construction-inductance', 'measured-inductance', 'lot-capability'],
  },
  {
    pointer: '/part/drawing/saturation',
    given: ({ part }) => part.drawing?.saturation !== undefined,
    checks: ['saturation-current', 'measured-saturation', 'lot-capability'],
  },
  {
    pointer: '/part/drawing/resistance',
    given: ({ part }) => part.drawing?.resistance !== undefined,
    checks: ['winding-resistance', 'measured-resistance', 'lot-capability'],
  },
  {
    pointer: '/duty/required/inductanceAtPeak_H',
    given: ({ duty }) => duty.required?.inductanceAtPeak_H !== undefined,
    checks: ['inductance-at-peak'],
  },
  {
    pointer: '/duty/required/storedEnergy_J',
    given: ({ duty }) => duty.required?.storedEnergy_J !== undefined,
    checks: ['stored-energy', 'measured-energy'],
  },
  {
    pointer: '/duty/required/fluxMargin',
    given: ({ duty }) => duty.required?.fluxMargin !== undefined,
    checks: ['flux-density'],
  },
  {
    pointer: '/duty/hotspotLimit_degC',
    given: ({ duty }) => duty.hotspotLimit_degC !== undefined,
    checks: ['temperature-rise'],
  },
  {
    pointer: '/part/drawing/thermal',
    given: ({ part }) => part.drawing?.thermal !== undefined,
    checks: ['temperature-rise'],
  },
  {
    pointer: '/duty/interruption/voltageLimit_V',
    given: ({ duty }) => duty.interruption?.voltageLimit_V !== undefined,
    checks: ['turn-off-voltage'],
  },
  {
    pointer: '/duty/interruption/timeLimit_s',
    given: ({ duty }) => duty.interruption?.timeLimit_s !== undefined,
    checks: ['turn-off-time'],
  },
  {
    pointer: '/duty/interruption/pathEnergyLimit_J',
    given: ({ duty }) => duty.interruption?.pathEnergyLimit_J !== undefined,
    checks: ['path-energy'],
  },
  {
    pointer: '/duty/strayField',
    given: ({ duty }) => duty.strayField !== undefined,
    checks: ['stray-field'],
  },
];
