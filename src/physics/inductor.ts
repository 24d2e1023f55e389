import type { FluxCharacteristic } from './characteristic.ts';
import { linearCharacteristic } from './characteristics/linear.ts';
import { measuredCharacteristic, type Sweep } from './characteristics/measured.ts';
import { type Coil, coilCharacteristic } from './coil.ts';
import { within } from './invalid-quantity.ts';
import type { Method } from './method.ts';

/** An inductor as a caller knows it: by its value, its construction, or what was measured of it. */
export type Inductor = { readonly inductance_H: number } | { readonly coil: Coil } | { readonly sweep: Sweep };

const STATED: Method = {
  name: 'inductance as stated',
  references: [],
  relativeError: 0,
  validity: 'linear: the stated inductance at every current',
};

/** The flux characteristic of an inductor; errors point into the record. */
export function inductorCharacteristic(inductor: Inductor, temperature_degC?: number): FluxCharacteristic {
  if ('inductance_H' in inductor) return linearCharacteristic(inductor.inductance_H, STATED);
  if ('coil' in inductor) return within('/coil', () => coilCharacteristic(inductor.coil, temperature_degC));
  return within('/sweep', () => measuredCharacteristic(inductor.sweep));
}
