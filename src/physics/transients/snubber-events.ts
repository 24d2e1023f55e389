import { type LegendreSeries, seriesSlope, seriesValue } from '../numerics/legendre-series.ts';
import { findRoot } from '../numerics/roots.ts';
import { positionAt } from './panel.ts';
import type { SnubberLoop } from './snubber-loop.ts';
import { elapsedAt, type SnubberEquation, type SnubberStep } from './snubber-step.ts';

/** A step with where it stands in the course. */
export interface TimedStep extends SnubberStep {
  readonly start_s: number;
  /** ∫ i dt before the step in A·s, ∫ i² dt in A²·s. */
  readonly chargeBefore: number;
  readonly squareBefore: number;
}

/** Zeros of the slope of `series` on the step, ascending. */
function turningPoints(series: LegendreSeries): number[] {
  const found: number[] = [];
  const grid = 16;
  let [x, slope] = [-1, seriesSlope(series, -1)];
  for (let k = 1; k <= grid; k++) {
    const next = -Math.cos((Math.PI * k) / grid);
    const nextSlope = seriesSlope(series, next);
    if (slope * nextSlope < 0) found.push(findRoot((at) => seriesSlope(series, at), x, next));
    [x, slope] = [next, nextSlope];
  }
  return found;
}

/** Pieces of the step on which the current goes one way, with the current at their ends. */
function* pieces(step: SnubberStep): Generator<{ from: number; to: number; first: number; last: number }> {
  let [from, first] = [-1, step.start.current_A];
  for (const to of turningPoints(step.current)) {
    const last = seriesValue(step.current, to);
    yield { from, to, first, last };
    [from, first] = [to, last];
  }
  yield { from, to: 1, first, last: step.end.current_A };
}

/** Where the current is at `level` on a piece that passes it. */
function positionOf(step: SnubberStep, level: number, { from, to }: { from: number; to: number }): number {
  const f = (x: number) => seriesValue(step.current, x) - level;
  // The series meets the step's ends to its tolerance only, so a level at an end may not be bracketed.
  const [before, after] = [f(from), f(to)];
  if (before * after < 0) return findRoot(f, from, to);
  return Math.abs(before) < Math.abs(after) ? from : to;
}

/** The width at which a step's current first passes one of `corners`, null where it passes none. */
export function widthToCorner(
  { resistance_ohm }: SnubberEquation,
  step: SnubberStep,
  corners: readonly number[],
): number | null {
  // From a corner that the step starts on it has to move away first.
  const margin = 1e-11 * step.largestCurrent_A;
  for (const piece of pieces(step)) {
    const passed = corners.filter(
      (corner) => (corner - piece.first) * (piece.last - corner) > 0 && Math.abs(corner - piece.first) > margin,
    );
    if (passed.length === 0) continue;
    const nearest = passed.reduce((a, b) => (Math.abs(b - piece.first) < Math.abs(a - piece.first) ? b : a));
    const width = (step.width * (1 + positionOf(step, nearest, piece))) / 2;
    if (width > 1e-3 * step.width) return width;
    // So near the start a step that a corner spoils cannot tell where; the slope at the start can.
    const slope = -resistance_ohm * step.start.current_A - step.start.excess_V;
    const straight = (nearest - step.start.current_A) / slope;
    return straight > 0 ? straight : null;
  }
  return null;
}

/** Whether |i| exceeds `limit_A` in a step, between its nodes as well. */
export function exceeds(step: SnubberStep, limit_A: number): boolean {
  if (step.largestCurrent_A > limit_A) return true;
  return step.largestCurrent_A > 0.9 * limit_A && [...pieces(step)].some(({ last }) => Math.abs(last) > limit_A);
}

/** Seconds from the start of a step to where |i| first exceeds `limit_A`. */
export function leavesAt(step: SnubberStep, limit_A: number): number {
  for (const piece of pieces(step)) {
    if (Math.abs(piece.first) > limit_A) return elapsedAt(step, piece.from);
    if (Math.abs(piece.last) > limit_A)
      return elapsedAt(step, positionOf(step, Math.sign(piece.last) * limit_A, piece));
  }
  return step.duration_s;
}

/** When the current is first zero, in s; null where it never is. */
export function firstZero(steps: readonly TimedStep[]): number | null {
  for (const step of steps) {
    const zero_s = zeroIn(step);
    if (zero_s !== null) return zero_s;
  }
  return null;
}

/** When the current passes zero in a step, not counting its start; null where it does not. A step is shorter than a swing. */
export function zeroIn(step: TimedStep): number | null {
  if (step.start.current_A * step.end.current_A > 0) return null;
  for (const piece of pieces(step)) {
    if (piece.first !== 0 && piece.first * piece.last <= 0)
      return step.start_s + elapsedAt(step, positionOf(step, 0, piece));
  }
  return null;
}

/** When |i| falls to `safe` for the last time; 0 if it never was above. It is not above at the end of the last step. */
export function lastFall(steps: readonly TimedStep[], safe: number): number {
  for (let k = steps.length - 1; k >= 0; k--) {
    const step = steps[k]!;
    if (step.largestCurrent_A * 1.01 < safe) continue;
    for (const piece of [...pieces(step)].reverse()) {
      if (Math.abs(piece.first) > safe) {
        return step.start_s + elapsedAt(step, positionOf(step, Math.sign(piece.first) * safe, piece));
      }
    }
  }
  return 0;
}

/** Largest |voltage| across the path up to the horizon, in V: at the start, the horizon, and every turning point between. */
export function peakVoltage(steps: readonly TimedStep[], horizon_s: number, loop: SnubberLoop): number {
  let peak = Math.abs(loop.pathResistance_ohm * loop.initialCurrent_A);
  for (const step of steps) {
    if (step.start_s >= horizon_s) break;
    const stop = positionAt(step.inductance, step.width, horizon_s - step.start_s);
    const voltage = step.excess.map((c, k) => c + loop.pathResistance_ohm * step.current[k]!);
    voltage[0]! += loop.source_V;
    for (const x of [...turningPoints(voltage), stop]) {
      if (x <= stop) peak = Math.max(peak, Math.abs(seriesValue(voltage, x)));
    }
  }
  return peak;
}
