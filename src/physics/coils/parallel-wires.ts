import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { roundBarSelfLessAbreast_m } from './round-bars.ts';

/** Go and return: two equal parallel round wires with opposite currents; spacing from centre to centre, bare diameter. */
export interface ParallelWires {
  readonly shape: 'parallel-wires';
  readonly length_m: number;
  readonly spacing_m: number;
  readonly wireDiameter_m: number;
}

/**
 * Inductance in H of two parallel round wires, go and return, finite length, uniform current in each section, internal
 * inductance included: (µ0/2π) (Neumann's integral of a wire with itself less that with the other). Long wires:
 * (µ0/π) l [ln(D/ρ) + 1/4], exact however close they are, because the geometric mean distance of two circles is D
 * (Maxwell, Treatise, vol. 2, art. 685).
 *
 * The links that close the loop at the ends are not part of it; `relativeError` is what two straight links of the same
 * wire would add (with them it is a rectangular loop).
 * Throws InvalidQuantity at /spacing_m when the wires would overlap.
 *
 * | domain                                                | worst relative error | against                                   |
 * |-------------------------------------------------------|----------------------|-------------------------------------------|
 * | length/radius 0.5..1e6, spacing/radius 2 (touching)..20 | 2e-14              | Hankel's integral, Gauss-Legendre (scipy) |
 * | length/radius 0.01, the same spacings                 | 1e-11                | the same                                  |
 */
export function parallelWiresInductance(coil: ParallelWires): { inductance_H: number; method: Method } {
  const { length_m, spacing_m, wireDiameter_m } = coil;
  if (spacing_m < wireDiameter_m) {
    throw new InvalidQuantity(
      '/spacing_m',
      'the wires overlap: the spacing of their centres must be at least the wire diameter',
    );
  }
  const line_m = roundBarSelfLessAbreast_m(length_m, wireDiameter_m / 2, spacing_m);
  // Links the wires' own length apart, or as far as wires can come; only the size of what is missing is needed.
  const links_m = roundBarSelfLessAbreast_m(spacing_m, wireDiameter_m / 2, Math.max(length_m, wireDiameter_m));
  return {
    inductance_H: (VACUUM_PERMEABILITY_H_PER_M / (2 * Math.PI)) * line_m,
    method: {
      name: 'Go and return of round wires, uniform current, Neumann’s integral averaged over both sections',
      references: [
        'J. C. Maxwell, A Treatise on Electricity and Magnetism (1873), vol. 2, arts. 685-693',
        'F. W. Grover, Inductance Calculations (1946), ch. 5',
      ],
      relativeError: links_m / line_m,
      validity:
        'The two wires without the links at their ends (relativeError is what straight links would add). Direct current and ' +
        'low frequency: skin and proximity effect lower it, the more the closer the wires.',
    },
  };
}
