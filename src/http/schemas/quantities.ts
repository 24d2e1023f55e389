import { z } from 'zod';

/**
 * A quantity with the range in which it is accepted. The ranges are wider than any wound part and narrow enough that products of
 * several quantities stay within 64-bit floats; what still leaves them is refused as `number-range`.
 */
const quantity = (lowest: number, highest: number, description: string) =>
  z
    .number()
    .min(lowest)
    .max(highest)
    .meta({ description: `${description}; ${lowest} to ${highest}` });

const signed = (limit: number, description: string) =>
  z
    .number()
    .min(-limit)
    .max(limit)
    .meta({ description: `${description}; magnitude up to ${limit}` });

export const length_m = quantity(1e-9, 1e6, 'm');
export const lengthOrZero_m = z.number().min(0).max(1e6).meta({ description: 'm; 0 to 1e6' });
export const area_m2 = quantity(1e-18, 1e12, 'm²');
export const volume_m3 = quantity(1e-27, 1e18, 'm³');
export const turns = quantity(1e-3, 1e9, 'number of turns, fractions included');
export const inductance_H = quantity(1e-18, 1e9, 'H');
export const current_A = signed(1e9, 'A');
export const positiveCurrent_A = quantity(1e-12, 1e9, 'A, magnitude');
export const resistance_ohm = quantity(1e-12, 1e15, 'Ω');
export const resistanceOrZero_ohm = z.number().min(0).max(1e15).meta({ description: 'Ω; 0 to 1e15' });
export const capacitance_F = quantity(1e-18, 1e6, 'F');
export const voltage_V = signed(1e9, 'V');
export const positiveVoltage_V = quantity(1e-9, 1e9, 'V');
export const voltageOrZero_V = z.number().min(0).max(1e9).meta({ description: 'V; 0 to 1e9' });
export const frequency_Hz = quantity(1e-6, 1e12, 'Hz');
export const time_s = quantity(1e-15, 1e12, 's');
export const energy_J = quantity(1e-24, 1e15, 'J');
export const fluxDensity_T = quantity(1e-12, 100, 'T');
export const field_A_per_m = quantity(1e-9, 1e12, 'A/m');
export const temperature_degC = z.number().min(-273.15).max(2000).meta({ description: '°C; -273.15 to 2000' });
export const rise_K = quantity(1e-6, 2000, 'K');
export const relativePermeability = z.number().min(1).max(1e9).meta({ description: 'relative to vacuum; 1 to 1e9' });
export const standardUncertainty = z
  .number()
  .min(0)
  .max(1e15)
  .meta({ description: 'standard uncertainty (k = 1), unit of the quantity' });
export const fraction = z.number().gt(0).lt(1).meta({ description: 'a fraction between 0 and 1, both excluded' });
export const risk = z
  .number()
  .min(1e-300)
  .max(0.5)
  .meta({ description: 'accepted probability of a wrong decision; up to 0.5; default 0.05' });
