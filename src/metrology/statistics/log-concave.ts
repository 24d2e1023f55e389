/**
 * Integrals of log-concave functions, which the densities here and their products with normal tails all are: one peak, from which the
 * function falls faster and faster. Every term is positive, so a far tail comes out with as many digits as the middle.
 */
import { integrate } from '../../physics/numerics/quadrature.ts';

const ORDER = 16;
/** Beyond the point where the function has fallen to e⁻⁴² of its peak, less than 1e-18 of the integral is left. */
const NEGLIGIBLE = -42;
/** e⁻⁷⁸⁰ is far below the smallest double. */
const UNDERFLOW = -780;
/** Between a panel and its two halves. The halves' own error is then far below rounding: each has 2⁻³² of the panel's. */
const AGREEMENT = 1e-13;
/** Some twenty times what the worst of the integrals here took. */
const MOST_HALVINGS = 1000;

interface Panel {
  readonly start: number;
  readonly end: number;
  /** its integral by one rule */
  readonly whole: number;
}

/**
 * ∫ exp(logarithm(x)) dx between `from` and `to` (which may be infinite), where `mode` is the place in [from, to] at which the concave
 * `logarithm` is greatest, roughly. Adaptive Gauss-Legendre quadrature between it, the ends and the `corners`: places around which the
 * function bends on a scale much shorter than its own width, and which equally spaced points could miss. `noise` is what rounding
 * leaves open in `logarithm`: panels and their halves can't agree better.
 * Throws `RangeError` where they don't agree in the end.
 */
export function integrateLogConcave(
  logarithm: (x: number) => number,
  mode: number,
  from: number,
  to: number,
  corners: readonly number[] = [],
  noise = 0,
): number {
  if (!(from < to)) return 0;
  const peak = logarithm(mode);
  if (peak < UNDERFLOW) return 0;
  const relative = (x: number) => Math.exp(logarithm(x) - peak);
  const left = whereNegligible(logarithm, mode, from, peak);
  const right = whereNegligible(logarithm, mode, to, peak);
  const inner = [mode, ...corners].filter((x) => x > left && x < right).sort((a, b) => a - b);
  const edges = [left, ...inner, right];
  const panels = inner.concat(right).map((end, i): Panel => {
    const start = edges[i]!;
    return { start, end, whole: integrate(relative, start, end, ORDER) };
  });
  const tolerance = AGREEMENT * panels.reduce((sum, { whole }) => sum + whole, 0);
  return Math.exp(peak) * refined(relative, panels, tolerance, noise);
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

/** Sum over the panels, each halved until its halves agree with it. */
function refined(f: (x: number) => number, panels: readonly Panel[], tolerance: number, noise: number): number {
  const waiting = [...panels];
  let total = 0;
  for (let halvings = 0; waiting.length > 0; halvings++) {
    if (halvings > MOST_HALVINGS) throw new RangeError('the integrand is not smooth enough to integrate');
    const { start, end, whole } = waiting.pop()!;
    const middle = (start + end) / 2;
    const lower = integrate(f, start, middle, ORDER);
    const upper = integrate(f, middle, end, ORDER);
    if (Math.abs(lower + upper - whole) <= tolerance + noise * whole) total += lower + upper;
    else waiting.push({ start, end: middle, whole: lower }, { start: middle, end, whole: upper });
  }
  return total;
}
