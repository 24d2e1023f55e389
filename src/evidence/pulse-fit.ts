import { factorise, logDeterminant, solveFactorised } from './pulse-cholesky.ts';
import { arcAt, type Curve, curveOf, logSlopeAt, sensitivityAt, sensitivityOf } from './pulse-curve.ts';

/**
 * Readings of a rising branch in coordinates of one, one or many samples each. λ comes from a sum over many samples and is taken
 * as known; the noise is the current's.
 */
export interface Readings {
  readonly linkage: Float64Array;
  readonly current: Float64Array;
  /** samples in a reading, over their mean */
  readonly weight: Float64Array;
}

/** What is believed of a curve before the readings, in the readings' noise variance as unit. */
export interface Prior {
  /** of the squared third differences of f's coefficients, μ */
  readonly smoothing: number;
  /** how rough each third difference may be beside the others: geometric mean one */
  readonly weights: Float64Array;
  /** of the squared shift of λ, and of the squared offset of the current */
  readonly shiftPrecision: number;
  readonly offsetPrecision: number;
}

/** Where the readings' zeros lie on the curve: λ of the curve is theirs plus the shift, theirs of i is the curve's plus the offset. */
export interface Zeros {
  readonly shift: number;
  readonly offset: number;
}

/** A penalised least-squares fit at one smoothing. */
export interface Fit {
  readonly curve: Curve;
  readonly zeros: Zeros;
  /** Σ weight·residual² */
  readonly residual: number;
  /** that and the prior's part: minimal */
  readonly objective: number;
  /** Cholesky's factor of half the objective's (Gauss-Newton) second derivative: coefficients, shift, offset */
  readonly factor: Float64Array;
  readonly logDeterminant: number;
  readonly iterations: number;
}

/** Third difference: its penalty leaves every quadratic f free, and an f that bends evenly is not called rough. */
export const DIFFERENCE = [-1, 3, -3, 1] as const;
export const ORDER = DIFFERENCE.length - 1;

const MAXIMUM_ITERATIONS = 12;
const HALVINGS = 12;
/** A relative fall of the objective by less than this ends the iteration: a hundredth of a unit of log likelihood for 400 readings. */
const SETTLED = 2e-5;
/** Beside the largest diagonal entry: keeps Cholesky going where the readings say nothing and the prior next to nothing. */
const RIDGE = 1e-14;

/** Parameters beside the coefficients. */
export const NUISANCES = 2;

/**
 * The curve and zeros that minimise Σ w (i − offset − i(λ + shift))² + prior, by Gauss-Newton steps, halved where they overshoot, from the
 * start given. Null where the normal equations break down.
 */
export function fitCurve(readings: Readings, prior: Prior, start: Float64Array, startZeros: Zeros): Fit | null {
  let curve = curveOf(start);
  let zeros = startZeros;
  let cost = costOf(readings, prior, curve, zeros);
  for (let iteration = 1; ; iteration++) {
    const { factor, step } = normalEquations(readings, prior, curve, zeros) ?? {};
    if (!factor || !step) return null;
    const next = halvedStep(readings, prior, curve, zeros, step, cost.objective);
    const fall = next ? cost.objective - next.cost.objective : 0;
    if (next) ({ curve, zeros, cost } = next);
    if (fall <= SETTLED * cost.objective || iteration === MAXIMUM_ITERATIONS) {
      const logDet = logDeterminant(factor, start.length + NUISANCES);
      return { curve, zeros, ...cost, factor, logDeterminant: logDet, iterations: iteration };
    }
  }
}

interface Cost {
  readonly residual: number;
  readonly objective: number;
}

function costOf({ linkage, current, weight }: Readings, prior: Prior, curve: Curve, { shift, offset }: Zeros): Cost {
  let residual = 0;
  for (let k = 0; k < linkage.length; k++) {
    const lambda = linkage[k]! + shift;
    const difference = current[k]! - offset - (2 * arcAt(curve, lambda) - lambda);
    residual += weight[k]! * difference * difference;
  }
  let rough = 0;
  for (let r = 0; r < prior.weights.length; r++)
    rough += prior.weights[r]! * thirdDifference(curve.coefficients, r) ** 2;
  const zeros = prior.shiftPrecision * shift * shift + prior.offsetPrecision * offset * offset;
  return { residual, objective: residual + prior.smoothing * rough + zeros };
}

