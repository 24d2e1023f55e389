import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { roundBarSelfLessAbreast_m } from './round-bars.ts';

/** One turn of round wire round a rectangle; sides along the centre line, bare diameter. */
export interface RectangularLoop {
  readonly shape: 'rectangular-loop';
  readonly sideA_m: number;
  readonly sideB_m: number;
  readonly wireDiameter_m: number;
}

/**
 * Inductance in H of a rectangle of round wire, uniform current, internal inductance included: sides at right angles have
 * no mutual inductance, so it is the go and return of sides A at distance B plus that of sides B at distance A, each
 * averaged over the sections. For thin wire it is Grover's closed form (Inductance Calculations 1946, ch. 8, from memory)
 *
 *     (µ0/π) [a ln(2a/ρ) + b ln(2b/ρ) + 2√(a² + b²) − a asinh(a/b) − b asinh(b/a) − 7(a + b)/4],
 *
 * but each of the two parts is positive and nothing cancels, also where one side is a millionth of the other.
 *
 * `relativeError`: bars that end at the corner's centre stand for the corner. Between a butted and a mitred corner lie
 * 0.22 ρ µ0/2π; a direct current that takes the inside of the bend shortens its way by up to about a radius. Both together
 * are bounded by four corners times (a half radius of µ0/2π, and a radius of the loop's way).
 * Throws InvalidQuantity at /sideA_m or /sideB_m where the wire would fill the opening.
 *
 * | domain                                   | worst relative error | against                                                   |
 * |------------------------------------------|----------------------|-----------------------------------------------------------|
 * | side ratio 1..1e6, wire/side 1e-9..0.9   | 1e-14                | mpmath at 50 digits (thin), Hankel's integral (thick)     |
 */
export function rectangularLoopInductance(coil: RectangularLoop): { inductance_H: number; method: Method } {
  const { sideA_m, sideB_m, wireDiameter_m } = coil;
  for (const [pointer, side] of [
    ['/sideA_m', sideA_m],
    ['/sideB_m', sideB_m],
  ] as const) {
    if (side <= wireDiameter_m) {
      throw new InvalidQuantity(pointer, 'the wire fills the loop: a side must be longer than the wire diameter');
    }
  }
  const radius = wireDiameter_m / 2;
  const loop_m =
    roundBarSelfLessAbreast_m(sideA_m, radius, sideB_m) + roundBarSelfLessAbreast_m(sideB_m, radius, sideA_m);
  return {
    inductance_H: (VACUUM_PERMEABILITY_H_PER_M / (2 * Math.PI)) * loop_m,
    method: {
      name: 'Rectangle of four round bars, uniform current, averaged over their sections',
      references: [
        'E. B. Rosa and F. W. Grover, Formulas and Tables for the Calculation of Mutual and Self-Induction, NBS Scientific Paper 169 (1916)',
        'F. W. Grover, Inductance Calculations (1946), ch. 8',
      ],
      relativeError: (2 * radius) / loop_m + (2 * radius) / (sideA_m + sideB_m),
      validity:
        'Sharp corners (relativeError covers what they do); non-magnetic wire, direct current and low frequency: skin effect ' +
        'takes up to µ0/8π (50 nH) a metre away.',
    },
  };
}
