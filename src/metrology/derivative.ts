/**
 * Derivatives of a function that is known only by its values, by differences extrapolated to step zero (L. F.
 * Richardson 1911; C. J. F. Ridders, Advances in Engineering Software 4 (1982) 75-76, for keeping the entry with the
 * least estimated error).
 */

/** Values of a vector function at x; null where x is outside its domain. */
export type VectorFunction = (x: number) => readonly number[] | null;

export type DifferenceScheme = 'central' | 'forward' | 'backward';

export interface Derivatives {
  /** One for each component of the function. */
  readonly values: Float64Array;
  /** Estimated absolute error of each, rounding included. */
  readonly errors: Float64Array;
  readonly scheme: DifferenceScheme;
}

/** Quarterings of the first step after which a side that still has no value counts as outside the domain. */
const MOST_QUARTERINGS = 10;
/**
 * Rows of the extrapolation table. Smooth functions need 4 to 7, one with a bend nearby as many as it takes to get past
 * it.
 */
const MOST_ROWS = 26;
/** Columns of it: beyond, rounding only. */
const MOST_COLUMNS = 8;
const GOOD_ENOUGH = 1e-13;
/** How far the slope may differ from the plain difference quotient over `scale` before it is looked at again. */
const SUSPICIOUS = 1e-3;

/**
 * df/dx of every component at `x`, where f(x) = `here`. Both sides are used where both are in the domain, at least at
 * 2⁻²⁰ of the step; else the one that is. Null where neither is.
 *
 * `step` > 0 is the largest step, of the order of the scale over which f changes or larger; `scale` > 0 the distance
 * over which the derivative is going to stand for f. Where f swings so fast that steps far beyond `scale` agree with
 * each other by accident, the quotient over `scale` tells, and the steps start again from there.
 *
 * | function | worst relative error beyond the rounding of f and x | against |
 * |---|---|---|
 * | exp, ln, √, 1/x, x¹⁰, 1/(1 − x), exp(−x²), \|x\| from 1e-9 to 1e9, step \|x\|/8, central | 4e-12 | closed form |
 * | the same, one-sided | 1e-10 | closed form |
 */
export function derivatives(
  f: VectorFunction,
  x: number,
  here: readonly number[],
  { step, scale }: { readonly step: number; readonly scale: number },
): Derivatives | null {
  const wide = derivativesFrom(f, x, here, step);
  if (!wide || scale >= step) return wide;
  const quotients = differencing(f, x, here, wide.scheme)(scale);
  const suspect = quotients?.some((quotient, i) => {
    const rounding = (8 * Number.EPSILON * (Math.abs(here[i]!) + Math.abs(quotient * x))) / scale;
    return Math.abs(quotient - wide.values[i]!) > SUSPICIOUS * Math.abs(wide.values[i]!) + rounding;
  });
  if (!suspect) return wide;
  const narrow = derivativesFrom(f, x, here, scale);
  // A model that is itself noisy at this scale says nothing better.
  const convincing = narrow?.errors.every((error, i) => error <= SUSPICIOUS * Math.abs(narrow.values[i]!));
  return narrow && convincing ? narrow : wide;
}

function derivativesFrom(f: VectorFunction, x: number, here: readonly number[], step: number): Derivatives | null {
  for (const scheme of ['central', 'forward', 'backward'] as const) {
    const difference = differencing(f, x, here, scheme);
    for (let quarterings = 0, h = step; quarterings <= MOST_QUARTERINGS && x + h !== x; quarterings++, h /= 4) {
      const first = difference(h);
      if (first) return extrapolate(difference, first, x, here, h, scheme);
    }
  }
  return null;
}

type Difference = (h: number) => Float64Array | null;

/** Difference quotients with step h, or null where one of their points has no value. */
function differencing(f: VectorFunction, x: number, here: readonly number[], scheme: DifferenceScheme): Difference {
  return (h) => {
    const right = x + h;
    const left = x - h;
    const above = scheme === 'backward' ? here : f(right);
    const below = above && (scheme === 'forward' ? here : f(left));
    if (!above || !below) return null;
    // The step as doubles took it, so that x ± h being rounded costs nothing.
    const span = (scheme === 'backward' ? x : right) - (scheme === 'forward' ? x : left);
    const quotients = new Float64Array(here.length);
    for (let i = 0; i < here.length; i++) quotients[i] = (above[i]! - below[i]!) / span;
    return quotients.every(Number.isFinite) ? quotients : null;
  };
}

function extrapolate(
  difference: Difference,
  first: Float64Array,
  x: number,
  here: readonly number[],
  step: number,
  scheme: DifferenceScheme,
): Derivatives {
  // The error of a central difference is a series in h², of a one-sided one in h.
  const ratio = scheme === 'central' ? 4 : 2;
  const values = first.slice();
  const errors = new Float64Array(here.length).fill(Number.POSITIVE_INFINITY);
  let rows = Array.from(first, (quotient) => [quotient]);
  let sinceImproved = 0;
  for (let n = 1, h = step / 2; n < MOST_ROWS; n++, h /= 2) {
    const quotients = difference(h);
    if (!quotients) break;
    let finished = true;
    let improved = false;
    rows = rows.map((previous, i) => {
      const row = [quotients[i]!];
      const rounding = (Number.EPSILON * (Math.abs(here[i]!) + Math.abs(quotients[i]! * x))) / h;
      for (let column = 1; column <= Math.min(n, MOST_COLUMNS); column++) {
        const before = row[column - 1]!;
        const above = previous[column - 1]!;
        const better = before + (before - above) / (ratio ** column - 1);
        row.push(better);
        const error = Math.max(Math.abs(better - before), Math.abs(better - above)) + rounding;
        if (error < errors[i]!) {
          errors[i] = error;
          values[i] = better;
          improved = true;
        }
      }
      // Smaller steps can only add rounding once it outweighs what is already known.
      if (errors[i]! > GOOD_ENOUGH * Math.abs(values[i]!) && errors[i]! > 2 * rounding) finished = false;
      return row;
    });
    sinceImproved = improved ? 0 : sinceImproved + 1;
    if (finished || (sinceImproved >= 6 && errors.every((error, i) => error <= 1e-6 * Math.abs(values[i]!)))) break;
  }
  return { values, errors, scheme };
}
