import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { roundRingSelfInductance_H } from './ring-section.ts';

/** A ring of round wire, `diameter_m` of its centre line; with `turns` a bundle of that many turns as thick as `wireDiameter_m`. */
export interface RoundLoop {
  readonly shape: 'round-loop';
  readonly diameter_m: number;
  readonly wireDiameter_m: number;
  readonly turns?: number;
}

/**
 * Low-frequency inductance in H of a round loop in air, uniform current density (`roundRingSelfInductance_H`, to rounding for
 * every proportion). A bundle of N turns that share the section evenly has N² of it.
 *
 * Throws `InvalidQuantity` at `/wireDiameter_m` where the section would reach the axis.
 */
export function roundLoopInductance(coil: RoundLoop): { inductance_H: number; method: Method } {
  const { diameter_m, wireDiameter_m, turns = 1 } = coil;
  if (wireDiameter_m >= diameter_m) {
    throw new InvalidQuantity('/wireDiameter_m', `must be less than the loop's diameter of ${diameter_m} m`);
  }
  const inductance_H = turns * turns * roundRingSelfInductance_H(diameter_m / 2, wireDiameter_m / 2);
  return { inductance_H, method: loopMethod(diameter_m, wireDiameter_m, turns) };
}

function loopMethod(diameter_m: number, wireDiameter_m: number, turns: number): Method {
  const ratio = wireDiameter_m / diameter_m;
  // Direct current falls as 1/r across a bent wire: up to 0.75 ε² less inductance, by quadrature over the section for ε to 0.99.
  // A bundle's current follows its wires instead, and is spread evenly.
  const section = turns === 1 ? 0.75 * ratio ** 2 : 0;
  // Round wires apart instead of one even section: µ0 a N (ln(spacing/bare diameter) + 0.155), Rosa and Grover, NBS Scientific
  // Paper 169 (from memory), against µ0 a N² (ln 8/ε − 1.75); 0.85 is spacing to twice the bare diameter.
  const bundling = turns === 1 ? 0 : 0.85 / turns / (Math.log(8 / ratio) - 1.75);
  return {
    name: 'ring of round section, uniform current density',
    references: [
      'E. B. Rosa and F. W. Grover, NBS Scientific Paper 169 (1916)',
      'NIST Digital Library of Mathematical Functions, 14.19 (toroidal functions)',
    ],
    relativeError: section + bundling,
    validity:
      turns === 1
        ? 'closed ring in air, current spread over the wire (low frequency); leads and gap not included'
        : 'bundle of round section filled evenly by its turns, wires spaced to twice their bare diameter, air, low frequency',
  };
}