/** Third difference number r of the coefficients. */
export function thirdDifference(coefficients: Float64Array, r: number): number {
  return coefficients[r + 3]! - coefficients[r]! + 3 * (coefficients[r + 1]! - coefficients[r + 2]!);
}

/**
 * The Gauss-Newton step. At given λ the current moves with a coefficient by (∂i/∂c at given s)/(1 − p), as s gives way, and with the
 * shift by di/dλ = p/(1 − p), with the offset by one.
 */
function normalEquations(
  { linkage, current, weight }: Readings,
  { smoothing, weights, shiftPrecision, offsetPrecision }: Prior,
  curve: Curve,
  { shift, offset }: Zeros,
): { factor: Float64Array; step: Float64Array } | null {
  const n = curve.coefficients.length;
  const size = n + NUISANCES;
  const matrix = new Float64Array(size * size);
  const gradient = new Float64Array(size);
  const row = new Float64Array(size);
  const table = sensitivityOf(curve);
  for (let k = 0; k < linkage.length; k++) {
    const lambda = linkage[k]! + shift;
    const s = arcAt(curve, lambda);
    const steepness = Math.exp(logSlopeAt(curve, s));
    sensitivityAt(table, n, s, 1 + steepness, row); // 1/(1 − p) = 1 + di/dλ
    row[n] = steepness;
    row[n + 1] = 1;
    const difference = current[k]! - offset - (2 * s - lambda);
    for (let a = 0; a < size; a++) {
      const weighted = weight[k]! * row[a]!;
      if (weighted === 0) continue; // coefficients of what lies beyond this reading
      gradient[a]! += weighted * difference;
      const at = a * size;
      for (let b = 0; b <= a; b++) matrix[at + b]! += weighted * row[b]!;
    }
  }
  for (let r = 0; r < weights.length; r++) {
    const stiffness = smoothing * weights[r]!;
    const difference = thirdDifference(curve.coefficients, r);
    for (let a = 0; a <= ORDER; a++) {
      gradient[r + a]! -= stiffness * DIFFERENCE[a]! * difference;
      for (let b = 0; b <= a; b++) matrix[(r + a) * size + r + b]! += stiffness * DIFFERENCE[a]! * DIFFERENCE[b]!;
    }
  }
  matrix[n * (size + 1)]! += shiftPrecision;
  gradient[n]! -= shiftPrecision * shift;
  matrix[(n + 1) * (size + 1)]! += offsetPrecision;
  gradient[n + 1]! -= offsetPrecision * offset;
  let largest = 0;
  for (let a = 0; a < n; a++) largest = Math.max(largest, matrix[a * (size + 1)]!);
  for (let a = 0; a < size; a++) matrix[a * (size + 1)]! += RIDGE * largest;
  if (!factorise(matrix, size)) return null;
  solveFactorised(matrix, size, gradient);
  return { factor: matrix, step: gradient };
}

/** The first of the step, its half, its quarter … that lowers the objective; null where none does. */
function halvedStep(
  readings: Readings,
  prior: Prior,
  curve: Curve,
  zeros: Zeros,
  step: Float64Array,
  objective: number,
): { curve: Curve; zeros: Zeros; cost: Cost } | null {
  const n = curve.coefficients.length;
  for (let halving = 0, scale = 1; halving < HALVINGS; halving++, scale /= 2) {
    const moved = curveOf(curve.coefficients.map((c, a) => c + scale * step[a]!));
    const movedZeros = { shift: zeros.shift + scale * step[n]!, offset: zeros.offset + scale * step[n + 1]! };
    const cost = costOf(readings, prior, moved, movedZeros);
    if (cost.objective < objective) return { curve: moved, zeros: movedZeros, cost };
  }
  return null;
}
