import type { FluxCharacteristic } from '../physics/characteristic.ts';
import { coilCharacteristic } from '../physics/coil.ts';
import { within } from '../physics/invalid-quantity.ts';
import type { Method } from '../physics/method.ts';
import type { Construction } from './part.ts';

/** Where a request holds the coil, for errors that its physics raises. */
export const COIL_POINTER = '/part/construction/coil';
export const WINDING_POINTER = '/part/construction/winding';

/** The flux characteristic of the part as it is constructed, at a core temperature; errors point into the request. */
export function constructionCharacteristic(construction: Construction, temperature_degC?: number): FluxCharacteristic {
  return within(COIL_POINTER, () => coilCharacteristic(construction.coil, temperature_degC));
}

/**
 * Standard uncertainty that a model's error bound leaves on its value: the bound is read as a rectangular distribution's
 * half-width, hence the divisor √3 (JCGM 100, 4.3.7).
 */
export const modelUncertainty = (value: number, method: Method): number =>
  (Math.abs(value) * method.relativeError) / Math.sqrt(3);

/** "at 95 °C", or nothing where no temperature is stated. */
export const atTemperature = (temperature_degC: number | undefined): string =>
  temperature_degC === undefined ? '' : ` and ${temperature_degC} °C`;
