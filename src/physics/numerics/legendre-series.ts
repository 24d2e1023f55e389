/**
 * A smooth function on a panel, kept as the coefficients c of its Legendre series Σ c_k P_k(x), x from −1 to 1, by the
 * three-term recurrences of the NIST Digital Library of Mathematical Functions (DLMF) 18.9, https://dlmf.nist.gov/18.9.
 *
 * For the dozen or so terms of a panel the forward recurrence is stable (|P_k| ≤ 1 on the panel) and needs no table.
 */
export type LegendreSeries = Float64Array;

/** P_0(x) … P_degree(x); (k + 1) P_{k+1} = (2k + 1) x P_k − k P_{k−1}, DLMF 18.9.1. */
export function legendrePolynomials(degree: number, x: number): Float64Array {
  const values = new Float64Array(degree + 1);
  values[0] = 1;
  if (degree > 0) values[1] = x;
  for (let k = 1; k < degree; k++) values[k + 1] = ((2 * k + 1) * x * values[k]! - k * values[k - 1]!) / (k + 1);
  return values;
}

/** Σ c_k P_k(x). */
export function seriesValue(series: LegendreSeries, x: number): number {
  let previous = 1;
  let current = x;
  let sum = series[0]!;
  for (let k = 1; k < series.length; k++) {
    sum += series[k]! * current;
    [previous, current] = [current, ((2 * k + 1) * x * current - k * previous) / (k + 1)];
  }
  return sum;
}

/** Σ c_k P_k'(x), by P'_{k+1} = P'_{k−1} + (2k + 1) P_k. */
export function seriesSlope(series: LegendreSeries, x: number): number {
  let previous = 1;
  let current = x;
  let previousSlope = 0;
  let slope = 1;
  let sum = 0;
  for (let k = 1; k < series.length; k++) {
    sum += series[k]! * slope;
    [previousSlope, slope] = [slope, previousSlope + (2 * k + 1) * current];
    [previous, current] = [current, ((2 * k + 1) * x * current - k * previous) / (k + 1)];
  }
  return sum;
}

/** ∫ from −1 to x of Σ c_k P_k, by ∫ P_k = (P_{k+1}(x) − P_{k−1}(x))/(2k + 1) for k ≥ 1; exactly 2c_0 at x = 1. */
export function seriesIntegral(series: LegendreSeries, x: number): number {
  let previous = 1;
  let current = x;
  let sum = series[0]! * (1 + x);
  for (let k = 1; k < series.length; k++) {
    const next = ((2 * k + 1) * x * current - k * previous) / (k + 1);
    sum += (series[k]! * (next - previous)) / (2 * k + 1);
    [previous, current] = [current, next];
  }
  return sum;
}
