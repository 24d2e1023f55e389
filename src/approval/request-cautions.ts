import { energyAt } from '../evidence/quantities.ts';
import type { Unit } from '../evidence/unit.ts';
import { isFieldCoil, limitDistances } from '../physics/fields/field.ts';
import { type Caution, cautionsOf, type Hazards, IMPLANT_FLUX_DENSITY_T } from './cautions.ts';
import type { CheckResult } from './check-result.ts';
import { interruptionOf } from './checks/turn-off.ts';
import { constructionCharacteristic } from './construction.ts';
import type { ApprovalRequest } from './request.ts';

/** The cautions of an approval: for the worst that its construction, its measured units and its duty can do. */
export function cautionsFor(request: ApprovalRequest, checks: readonly CheckResult[]): Caution[] {
  const turnOff = interruptionOf(request);
  return cautionsOf({
    storedEnergy_J: largestEnergy_J(request),
    ...(turnOff && { turnOffVoltage_V: turnOff.peakVoltage_V }),
    ...strayField(request),
    ...hottest(request, checks),
  });
}

/** Of what is known of the part; where nothing was calculated or measured, ½·L·I² of the drawing's nominal inductance. */
function largestEnergy_J({ part: { construction, drawing }, duty, evidence }: ApprovalRequest): number {
  const designed = construction
    ? constructionCharacteristic(construction, duty.coreTemperature_degC).energy_J(duty.peakCurrent_A)
    : 0;
  const largest = Math.max(designed, ...(evidence?.units ?? []).map((unit) => unitEnergy_J(unit, duty.peakCurrent_A)));
  return largest > 0 ? largest : ((drawing?.inductance.nominal_H ?? 0) * duty.peakCurrent_A ** 2) / 2;
}

/** A sweep that ends before the peak current does not make its energy none: then ½·L·I² of its largest inductance, an upper bound. */
function unitEnergy_J(unit: Unit, peakCurrent_A: number): number {
  const energy = energyAt(unit, peakCurrent_A);
  return 'value' in energy ? energy.value : (Math.max(...unit.sweep.inductance_H) * peakCurrent_A ** 2) / 2;
}

/** The hottest of what the duty states of the core and what was calculated of the winding. */
function hottest({ duty }: ApprovalRequest, checks: readonly CheckResult[]): Hazards {
  const calculated = checks
    .flatMap((result) => [result, ...(result.units ?? [])])
    .flatMap(({ observed }) => (observed?.unit === '°C' ? [observed.value] : []));
  const surface_degC = Math.max(duty.coreTemperature_degC ?? Number.NEGATIVE_INFINITY, ...calculated);
  return Number.isFinite(surface_degC) ? { surface_degC } : {};
}

function strayField({ part: { construction }, duty }: ApprovalRequest): Hazards {
  if (!construction || !isFieldCoil(construction.coil)) return {};
  const { axial_m, radial_m } = limitDistances(construction.coil, duty.peakCurrent_A, IMPLANT_FLUX_DENSITY_T);
  const implantDistance_m = Math.max(axial_m ?? 0, radial_m ?? 0);
  return implantDistance_m > 0 ? { implantDistance_m } : {};
}
