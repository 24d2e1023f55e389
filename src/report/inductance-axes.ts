import { type Axis, axisOver } from './axis.ts';
import { LEAST_PLOT_WIDTH } from './figure.ts';

/** The axes of differential inductance over current, both from zero, wide enough for the values given. */
export function inductanceAxes(
  currents_A: readonly number[],
  inductances_H: readonly number[],
): { readonly x: Axis; readonly y: Axis } {
  return {
    x: axisOver(currents_A, { label: 'current', unit: 'A', fromZero: true, room: LEAST_PLOT_WIDTH }),
    y: axisOver(inductances_H, { label: 'differential inductance', unit: 'H', fromZero: true }),
  };
}
