/**
 * Integrals of log-concave functions, which the densities here and their products with normal tails all are: one peak, from which the
 * function falls faster and faster. Every term is positive, so a far tail comes out with as many digits as the middle.
 */
import { integrate } from '../../physics/numerics/quadrature.ts';

const ORDER = 16;
/** Beyond the point where the function has fallen to e⁻⁴² of its peak, less than 1e-18 of the integral is left. */
const NEGLIGIBLE = -42;
/** Between a panel and its two halves. The halves' own error is then far below rounding: each has 2⁻³² of the panel's. */
const AGREEMENT = 1e-13;

/**
 * ∫ exp(logarithm(x)) dx between `from` and `to` (which may be infinite), where `mode` is the place in [from, to] at which the concave
 * `logarithm` is greatest, roughly. Adaptive Gauss-Legendre quadrature between it, the ends and the `corners`: places around which the
 * function bends on a scale much shorter than its own width, and which equally spaced points could miss.
 */
export function integrateLogConcave(
  logarithm: (x: number) => number,
  mode: number,
  from: number,
  to: number,
  corners: readonly number[] = [],
): number {
  if (!(from < to)) return 0;
  const peak = logarithm(mode);
  const relative = (x: number) => Math.exp(logarithm(x) - peak);
  const left = whereNegligible(logarithm, mode, from, peak);
  const right = whereNegligible(logarithm, mode, to, peak);
  const inner = [mode, ...corners].filter((x) => x > left && x < right).sort((a, b) => a - b);
  const edges = [left, ...inner, right];
  const panels = inner.concat(right).map((end, i) => ({
    start: edges[i]!,
    end,
    whole: integrate(relative, edges[i]!, end, ORDER),
  }));
  const tolerance = AGREEMENT * panels.reduce((sum, { whole }) => sum + whole, 0);
  const total = panels.reduce((sum, { start, end, whole }) => sum + refined(relative, start, end, whole, tolerance), 0);
  return Math.exp(peak) * total;
}

/** `bound`, or a nearer point beyond which the function is negligible. */
function whereNegligible(logarithm: (x: number) => number, mode: number, bound: number, peak: number): number {
  const negligible = (x: number) => logarithm(x) - peak < NEGLIGIBLE;
  if (Number.isFinite(bound) && !negligible(bound)) return bound;
  const direction = bound < mode ? -1 : 1;
  let inside = 0;
  let outside = Math.max(Math.abs(mode), 1e-12) * 2 ** -24;
  // Stops at the bound at the latest, where it is finite, and else because every concave function that isn't constant falls for ever.
  while (outside < Math.abs(bound - mode) && !negligible(mode + direction * outside))
    [inside, outside] = [outside, 2 * outside];
  outside = Math.min(outside, Math.abs(bound - mode));
  for (let halving = 0; halving < 5; halving++) {
    const middle = (inside + outside) / 2;
    if (negligible(mode + direction * middle)) outside = middle;
    else inside = middle;
  }
  return mode + direction * outside;
}

function refined(f: (x: number) => number, a: number, b: number, whole: number, tolerance: number, depth = 40): number {
  const middle = (a + b) / 2;
  const lower = integrate(f, a, middle, ORDER);
  const upper = integrate(f, middle, b, ORDER);
  if (Math.abs(lower + upper - whole) <= tolerance || depth === 0) return lower + upper;
  return refined(f, a, middle, lower, tolerance, depth - 1) + refined(f, middle, b, upper, tolerance, depth - 1);
}
