/**
 * A rising curve λ(i) through the origin as a pulse's samples are fitted by, in coordinates of one: λ in units of its largest, i of
 * the largest current.
 *
 * It is run along by s = (λ + i)/2 from 0 to 1, which gives a core's linear part and its saturation their room alike, where either λ or i
 * alone would crush one of them. What is free is f(s) = ln(di/dλ), a cubic spline: with p = 1/(1 + e^−f)
 *
 *   dλ/ds = 2(1 − p),   di/ds = 2p,
 *
 * so that λ(i) rises whatever f is, and dλ/di = e^−f is positive and as smooth as f. Its relative error is the error of f.
 */

/** Cells a spline interval in which the curve is integrated: Simpson's error is then below 1e-7 for a jump of f by 1 an interval. */
const CELLS = 4;

/** Weights of the four uniform cubic B-splines at a fraction u of their interval. */
function splineWeights(u: number): readonly [number, number, number, number] {
  const v = 1 - u;
  return [v ** 3 / 6, (3 * u ** 3 - 6 * u * u + 4) / 6, (3 * v ** 3 - 6 * v * v + 4) / 6, u ** 3 / 6];
}

/** Their derivatives with respect to u. */
function splineWeightSlopes(u: number): readonly [number, number, number, number] {
  const v = 1 - u;
  return [(-v * v) / 2, (3 * u * u - 4 * u) / 2, (4 * v - 3 * v * v) / 2, (u * u) / 2];
}

/** Weights at the ends and middles of an interval's cells. */
const CELL_WEIGHTS = Array.from({ length: 2 * CELLS + 1 }, (_, q) => splineWeights(q / (2 * CELLS)));

/** A curve and what of it is tabulated at its cells' ends. */
export interface Curve {
  readonly intervals: number;
  /** of f's B-splines, intervals + 3 */
  readonly coefficients: Float64Array;
  /** λ at the cells' ends, and dλ/ds = 2(1 − p) there */
  readonly linkage: Float64Array;
  readonly rate: Float64Array;
}

/** The curve whose f has these B-spline coefficients, on as many equal intervals of s as there are coefficients less three. */
export function curveOf(coefficients: Float64Array): Curve {
  const intervals = coefficients.length - 3;
  const cells = intervals * CELLS;
  const linkage = new Float64Array(cells + 1);
  const rate = new Float64Array(cells + 1);
  rate[0] = 2 * complement(combine(CELL_WEIGHTS[0]!, coefficients, 0));
  for (let cell = 0; cell < cells; cell++) {
    const interval = Math.floor(cell / CELLS);
    const q = 2 * (cell % CELLS);
    const middle = 2 * complement(combine(CELL_WEIGHTS[q + 1]!, coefficients, interval));
    const end = 2 * complement(combine(CELL_WEIGHTS[q + 2]!, coefficients, interval));
    rate[cell + 1] = end;
    linkage[cell + 1] = linkage[cell]! + (rate[cell]! + 4 * middle + end) / (6 * cells);
  }
  return { intervals, coefficients, linkage, rate };
}

/** 1 − p at f. */
function complement(f: number): number {
  return 1 / (1 + Math.exp(f));
}

function combine(weights: readonly number[], coefficients: Float64Array, first: number): number {
  return (
    weights[0]! * coefficients[first]! +
    weights[1]! * coefficients[first + 1]! +
    weights[2]! * coefficients[first + 2]! +
    weights[3]! * coefficients[first + 3]!
  );
}

/** The interval that s lies in and how far along it; s is kept within 0 to 1. */
function place(s: number, intervals: number): { interval: number; u: number } {
  const x = Math.min(Math.max(s, 0), 1) * intervals;
  const interval = Math.min(Math.floor(x), intervals - 1);
  return { interval, u: x - interval };
}

/** f = ln(di/dλ) at s; outside 0 to 1 its end value, as the curve goes on straight there. */
export function logSlopeAt({ intervals, coefficients }: Curve, s: number): number {
  const { interval, u } = place(s, intervals);
  return combine(splineWeights(u), coefficients, interval);
}

/** df/ds. */
export function logSlopeTurnAt({ intervals, coefficients }: Curve, s: number): number {
  const { interval, u } = place(s, intervals);
  return intervals * combine(splineWeightSlopes(u), coefficients, interval);
}

/** λ at s from 0 to 1: cubic between the cells' ends, whose slopes are known. */
export function linkageAt({ linkage, rate }: Curve, s: number): number {
  const { interval: cell, u } = place(s, linkage.length - 1);
  const h = 1 / (linkage.length - 1);
  return hermite(linkage[cell]!, h * rate[cell]!, linkage[cell + 1]!, h * rate[cell + 1]!, u);
}

/**
 * The same curve with λ and i in each other's place. Its `linkageAt` is the current, which as 2s − λ would lose its digits where λ is nearly
 * all of 2s.
 */
