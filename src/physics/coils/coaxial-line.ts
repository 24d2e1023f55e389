import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';

/** A coaxial line: solid inner conductor, return through the shield. Without an outer diameter the shield is infinitely thin. */
export interface CoaxialLine {
  readonly shape: 'coaxial-line';
  readonly length_m: number;
  readonly innerDiameter_m: number;
  readonly shieldInnerDiameter_m: number;
  readonly shieldOuterDiameter_m?: number;
}

/**
 * Internal inductance of a tube with its return inside it, uniform current, in units of µ0/2π a metre (inner radius b, outer c):
 *
 *     c⁴/(c² − b²)² ln(c/b) − (3c² − b²)/4(c² − b²),
 *
 * the energy ∫ B²/2µ0 of B = (µ0 I/2πr)(c² − r²)/(c² − b²). Of a thin shield, where it is (c − b)/3b, all but the last digits
 * cancel; with w = (c² − b²)/(c² + b²), ln(c/b) = atanh w = w + w³ A, it is (w/4) [1 + (1 + w)² A], every term positive.
 */
function shieldInternal(inner: number, outer: number): number {
  const ratio = inner / outer;
  const w = (((outer - inner) / outer) * (1 + ratio)) / (1 + ratio * ratio);
  let excess = 0;
  if (w < 0.5) {
    // A = 1/3 + w²/5 + w⁴/7 + …: 27 terms reach 1e-17 at w = 0.5.
    for (let k = 26; k >= 0; k--) excess = excess * w * w + 1 / (2 * k + 3);
  } else {
    excess = (Math.log(outer / inner) - w) / (w * w * w);
  }
  return (w / 4) * (1 + (1 + w) * (1 + w) * excess);
}

/**
 * Inductance in H of a coaxial line with uniform current in both conductors (direct current and low frequency):
 * (µ0/2π) l [ln(b/a) + 1/4 + the shield's internal part], the energy of the TEM field of a long line.
 *
 * `relativeError` is what the two ends do: the same conductors cut off square and summed by Neumann's integral differ by
 * −0.73 (µ0/2π) b in the limit of a thin inner conductor in a thin shield, by less than (µ0/2π) times the shield's outer
 * radius in every case tried; that is the bound.
 * Throws InvalidQuantity at /shieldInnerDiameter_m or /shieldOuterDiameter_m when the conductors don't fit in each other.
 *
 * | domain                                                       | worst relative error | against                           |
 * |--------------------------------------------------------------|----------------------|-----------------------------------|
 * | b/a − 1 from 1e-12 to 1e6, c/b − 1 from 1e-12 to 1e6         | 2e-15                | mpmath, the energy ∫ B²/2µ0 dV    |
 */
export function coaxialLineInductance(coil: CoaxialLine): { inductance_H: number; method: Method } {
  const { length_m, innerDiameter_m, shieldInnerDiameter_m, shieldOuterDiameter_m } = coil;
  if (shieldInnerDiameter_m <= innerDiameter_m) {
    throw new InvalidQuantity('/shieldInnerDiameter_m', 'the shield must be wider inside than the inner conductor');
  }
  if (shieldOuterDiameter_m !== undefined && shieldOuterDiameter_m <= shieldInnerDiameter_m) {
    throw new InvalidQuantity('/shieldOuterDiameter_m', 'the shield must be wider outside than inside');
  }
  const gap = (shieldInnerDiameter_m - innerDiameter_m) / innerDiameter_m;
  const shield = shieldOuterDiameter_m === undefined ? 0 : shieldInternal(shieldInnerDiameter_m, shieldOuterDiameter_m);
  const perLength = Math.log1p(gap) + 0.25 + shield;
  return {
    inductance_H: (VACUUM_PERMEABILITY_H_PER_M / (2 * Math.PI)) * length_m * perLength,
    method: {
      name: 'Energy of the field of a long coaxial line, uniform current',
      references: [
        'F. W. Grover, Inductance Calculations (1946), ch. 21',
        'J. C. Maxwell, A Treatise on Electricity and Magnetism (1873), vol. 2, art. 686',
      ],
      relativeError: (shieldOuterDiameter_m ?? shieldInnerDiameter_m) / 2 / (length_m * perLength),
      validity:
        'A line long against its diameter (relativeError is what the ends do), non-magnetic conductors, direct current and low ' +
        'frequency: skin effect takes the internal parts away.',
    },
  };
}
