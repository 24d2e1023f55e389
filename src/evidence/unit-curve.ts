import { measuredCharacteristic } from '../physics/characteristics/measured.ts';
import { dropCurrent_A } from '../physics/saturation.ts';
import type { Unit } from './unit.ts';

/** Points of a curve drawn through a unit's readings. */
const POINTS = 200;

/** A unit's differential inductance over current: at its readings, between them, and where it has dropped by the drawing's share. */
export function measuredCurve({ sweep }: Unit, inductanceDrop: number | undefined) {
  const characteristic = measuredCharacteristic(sweep);
  const currents = Array.from({ length: POINTS + 1 }, (_, k) => (characteristic.maximumCurrent_A * k) / POINTS);
  const at = (current_A: readonly number[]) =>
    current_A.map((current) => characteristic.differentialInductance_H(current));
  const drop = inductanceDrop === undefined ? null : dropCurrent_A(characteristic, inductanceDrop);
  return {
    measured: { current_A: [...sweep.current_A], inductance_H: at(sweep.current_A) },
    curve: { current_A: currents, inductance_H: at(currents) },
    initialInductance_H: characteristic.differentialInductance_H(0),
    ...(drop !== null && { dropCurrent: { current_A: drop } }),
    ...(drop === null &&
      inductanceDrop !== undefined && { dropCurrent: { current_A: characteristic.maximumCurrent_A, atLeast: true } }),
  };
}