export function exchanged({ coefficients }: Curve): Curve {
  return curveOf(coefficients.map((f) => -f));
}

function hermite(y0: number, d0: number, y1: number, d1: number, u: number): number {
  const rise = y1 - y0;
  return y0 + u * (d0 + u * (3 * rise - 2 * d0 - d1 + u * (d0 + d1 - 2 * rise)));
}

/** s at λ, the inverse of `linkageAt`; beyond either end the curve goes on straight. The current there is 2s − λ. */
export function arcAt({ linkage, rate }: Curve, lambda: number): number {
  const cells = linkage.length - 1;
  if (lambda <= 0) return lambda / rate[0]!;
  if (lambda >= linkage[cells]!) return 1 + (lambda - linkage[cells]!) / rate[cells]!;
  let cell = 0;
  let beyond = cells;
  while (beyond - cell > 1) {
    const middle = (cell + beyond) >> 1;
    if (linkage[middle]! <= lambda) cell = middle;
    else beyond = middle;
  }
  const y0 = linkage[cell]!;
  const rise = linkage[beyond]! - y0;
  const d0 = rate[cell]! / cells;
  const d1 = rate[beyond]! / cells;
  // Newton from the straight line, halving where it would leave what is known to hold the root.
  let low = 0;
  let high = 1;
  let u = (lambda - y0) / rise;
  for (let iteration = 0; iteration < 40; iteration++) {
    const excess = u * (d0 + u * (3 * rise - 2 * d0 - d1 + u * (d0 + d1 - 2 * rise))) - (lambda - y0);
    const slope = d0 + u * (2 * (3 * rise - 2 * d0 - d1) + 3 * u * (d0 + d1 - 2 * rise));
    if (excess > 0) high = u;
    else low = u;
    let next = u - excess / slope;
    if (!(next >= low && next <= high)) next = (low + high) / 2;
    const step = Math.abs(next - u);
    u = next;
    if (step < 1e-13) break;
  }
  return (cell + u) / cells;
}

/**
 * How s's parts move with the coefficients: row by row for the cells' ends, ∂i/∂coefficient = −∂λ/∂coefficient at given s, which is
 * ∫₀ˢ 2p(1 − p)·B ds.
 */
export function sensitivityOf({ intervals, coefficients, rate }: Curve): Float64Array {
  const n = coefficients.length;
  const cells = intervals * CELLS;
  const table = new Float64Array((cells + 1) * n);
  for (let cell = 0; cell < cells; cell++) {
    const interval = Math.floor(cell / CELLS);
    const q = 2 * (cell % CELLS);
    const middle = 2 * complement(combine(CELL_WEIGHTS[q + 1]!, coefficients, interval));
    const row = (cell + 1) * n;
    table.copyWithin(row, row - n, row);
    for (let a = 0; a < 4; a++) {
      // 2p(1 − p) = r(1 − r/2) with r = 2(1 − p).
      const start = CELL_WEIGHTS[q]![a]! * rate[cell]! * (1 - rate[cell]! / 2);
      const half = CELL_WEIGHTS[q + 1]![a]! * middle * (1 - middle / 2);
      const end = CELL_WEIGHTS[q + 2]![a]! * rate[cell + 1]! * (1 - rate[cell + 1]! / 2);
      table[row + interval + a]! += (start + 4 * half + end) / (6 * cells);
    }
  }
  return table;
}

/** A row of `sensitivityOf` at s, straight between the cells' ends, times `scale`, into `row`. */
export function sensitivityAt(table: Float64Array, n: number, s: number, scale: number, row: Float64Array): void {
  const { interval: cell, u } = place(s, table.length / n - 1);
  const start = cell * n;
  const [before, after] = [scale * (1 - u), scale * u];
  for (let a = 0; a < n; a++) row[a] = before * table[start + a]! + after * table[start + n + a]!;
}

/** Adds the B-splines' weights at s to the row: how f(s) moves with the coefficients. */
export function addLogSlopeSensitivity(intervals: number, s: number, row: Float64Array): void {
  const { interval, u } = place(s, intervals);
  splineWeights(u).forEach((weight, a) => {
    row[interval + a]! += weight;
  });
}

/** The coefficients of the same f on twice as many intervals (the cubic spline's subdivision; Lane, Riesenfeld 1980, from memory). */
export function onTwiceTheIntervals(coefficients: Float64Array): Float64Array {
  const n = coefficients.length;
  const fine = new Float64Array(2 * n - 3);
  for (let k = 0; k < fine.length; k++) {
    const j = (k + 1) >> 1;
    fine[k] =
      k % 2 === 0
        ? (coefficients[j]! + coefficients[j + 1]!) / 2
        : (coefficients[j - 1]! + 6 * coefficients[j]! + coefficients[j + 1]!) / 8;
  }
  return fine;
}
