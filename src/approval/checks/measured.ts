import {
  energyMeasurement,
  inductanceMeasurement,
  type Measurement,
  observeUnit,
  resistanceMeasurement,
  saturationMeasurement,
} from '../../evidence/unit-observations.ts';
import { within } from '../../physics/invalid-quantity.ts';
import type { Check, CheckName } from '../check.ts';
import type { ApprovalRequest } from '../request.ts';

/** A check that observes every measured unit in the same way; `plan` says how, or undefined where its limit is not given. */
function measuredCheck(
  name: CheckName,
  levers: readonly string[],
  plan: (request: ApprovalRequest) => Measurement | undefined,
): Check {
  return {
    name,
    levers,
    observe(request) {
      const units = request.evidence?.units ?? [];
      const measurement = units.length > 0 ? plan(request) : undefined;
      if (!measurement) return [];
      return units.map((unit, index) => within(`/evidence/units/${index}`, () => observeUnit(unit, measurement)));
    },
  };
}

/** Is each unit's inductance at the drawing's test current within the drawing's limits? */
export const measuredInductance = measuredCheck(
  'measured-inductance',
  ['/part/drawing/inductance/lower_H', '/part/drawing/inductance/upper_H'],
  ({ part: { drawing } }) => drawing && inductanceMeasurement(drawing),
);

/** Does each unit carry the drawing's current before its inductance has dropped by the drawing's share? */
export const measuredSaturation = measuredCheck(
  'measured-saturation',
  ['/part/drawing/saturation/current_A', '/part/drawing/saturation/inductanceDrop'],
  ({ part: { drawing } }) => drawing && saturationMeasurement(drawing),
);

/** Does each unit store the duty's energy at the duty's peak current? */
export const measuredEnergy = measuredCheck(
  'measured-energy',
  ['/duty/peakCurrent_A', '/duty/required/storedEnergy_J'],
  ({ duty: { peakCurrent_A, required, coreTemperature_degC } }) =>
    required?.storedEnergy_J === undefined
      ? undefined
      : energyMeasurement(peakCurrent_A, required.storedEnergy_J, coreTemperature_degC),
);

/** Does each unit's resistance, brought to the drawing's temperature, stay below the drawing's? */
export const measuredResistance = measuredCheck(
  'measured-resistance',
  ['/part/drawing/resistance/upper_ohm'],
  ({ part: { drawing, construction }, evidence }) =>
    drawing && evidence?.units?.some(({ resistance_ohm }) => resistance_ohm !== undefined)
      ? resistanceMeasurement(drawing, construction?.winding?.conductor)
      : undefined,
);
