import { type LegendreSeries, seriesIntegral, seriesValue } from '../numerics/legendre-series.ts';

/** A current held within ±limit: an accepted one may be beyond it by rounding. */
export function bounded(current_A: number, limit_A: number): number {
  return Math.max(-limit_A, Math.min(limit_A, current_A));
}

/** The last of an ascending, non-empty list that satisfies `started`; the first where none does. */
export function lastStarting<T>(list: readonly T[], started: (item: T) => boolean): T {
  let low = 0;
  let high = list.length;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (started(list[middle]!)) low = middle;
    else high = middle;
  }
  return list[low]!;
}

/**
 * The position x in [−1, 1] on a panel of σ-width `width` at which `elapsed_s` has passed since its start: Newton's iteration
 * on ∫ L_d dσ, which increases, kept inside its bracket by bisection. A time past the panel's end gives 1.
 */
export function positionAt(inductance: LegendreSeries, width: number, elapsed_s: number): number {
  const half = width / 2;
  let low = -1;
  let high = 1;
  if (elapsed_s <= 0) return low;
  if (elapsed_s >= half * seriesIntegral(inductance, 1)) return high;
  let x = Math.min(1, elapsed_s / (half * inductance[0]!) - 1);
  for (let step = 0; step < 100; step++) {
    const excess = half * seriesIntegral(inductance, x) - elapsed_s;
    if (excess > 0) high = x;
    else low = x;
    let next = x - excess / (half * seriesValue(inductance, x));
    if (!(next > low && next < high)) next = (low + high) / 2;
    if (Math.abs(next - x) <= 4e-16 * (1 + Math.abs(x)) || high - low <= 4e-16) return next;
    x = next;
  }
  return x;
}
