import { differentialInductanceError, type FluxCharacteristic, methodAt } from '../physics/characteristic.ts';
import { coilCharacteristic } from '../physics/coil.ts';
import { REFERENCE_TEMPERATURE_DEGC, saturationTemperatureRange } from '../physics/core/material.ts';
import { within } from '../physics/invalid-quantity.ts';
import { type Winding, windingResistance } from '../physics/losses/winding-resistance.ts';
import type { Method } from '../physics/method.ts';
import type { Construction } from './part.ts';

/** Where a request holds the coil, for errors that its physics raises. */
export const COIL_POINTER = '/part/construction/coil';
export const WINDING_POINTER = '/part/construction/winding';

/** What of a coil can be changed to relieve a check, whatever its shape; `count` of gaps and the like are whole and left alone. */
export const COIL_LEVERS = [
  `${COIL_POINTER}/turns`,
  `${COIL_POINTER}/core/gap/length_m`,
  `${COIL_POINTER}/core/effectiveArea_m2`,
  `${COIL_POINTER}/diameter_m`,
  `${COIL_POINTER}/outerDiameter_m`,
  `${COIL_POINTER}/length_m`,
  `${COIL_POINTER}/relativePermeability`,
] as const;

export const WINDING_LEVERS = [
  `${WINDING_POINTER}/turns`,
  `${WINDING_POINTER}/wireDiameter_m`,
  `${WINDING_POINTER}/foilThickness_m`,
  `${WINDING_POINTER}/strands`,
] as const;

/** The flux characteristic of the part as it is constructed, at a core temperature; errors point into the request. */
export function constructionCharacteristic(construction: Construction, temperature_degC?: number): FluxCharacteristic {
  return within(COIL_POINTER, () => coilCharacteristic(construction.coil, temperature_degC));
}

/** The differential inductance at a current, as what is observed of it. */
export function observedInductance(characteristic: FluxCharacteristic, current_A: number) {
  const value = characteristic.differentialInductance_H(current_A);
  const relativeError = differentialInductanceError(characteristic, current_A);
  return observed(value, { ...methodAt(characteristic, current_A), relativeError });
}

/** A modelled value with the standard uncertainty that its model leaves. */
export const observed = (value: number, method: Method) => ({
  value,
  standardUncertainty: modelUncertainty(value, method),
  method,
});

/**
 * Standard uncertainty that a model's error bound leaves on its value: the bound is read as a rectangular distribution's
 * half-width, hence the divisor √3 (JCGM 100, 4.3.7).
 */
const modelUncertainty = (value: number, method: Method): number =>
  (Math.abs(value) * method.relativeError) / Math.sqrt(3);

/** ", core at 95 °C", or nothing where no temperature is stated. */
export const coreAt = (temperature_degC: number | undefined): string =>
  temperature_degC === undefined ? '' : `, core at ${temperature_degC} °C`;

/** Resistance of a winding at a temperature that lies at `temperaturePointer` in the request. */
export function windingResistanceAt(winding: Winding, temperature_degC: number, temperaturePointer: string) {
  return within(WINDING_POINTER, () => windingResistance(winding, temperature_degC), {
    '/temperature_degC': temperaturePointer,
  });
}

/**
 * A temperature at which the construction can be calculated where the drawing names none: the reference temperature of
 * material data, or the nearest that the material's list reaches.
 */
export function temperatureInReach({ coil }: Construction): number | undefined {
  const range = coil.shape === 'cored' ? saturationTemperatureRange(coil.core.material) : null;
  return range ? Math.min(range.upper_degC, Math.max(range.lower_degC, REFERENCE_TEMPERATURE_DEGC)) : undefined;
}
