import {
  dropCurrentOf,
  energyAt,
  inductanceAt,
  type MeasuredQuantity,
  resistanceAt,
  type Unavailable,
} from '../../evidence/quantities.ts';
import type { Unit } from '../../evidence/unit.ts';
import { within } from '../../physics/invalid-quantity.ts';
import type { Method } from '../../physics/method.ts';
import type { Check, CheckLimit, CheckName, Observation } from '../check.ts';
import type { ApprovalRequest } from '../request.ts';
import { inWords, percent } from '../wording.ts';

/**
 * How far a unit may have been colder than the drawing's temperature and still speak for it, in K: *common practice* for what a
 * bench without a chamber holds. Saturation falls with temperature in the usual core families, so a cold sweep can condemn a
 * part but not clear it.
 */
const TEMPERATURE_TOLERANCE_K = 5;

interface Measurement {
  readonly what: string;
  readonly unit: string;
  readonly limit: CheckLimit;
  /** the temperature that the limit holds at, where it does for one */
  readonly temperature_degC?: number | undefined;
  readonly measure: (unit: Unit) => MeasuredQuantity | Unavailable;
}

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

function observeUnit(unit: Unit, { what, unit: symbol, limit, temperature_degC, measure }: Measurement): Observation {
  const quantity = measure(unit);
  const common = { what: `${what} of unit ${unit.serial}`, unit: symbol, limit, serial: unit.serial };
  if ('unavailable' in quantity) return { ...common, method: NOT_MEASURED, undecided: quantity.unavailable };
  const colder_K = temperature_degC === undefined ? 0 : temperature_degC - (unit.temperature_degC ?? temperature_degC);
  return {
    ...common,
    value: quantity.value,
    standardUncertainty: quantity.standardUncertainty,
    method: quantity.method,
    ...(quantity.atLeast && { atLeast: true }),
    ...(colder_K > TEMPERATURE_TOLERANCE_K && {
      passIsUndecided: `measured at ${unit.temperature_degC} °C, but the limit holds at ${temperature_degC} °C`,
    }),
  };
}

const NOT_MEASURED: Method = { name: 'none', references: [], relativeError: 1, validity: 'nothing was measured' };

/** Is each unit's inductance at the drawing's test current within the drawing's limits? */
export const measuredInductance = measuredCheck(
  'measured-inductance',
  ['/part/drawing/inductance/lower_H', '/part/drawing/inductance/upper_H'],
  ({ part: { drawing } }) => {
    if (!drawing) return undefined;
    const { lower_H, upper_H, testCurrent_A = 0 } = drawing.inductance;
    return {
      what: `Inductance at ${inWords(testCurrent_A, 'A')}`,
      unit: 'H',
      limit: { lower: lower_H, upper: upper_H },
      measure: (unit) => inductanceAt(unit, testCurrent_A),
    };
  },
);

/** Does each unit carry the drawing's current before its inductance has dropped by the drawing's share? */
export const measuredSaturation = measuredCheck(
  'measured-saturation',
  ['/part/drawing/saturation/current_A', '/part/drawing/saturation/inductanceDrop'],
  ({ part: { drawing } }) => {
    if (!drawing?.saturation) return undefined;
    const { current_A, inductanceDrop, temperature_degC } = drawing.saturation;
    return {
      what: `Current for an inductance drop of ${percent(inductanceDrop)}`,
      unit: 'A',
      limit: { lower: current_A },
      temperature_degC,
      measure: (unit) => dropCurrentOf(unit, inductanceDrop),
    };
  },
);

/** Does each unit store the duty's energy at the duty's peak current? */
export const measuredEnergy = measuredCheck(
  'measured-energy',
  ['/duty/peakCurrent_A', '/duty/required/storedEnergy_J'],
  ({ duty }) => {
    const lower = duty.required?.storedEnergy_J;
    if (lower === undefined) return undefined;
    return {
      what: `Stored energy at ${inWords(duty.peakCurrent_A, 'A')}`,
      unit: 'J',
      limit: { lower },
      temperature_degC: duty.coreTemperature_degC,
      measure: (unit) => energyAt(unit, duty.peakCurrent_A),
    };
  },
);

/** Does each unit's resistance, brought to the drawing's temperature, stay below the drawing's? */
export const measuredResistance = measuredCheck(
  'measured-resistance',
  ['/part/drawing/resistance/upper_ohm'],
  ({ part: { drawing, construction }, evidence }) => {
    if (!drawing?.resistance || !evidence?.units?.some((unit) => unit.resistance_ohm !== undefined)) return undefined;
    const { upper_ohm, temperature_degC } = drawing.resistance;
    return {
      what: `Resistance brought to ${inWords(temperature_degC, '°C')}`,
      unit: 'Ω',
      limit: { upper: upper_ohm },
      measure: (unit) => resistanceAt(unit, temperature_degC, construction?.winding?.conductor ?? 'copper'),
    };
  },
);
