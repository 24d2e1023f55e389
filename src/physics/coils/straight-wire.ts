import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import type { Method } from '../method.ts';
import { roundBarSelf_m } from './round-bars.ts';

/** A straight round wire on its own; diameter of the bare conductor. */
export interface StraightWire {
  readonly shape: 'straight-wire';
  readonly length_m: number;
  readonly wireDiameter_m: number;
}

/**
 * Partial self-inductance in H of a straight round wire whose current fills its section evenly: (µ0/4π) times Neumann's
 * integral averaged over the section, exact for every length. For a long wire (µ0/2π) l [ln(2l/ρ) − 3/4 + 128ρ/45πl − …],
 * of which the textbook's form keeps the first two terms (E. B. Rosa 1908, formula (9), from memory).
 *
 * `relativeError` is what the ends leave open: how the current enters a section is not known over about a radius at each
 * end, where at most the wire's whole internal inductance, µ0/8π a metre, is in play.
 *
 * | domain                     | worst relative error | against                                                        |
 * |----------------------------|----------------------|----------------------------------------------------------------|
 * | length/diameter 1e-9..1e12 | 1e-15                | mpmath, one integral over coaxial loops (another reduction)    |
 */
export function straightWireInductance(coil: StraightWire): { inductance_H: number; method: Method } {
  const radius = coil.wireDiameter_m / 2;
  const integral_m = roundBarSelf_m(coil.length_m, radius);
  return {
    inductance_H: (VACUUM_PERMEABILITY_H_PER_M / (4 * Math.PI)) * integral_m,
    method: {
      name: 'Partial self-inductance of a round bar, uniform current, averaged over its section',
      references: [
        'E. B. Rosa, The self and mutual inductances of linear conductors, Bulletin of the Bureau of Standards 4 (1908) 301-344',
        'F. W. Grover, Inductance Calculations (1946), ch. 5',
      ],
      relativeError: coil.wireDiameter_m / 2 / integral_m,
      validity:
        'Partial inductance: part of a loop, to be added to the rest of the closed circuit and its mutual parts; on its own ' +
        'it stores no energy. Direct current and low frequency: skin effect takes up to µ0/8π (50 nH) a metre away.',
    },
  };
}
