import type { Conductor } from '../physics/losses/winding-resistance.ts';
import type { Method } from '../physics/method.ts';
import type { Drawing } from './drawing.ts';
import type { Limit, Observation } from './observation.ts';
import {
  dropCurrentOf,
  energyAt,
  inductanceAt,
  type MeasuredQuantity,
  resistanceAt,
  type Unavailable,
} from './quantities.ts';
import { isOutOfCalibration, type Unit } from './unit.ts';
import { inWords, percent } from './wording.ts';

/**
 * How far a unit may have been colder than the temperature that a limit holds at and still speak for it, in K: *common practice* for
 * what a bench without a chamber holds. Saturation falls with temperature in the usual core families, so a cold sweep can condemn
 * a part but not clear it.
 */
const TEMPERATURE_TOLERANCE_K = 5;

/** A quantity that every unit is measured for in the same way, and its limit. */
export interface Measurement {
  /** Starts a sentence. */
  readonly what: string;
  readonly unit: string;
  readonly limit: Limit;
  /** the temperature that the limit holds at, where it does for one */
  readonly temperature_degC?: number | undefined;
  readonly measure: (unit: Unit) => MeasuredQuantity | Unavailable;
}

/** Inductance at the drawing's test current. */
export function inductanceMeasurement({ inductance: { lower_H, upper_H, testCurrent_A = 0 } }: Drawing): Measurement {
  return {
    what: `Inductance at ${inWords(testCurrent_A, 'A')}`,
    unit: 'H',
    limit: { lower: lower_H, upper: upper_H },
    measure: (unit) => inductanceAt(unit, testCurrent_A),
  };
}

/** Current at which the inductance has dropped by the drawing's share; undefined where the drawing has none. */
export function saturationMeasurement({ saturation }: Drawing): Measurement | undefined {
  if (!saturation) return undefined;
  const { current_A, inductanceDrop, temperature_degC } = saturation;
  return {
    what: `Current for an inductance drop of ${percent(inductanceDrop)}`,
    unit: 'A',
    limit: { lower: current_A },
    temperature_degC,
    measure: (unit) => dropCurrentOf(unit, inductanceDrop),
  };
}

/** Resistance at the drawing's temperature; undefined where the drawing has none. */
export function resistanceMeasurement(
  { resistance }: Drawing,
  conductor: Conductor = 'copper',
): Measurement | undefined {
  if (!resistance) return undefined;
  const { upper_ohm, temperature_degC } = resistance;
  return {
    what: `Resistance brought to ${inWords(temperature_degC, '°C')}`,
    unit: 'Ω',
    limit: { upper: upper_ohm },
    measure: (unit) => resistanceAt(unit, temperature_degC, conductor),
  };
}

/** Energy stored at a current; `lower_J` where there is a limit. */
export function energyMeasurement(
  current_A: number,
  lower_J: number | undefined,
  temperature_degC?: number,
): Measurement {
  return {
    what: `Stored energy at ${inWords(current_A, 'A')}`,
    unit: 'J',
    limit: lower_J === undefined ? {} : { lower: lower_J },
    temperature_degC,
    measure: (unit) => energyAt(unit, current_A),
  };
}

/** One unit's quantity beside its limit. Errors of the readings point into the unit. */
export function observeUnit(
  unit: Unit,
  { what, unit: symbol, limit, temperature_degC, measure }: Measurement,
): Observation {
  const quantity = measure(unit);
  const common = { what: `${what} of unit ${unit.serial}`, unit: symbol, limit, serial: unit.serial };
  if ('unavailable' in quantity) return { ...common, method: NOT_MEASURED, undecided: quantity.unavailable };
  if (isOutOfCalibration(unit)) {
    const undecided = `the calibration of rig ${unit.rig} ended on ${unit.calibrationDue}, before the measurement of ${unit.measuredAt}`;
    return { ...common, ...quantity, undecided };
  }
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
