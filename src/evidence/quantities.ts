import { propagate } from '../metrology/propagation.ts';
import { differentialInductanceError, type FluxCharacteristic, methodAt } from '../physics/characteristic.ts';
import { measuredCharacteristic, type Sweep } from '../physics/characteristics/measured.ts';
import { within } from '../physics/invalid-quantity.ts';
import { type Conductor, resistanceAtTemperature } from '../physics/losses/winding-resistance.ts';
import type { Method } from '../physics/method.ts';
import { dropCurrent_A } from '../physics/saturation.ts';
import type { Unit } from './unit.ts';

/** A quantity of one unit with the standard uncertainty that its rig's instrument and the sweep's interpolation leave. */
export interface MeasuredQuantity {
  readonly value: number;
  readonly standardUncertainty: number;
  readonly method: Method;
  /** the true value is at least this one: the sweep ended before the quantity itself was reached */
  readonly atLeast?: boolean;
}

/** What this unit's readings cannot tell, and why. */
export interface Unavailable {
  readonly unavailable: string;
}

/** Differential inductance at `current_A`, in H. Not extrapolated beyond the sweep. */
export function inductanceAt(unit: Unit, current_A: number): MeasuredQuantity | Unavailable {
  return fromSweep(
    unit,
    current_A,
    (characteristic) => characteristic.differentialInductance_H(current_A),
    (characteristic) => differentialInductanceError(characteristic, current_A),
  );
}

/** Energy stored at `current_A`, ∫ i dλ along the sweep, in J. Not extrapolated beyond the sweep. */
export function energyAt(unit: Unit, current_A: number): MeasuredQuantity | Unavailable {
  return fromSweep(unit, current_A, (characteristic) => characteristic.energy_J(current_A));
}

/**
 * Current at which the differential inductance has fallen by `inductanceDrop` from its value at zero current, in A. Where the
 * sweep ends before that, its last current, which the true drop current exceeds (`atLeast`).
 */
export function dropCurrentOf(unit: Unit, inductanceDrop: number): MeasuredQuantity | Unavailable {
  const whole = measuredCharacteristic(unit.sweep);
  const reached = dropCurrent_A(whole, inductanceDrop) !== null;
  const quantity = fromSweep(unit, 0, (characteristic) =>
    reached
      ? (dropCurrent_A(characteristic, inductanceDrop) ?? characteristic.maximumCurrent_A)
      : characteristic.maximumCurrent_A,
  );
  return reached || 'unavailable' in quantity ? quantity : { ...quantity, atLeast: true };
}

/** Resistance brought from the unit's temperature to `temperature_degC` by its conductor's law, in Ω. */
export function resistanceAt(
  unit: Unit,
  temperature_degC: number,
  conductor: Conductor,
): MeasuredQuantity | Unavailable {
  const { resistance_ohm, instrument } = unit;
  if (resistance_ohm === undefined) return { unavailable: 'no resistance was measured' };
  const from_degC = unit.temperature_degC ?? temperature_degC;
  const scale = resistanceAtTemperature(1, from_degC, temperature_degC, conductor);
  const relative = instrument?.resistance?.relative ?? 0;
  const offset_ohm = instrument?.resistance?.offset_ohm ?? 0;
  return {
    value: resistance_ohm * scale,
    standardUncertainty: Math.hypot(relative * resistance_ohm, offset_ohm) * scale,
    method: {
      name: `measured resistance brought to the drawing's temperature as ${conductor}`,
      references: ['IEC 60028', 'IEC 60889'],
      relativeError: 0,
      validity: 'winding at one temperature while measured',
    },
  };
}

/** Propagates the instrument's gains and offsets through the whole sweep to one quantity (JCGM 100, 5.1.2). */
function fromSweep(
  unit: Unit,
  current_A: number,
  quantity: (characteristic: FluxCharacteristic) => number,
  errorBound = (characteristic: FluxCharacteristic) => methodAt(characteristic, current_A).relativeError,
): MeasuredQuantity | Unavailable {
  const characteristic = within('/sweep', () => measuredCharacteristic(unit.sweep));
  if (current_A > characteristic.maximumCurrent_A) {
    return { unavailable: `the sweep ends at ${characteristic.maximumCurrent_A} A, before ${current_A} A` };
  }
  const { inductance, current, voltage } = unit.instrument ?? {};
  const inductanceGain_u = unit.fromPulse ? (voltage?.relative ?? inductance?.relative) : inductance?.relative;
  const readAs = ([
    inductanceGain = 1,
    inductanceOffset_H = 0,
    currentGain = 1,
    currentOffset_A = 0,
  ]: readonly number[]) =>
    quantity(
      measuredCharacteristic(
        corrected(unit.sweep, { inductanceGain, inductanceOffset_H, currentGain, currentOffset_A }),
      ),
    );
  const instrumental = propagate(readAs, [
    { name: 'inductance gain', value: 1, standardUncertainty: inductanceGain_u ?? 0 },
    { name: 'inductance offset', value: 0, standardUncertainty: inductance?.offset_H ?? 0 },
    { name: 'current gain', value: 1, standardUncertainty: current?.relative ?? 0 },
    { name: 'current offset', value: 0, standardUncertainty: current?.offset_A ?? 0 },
  ]);
  const value = quantity(characteristic);
  const relativeError = errorBound(characteristic);
  // A bound on the interpolation's error becomes a standard uncertainty as a rectangular distribution does, JCGM 100 4.3.7.
  const interpolation = (relativeError * Math.abs(value)) / Math.sqrt(3);
  return {
    value,
    standardUncertainty: Math.hypot(instrumental.standardUncertainty, interpolation),
    method: { ...characteristic.method, relativeError },
  };
}

interface Correction {
  readonly inductanceGain: number;
  readonly inductanceOffset_H: number;
  readonly currentGain: number;
  readonly currentOffset_A: number;
}

/** The sweep as it would have read had the instrument been off by the correction. */
function corrected(sweep: Sweep, c: Correction): Sweep {
  return {
    ...sweep,
    current_A: sweep.current_A.map((reading) => reading * c.currentGain + c.currentOffset_A),
    inductance_H: sweep.inductance_H.map((reading) => reading * c.inductanceGain + c.inductanceOffset_H),
  };
}
