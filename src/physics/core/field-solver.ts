import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import type { MagnetisationCurve } from './magnetisation.ts';

/** Every closed form needs under 40; after this many the bracket is only halved, which always ends. */
const NEWTON_STEPS = 60;
const ITERATIONS = 300;

/**
 * The field H ≥ 0 in A/m at which length·H + reluctance·B(H) = total, all three not negative, length and reluctance not both zero: the
 * magnetic circuit of a core of `length` in m in series with `reluctance` in A/T, at `total` ampere-turns. With length 0 and
 * reluctance 1 it is the inverse H(B).
 *
 * Newton's method inside a bracket that closes at each step. It starts at the larger of two lower bounds, the core at its steepest
 * slope and the core saturated; where dB/dH falls with H, as in every closed form, it rises from there to the root without overshoot.
 * Where a step leaves the bracket (tables whose slope first rises), the bracket is halved.
 *
 * Throws `InvalidQuantity` (pointer '') where the numbers leave the range of 64-bit floats.
 *
 * | quantity | domain | worst relative error | against |
 * |---|---|---|---|
 * | B at the H found | µ 1 to 1e6, no gap to gap = core length, currents 1e-30 A to 1e6 × the flux limit | 5e-16 | mpmath, 130 digits |
 */
export function solveField(curve: MagnetisationCurve, length: number, reluctance: number, total: number): number {
  if (total === 0) return 0;
  if (reluctance === 0) return total / length;
  const mu0 = VACUUM_PERMEABILITY_H_PER_M;
  // µ0 H ≤ B ≤ µ0 H + Js bounds the field on both sides.
  let high = total / (length + mu0 * reluctance);
  let low = 0;
  const saturated = high - (reluctance * curve.saturationPolarisation_T) / (length + mu0 * reluctance);
  const linear = total / (length + reluctance * curve.initialPermeability_H_per_m);
  let h = Math.min(Math.max(linear, saturated), high);
  if (!(h > 0 && Number.isFinite(high))) {
    throw new InvalidQuantity('', `${total} ampere-turns (or tesla) are beyond what 64-bit numbers can work out here`);
  }
  for (let iteration = 0; iteration < ITERATIONS; iteration++) {
    const residual = total - (length * h + reluctance * curve.fluxDensity_T(h));
    if (residual > 0) low = h;
    else high = h;
    const next = h + residual / (length + reluctance * curve.differentialPermeability_H_per_m(h));
    if (Math.abs(next - h) <= Number.EPSILON * h || Math.abs(residual) <= Number.EPSILON * total) return next;
    // Newton may leave the bracket, or circle in it, where a table's slope rises or jumps: then halve.
    h = iteration < NEWTON_STEPS && next > low && next < high ? next : middle(low, high);
    if (h === low || h === high) return h;
  }
  return h;
}

/** Halfway in ratio where the ends are far apart, else in difference. */
function middle(low: number, high: number): number {
  return low > 0 && high > 4 * low ? Math.sqrt(low) * Math.sqrt(high) : low + (high - low) / 2;
}
