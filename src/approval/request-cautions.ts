import { energyAt } from '../evidence/quantities.ts';
import { isFieldCoil, limitDistances } from '../physics/fields/field.ts';
import { type Caution, cautionsOf, type Hazards, IMPLANT_FLUX_DENSITY_T } from './cautions.ts';
import { interruptionOf } from './checks/turn-off.ts';
import { constructionCharacteristic } from './construction.ts';
import type { ApprovalRequest } from './request.ts';

/** The cautions of an approval: for the worst that its construction, its measured units and its duty can do. */
export function cautionsFor(request: ApprovalRequest): Caution[] {
  const turnOff = interruptionOf(request);
  return cautionsOf({
    storedEnergy_J: largestEnergy_J(request),
    ...(turnOff && { turnOffVoltage_V: turnOff.peakVoltage_V }),
    ...strayField(request),
  });
}

function largestEnergy_J({ part: { construction }, duty, evidence }: ApprovalRequest): number {
  const designed = construction
    ? constructionCharacteristic(construction, duty.coreTemperature_degC).energy_J(duty.peakCurrent_A)
    : 0;
  const measured = (evidence?.units ?? []).map((unit) => {
    const energy = energyAt(unit, duty.peakCurrent_A);
    return 'value' in energy ? energy.value : 0;
  });
  return Math.max(designed, ...measured);
}

function strayField({ part: { construction }, duty }: ApprovalRequest): Hazards {
  if (!construction || !isFieldCoil(construction.coil)) return {};
  const { axial_m, radial_m } = limitDistances(construction.coil, duty.peakCurrent_A, IMPLANT_FLUX_DENSITY_T);
  const implantDistance_m = Math.max(axial_m ?? 0, radial_m ?? 0);
  return implantDistance_m > 0 ? { implantDistance_m } : {};
}
