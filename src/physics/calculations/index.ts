import type { Calculation } from './calculation.ts';
import { energy } from './energy.ts';
import { energyDensity } from './energy-density.ts';
import { field } from './field.ts';
import { inductance } from './inductance.ts';
import { losses } from './losses.ts';
import { mutualInductance } from './mutual-inductance.ts';
import { saturation } from './saturation.ts';
import { transient } from './transient.ts';

/** Every calculation by name, so that a thread of its own can be told which to run. */
export const CALCULATIONS = {
  energy,
  'energy-density': energyDensity,
  field,
  inductance,
  losses,
  'mutual-inductance': mutualInductance,
  saturation,
  transient,
} as const;

export type CalculationName = keyof typeof CALCULATIONS;

/** The calculation of a name, its request and answer not known by type. */
export const calculationOf = (name: CalculationName): Calculation<object, object> =>
  CALCULATIONS[name] as unknown as Calculation<object, object>;

const POSITIVE = /^(turns|relativePermeability|initialPermeability)$|_(m|m2|m3|H|ohm|F|Hz|K_per_W)$/;
const SIGNED = /^(axial|inductanceMatrix)/;

/**
 * What a number at a pointer must stay above, by its field's name: dimensions, inductances, resistances and the like above zero, of
 * currents, voltages, flux densities and temperatures nothing is said. For draws and steps that a formula would not refuse by itself.
 */
export function exclusiveMinimum(pointer: string): number | undefined {
  const field = pointer.split('/').findLast((key) => !/^\d+$/.test(key)) ?? '';
  return POSITIVE.test(field) && !SIGNED.test(field) ? 0 : undefined;
}
