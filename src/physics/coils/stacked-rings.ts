import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { ellipticKMinusE } from '../numerics/elliptic.ts';
import { nagaokaCoefficient } from './nagaoka.ts';
import { equalRingsMutualInductance_H, equivalentFilaments, roundRingSelfInductance_H } from './ring-section.ts';

/** From this many pitches on, the sum over rings is an integral and end corrections; below it every ring counts. */
const NEAR = 14;

/** Weights of Gauss's end correction (mean differences 1, 3, 5, 7), on f(x + j) − f(x − j), j = 1 … 4. */
const END_WEIGHTS = endWeights();

function endWeights(): readonly number[] {
  const differences = [[1 / 2], [-1, 1 / 2], [5 / 2, -2, 1 / 2], [-7, 7, -3, 1 / 2]];
  const coefficients = [1 / 12, -11 / 720, 191 / 60480, -2497 / 3628800];
  const weights = [0, 0, 0, 0];
  differences.forEach((row, order) => {
    row.forEach((value, j) => {
      weights[j]! += coefficients[order]! * value;
    });
  });
  return weights;
}

/**
 * Inductance in H of `turns` equal coaxial rings of round wire in series, `pitch_m` apart, uniform current density:
 *
 *     L = N·M₀ + 2 Σ (N − m) M(m·pitch),   m = 1, 2, … < N,
 *
 * with M₀ the self-inductance of one ring and M the mutual inductance of two. Where N is not whole the sum stays as it is,
 * which makes it continuous: the pairs of points m turns apart on a winding of N turns are N − m turns long.
 *
 * Beyond `NEAR` pitches M is smooth on the scale of the pitch, so the rest of the sum is ∫ (N − m) M dm, a difference of
 * current-sheet inductances, with Gauss's end corrections. So the time does not grow with the number of turns.
 *
 * | turns     | a/ρ      | pitch/wire | worst relative error | against                                              |
 * |-----------|----------|------------|----------------------|------------------------------------------------------|
 * | 1 to 1000 | 1.05     | 1 to 10    | 1e-3                 | ring sum, quadrature over both sections of each pair |
 * | 1 to 1000 | 3        | 1 to 10    | 1e-5                 | the same                                             |
 * | 1 to 1000 | 10       | 1 to 10    | 1e-7                 | the same                                             |
 * | to 4000   | 3 to 1e4 | 1 to 10    | 2e-10                | the plain sum of the same M, without the integral    |
 */
export function stackedRingsInductance_H(
  turns: number,
  pitch_m: number,
  radius_m: number,
  wireRadius_m: number,
): number {
  const filaments = equivalentFilaments(radius_m, wireRadius_m);
  const weighted = (m: number) => (turns - m) * equalRingsMutualInductance_H(filaments, m * pitch_m);
  // The last ring at a distance below N: its weight N − m is not zero.
  const last = Math.ceil(turns) - 1;
  let pairs = 0;
  if (last <= 2 * NEAR) {
    for (let m = 1; m <= last; m++) pairs += weighted(m);
  } else {
    for (let m = 1; m < NEAR; m++) pairs += weighted(m);
    pairs += ringIntegral(turns, NEAR, last, pitch_m, filaments);
    pairs += (weighted(NEAR) + weighted(last)) / 2 + endCorrection(weighted, last) - endCorrection(weighted, NEAR);
  }
  return turns * roundRingSelfInductance_H(radius_m, wireRadius_m) + 2 * pairs;
}

/** Σ − ∫ − ½(first + last), one end's share: f'/12 − f'''/720 + …, by differences of f at whole distances. */
function endCorrection(f: (m: number) => number, end: number): number {
  let sum = 0;
  END_WEIGHTS.forEach((weight, j) => {
    sum += weight * (f(end + j + 1) - f(end - j - 1));
  });
  return sum;
}

/**
 * ∫ (N − m) M(m·pitch) dm from `from` to `to`. M is G'' where G(z) is half the inductance of a current sheet of length z with
 * one turn a metre, so by parts it is [(N − m) G'/pitch + G/pitch²] at `to` less the same at `from`.
 */
function ringIntegral(
  turns: number,
  from: number,
  to: number,
  pitch_m: number,
  filaments: { readonly radius_m: number; readonly offset_m: number },
): number {
  const { radius_m, offset_m } = filaments;
  const over = (f: (radius_m: number, z: number) => number, z: number) =>
    f(radius_m, z) / 2 + (f(radius_m, z - 2 * offset_m) + f(radius_m, z + 2 * offset_m)) / 4;
  const antiderivative = (m: number) =>
    (turns - m) * (over(sheetSlope, m * pitch_m) / pitch_m) + over(halfSheet, m * pitch_m) / pitch_m / pitch_m;
  return antiderivative(to) - antiderivative(from);
}

/** G(z) = ½ µ0 π a² z K(2a/z), K Nagaoka's coefficient. */
function halfSheet(radius_m: number, z: number): number {
  return (VACUUM_PERMEABILITY_H_PER_M / 2) * Math.PI * radius_m * radius_m * z * nagaokaCoefficient((2 * radius_m) / z);
}

/** G'(z) = ½ µ0 z D (K − E) with D = √(4a² + z²), k = 2a/D: a ring at the end of a sheet of its own radius. */
function sheetSlope(radius_m: number, z: number): number {
  const diameter = 2 * radius_m;
  const diagonal = Math.sqrt(diameter * diameter + z * z);
  const modulus = diameter / diagonal;
  return (VACUUM_PERMEABILITY_H_PER_M / 2) * z * diagonal * ellipticKMinusE(z / diagonal, modulus * modulus);
}
