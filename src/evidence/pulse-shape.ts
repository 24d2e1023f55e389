/**
 * What is known of a core's inductance over current beside that it is smooth: it has one maximum, at zero current or after the
 * rise that some materials show at first, and only falls from there. Noise is not allowed to say otherwise; readings are.
 */

/** Squared distance in standard deviations to which a shape is taken to be what the readings mean: beyond it they contradict it. */
const CONTRADICTED = 6;
const SWEEPS = 200;
/** In standard deviations of a difference: what of a wrong direction may stay. */
const SETTLED = 1e-6;

/**
 * Coefficients of f = ln(di/dλ) moved as little as their covariance (size × size, row-major, of which they are the first) lets them to where f
 * only rises (dλ/di only falls), or else first falls and then rises from its least coefficient on; as they are where neither is
 * within what their uncertainty allows. Parameters beyond the coefficients move along.
 */
export function unimodal(parameters: Float64Array, covariance: Float64Array, coefficients: number): Float64Array {
  let least = 0;
  for (let j = 1; j < coefficients; j++) if (parameters[j]! < parameters[least]!) least = j;
  for (const turn of least === 0 ? [0] : [0, least]) {
    const moved = directed(parameters, covariance, coefficients, turn);
    if (moved) return moved;
  }
  return parameters;
}

/**
 * The nearest parameters, in the metric of their covariance, whose coefficients fall up to number `turn` and rise from it: Hildreth's dual
 * coordinate ascent (C. Hildreth, Naval Res. Logist. Quart. 4 (1957) 79-85, from memory). Null where they are too far.
 */
function directed(
  parameters: Float64Array,
  covariance: Float64Array,
  coefficients: number,
  turn: number,
): Float64Array | null {
  const size = parameters.length;
  const moved = parameters.slice();
  const multipliers = new Float64Array(coefficients - 1);
  const sign = (j: number) => (j < turn ? -1 : 1);
  const start = Float64Array.from(multipliers, (_, j) => sign(j) * (parameters[j + 1]! - parameters[j]!));
  const variance = (j: number) =>
    covariance[(j + 1) * size + j + 1]! + covariance[j * size + j]! - 2 * covariance[(j + 1) * size + j]!;
  const variances = Float64Array.from(multipliers, (_, j) => Math.max(variance(j), Number.MIN_VALUE));
  for (let sweep = 0; sweep < SWEEPS; sweep++) {
    let largest = 0;
    for (let j = 0; j < multipliers.length; j++) {
      const difference = sign(j) * (moved[j + 1]! - moved[j]!);
      const step = Math.max(-difference / variances[j]!, -multipliers[j]!);
      if (step === 0) continue;
      multipliers[j]! += step;
      for (let a = 0; a < size; a++) {
        moved[a]! += sign(j) * step * (covariance[a * size + j + 1]! - covariance[a * size + j]!);
      }
      largest = Math.max(largest, Math.abs(step) * Math.sqrt(variances[j]!));
    }
    // At the solution the squared distance is −Σ multiplier·difference at the start; before it that only grows.
    let distance = 0;
    for (let j = 0; j < multipliers.length; j++) distance -= multipliers[j]! * start[j]!;
    if (distance > CONTRADICTED) return null;
    if (largest < SETTLED) return moved;
  }
  return null;
}
