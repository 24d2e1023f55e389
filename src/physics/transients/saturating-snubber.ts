import type { FluxCharacteristic } from '../characteristic.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import { type LegendreSeries, seriesSlope, seriesValue } from '../numerics/legendre-series.ts';
import { findRoot } from '../numerics/roots.ts';
import { bounded, lastStarting, positionAt } from './clock.ts';
import { type Course, HORIZON_DECAY, outOfRange } from './course.ts';
import { UNDAMPED_PERIODS } from './linear-snubber.ts';
import type { Window } from './loop.ts';
import { dampingOf, type SnubberLoop, slowestRate } from './snubber-loop.ts';
import { elapsedAt, type SnubberEquation, type SnubberState, type SnubberStep, snubberStep } from './snubber-step.ts';

/**
 * A course with no end asked for stops at this current zero, after 50 oscillations, however lightly damped; or at the next, so that the
 * capacitor is full (see UNDAMPED_PERIODS).
 */
const FIRST_LAST_ZERO = 99;

/** A window that asks for more oscillations than this is refused, at once where that is certain, else when so many steps are made. */
const MOST_OSCILLATIONS = 500;
const MOST_STEPS = 10_000;

/** A current this much, relatively, past the end of the characteristic is still taken to be at it. */
const ROUNDING = 1e-9;

/** Stored energy, relative to its first, below which nothing is left to follow: amplitudes under 1e-18. */
const SPENT = 1e-36;

interface TimedStep extends SnubberStep {
  readonly start_s: number;
  /** ∫ i dt before the step in A·s, ∫ i² dt in A²·s. */
  readonly chargeBefore: number;
  readonly squareBefore: number;
}

/**
 * The course of the current of a saturating inductor into a snubber: stepped through (snubber-step.ts), because current and
 * capacitor voltage swing back and forth.
 *
 * Without `until_s` it ends where the linear circuit of the inductance at zero current would (see linear-snubber.ts) or, if
 * that is later, where the current is safe for good; at the latest after 50 oscillations.
 *
 * "For good" is certain and not only so far: with H = W(i) + ½C·u², which only falls, a swing that ends at i has
 * H = W(i) + ½C·R²·i². Once |i| is at or below the safe current and H at or below that at the safe current, no swing to come exceeds it.
 * A window that ends before that is looked beyond until it is decided.
 */
export function saturatingSnubberCourse(characteristic: FluxCharacteristic, loop: SnubberLoop, window: Window): Course {
  const { source_V, pathResistance_ohm, capacitance_F } = loop;
  const resistance_ohm = loop.windingResistance_ohm + pathResistance_ohm;
  const equation: SnubberEquation = { characteristic, resistance_ohm, capacitance_F };
  const damping = dampingOf(characteristic.differentialInductance_H(0), loop);
  // Beyond this its times are subnormal numbers.
  if (!(damping.rate + damping.split < 1e290 && damping.naturalSquared > 0)) throw outOfRange();
  const natural_s =
    resistance_ohm > 0 ? HORIZON_DECAY / slowestRate(damping) : (UNDAMPED_PERIODS * 2 * Math.PI) / damping.split;
  if (window.until_s !== undefined) checkOscillations(equation, window.until_s);
  const { steps, cut_s, safeForGood } = follow(equation, loop, window, window.until_s ?? natural_s);

  const safe_s = safeForGood ? lastFall(steps, window.safeCurrent_A ?? 0) : null;
  const horizon_s = window.until_s ?? Math.min(Math.max(natural_s, safe_s ?? 0), cut_s);
  const within = (time_s: number | null) => (time_s !== null && time_s <= horizon_s ? time_s : null);
  const stateAt = (time_s: number) => {
    const step = lastStarting(steps, (candidate) => candidate.start_s <= time_s);
    // Beyond the last step everything is spent.
    if (time_s > step.start_s + step.duration_s * (1 + 1e-12)) return { current_A: 0, excess_V: 0 };
    const x = positionAt(step.inductance, step.width, time_s - step.start_s);
    return { current_A: seriesValue(step.current, x), excess_V: seriesValue(step.excess, x) };
  };
  const last = closingStep(equation, steps, horizon_s);
  const charge = last.chargeBefore + last.charge;
  return {
    horizon_s,
    timeToSafe_s: within(safe_s),
    timeToZero_s: within(firstZero(steps)),
    peakVoltage_V: peakVoltage(steps, horizon_s, loop),
    // Of its own sum and not from the excess voltage, whose first digits are the source's.
    charge,
    square: last.squareBefore + last.square,
    capacitorVoltage_V: charge / capacitance_F,
    at: (time_s) => {
      // The end as the audit has it, not by interpolation.
      const { current_A, excess_V } = time_s === horizon_s ? last.end : stateAt(time_s);
      return { current_A, voltage_V: source_V + excess_V + pathResistance_ohm * current_A };
    },
  };
}

interface Followed {
  readonly steps: readonly TimedStep[];
  /** The longest horizon the steps can answer for, where not asked for one: Infinity unless the cap on oscillations stopped them. */
  readonly cut_s: number;
  readonly safeForGood: boolean;
}

/** Steps from the interruption until `window_s` is covered and the safe current decided, or nothing is left, or the cap. */
function follow(equation: SnubberEquation, loop: SnubberLoop, window: Window, window_s: number): Followed {
  const { characteristic, capacitance_F, resistance_ohm } = equation;
  const stored = ({ current_A, excess_V }: SnubberState) =>
    characteristic.energy_J(bounded(current_A, characteristic.maximumCurrent_A)) +
    (capacitance_F / 2) * excess_V * excess_V;
  const isSafeForGood = safeTest(equation, window.safeCurrent_A, stored);
  let state: SnubberState = { current_A: loop.initialCurrent_A, excess_V: -loop.source_V };
  const atFirst = stored(state);
  if (!Number.isFinite(atFirst)) throw outOfRange();
  /** Whether looking on can change the answer on the safe current; beyond a window that was asked for, being above it is final. */
  const isOpen = () =>
    window.safeCurrent_A !== undefined &&
    window.safeCurrent_A > 0 &&
    resistance_ohm > 0 &&
    !isSafeForGood(state) &&
    (window.until_s === undefined || time_s < window_s || Math.abs(state.current_A) <= window.safeCurrent_A);
  const corners = [0, ...(characteristic.slopeTurns_A ?? []).flatMap((turn) => [turn, -turn])];
  const limit_A = characteristic.maximumCurrent_A * (1 + ROUNDING);
  const steps: TimedStep[] = [];
  let [time_s, charge, square, zeros, halvings] = [0, 0, 0, 0, 0];
  let stride = firstWidth(equation, state);
  let width = stride;
  while (steps.length === 0 || isOpen() || (time_s < window_s && stored(state) > SPENT * atFirst)) {
    if (steps.length > MOST_STEPS) {
      throw tooLong(time_s);
    }
    const step = snubberStep(equation, state, width);
    const truncation = step === null ? Infinity : step.truncation(time_s);
    if (step !== null && truncation <= 1 && exceeds(step, limit_A)) {
      // Held past its end the characteristic has still told when the current gets there.
      if (!(time_s + leavesAt(step, limit_A) >= window_s)) throw beyondCharacteristic(characteristic, window);
      steps.push({ ...step, start_s: time_s, chargeBefore: charge, squareBefore: square });
      return { steps, cut_s: Infinity, safeForGood: false };
    }
    const quality = step === null ? Infinity : Math.max(truncation, step.fluxLost);
    if (step === null || (!(quality <= 1) && halvings < 45)) {
      if (++halvings > 300 || Number.isNaN(quality)) throw outOfRange();
      const toCorner = step === null ? null : widthToCorner(equation, step, corners);
      // A corner of L_d inside: end on it. Else, and where it is the end already, shorten by the order of the truncation.
      if (toCorner !== null && toCorner < 0.999 * width) width = toCorner;
      else stride = width *= quality < 1e6 ? Math.min(0.8, 0.9 * quality ** (-1 / 11)) : 0.5;
      continue;
    }
    const timed = { ...step, start_s: time_s, chargeBefore: charge, squareBefore: square };
    steps.push(timed);
    time_s += step.duration_s;
    charge += step.charge;
    square += step.square;
    state = step.end;
    const zero_s = zeroIn(timed);
    const isFull = Math.abs(charge) >= capacitance_F * Math.abs(loop.source_V);
    if (zero_s !== null && ++zeros >= FIRST_LAST_ZERO && isFull && window.until_s === undefined) {
      return { steps, cut_s: zero_s, safeForGood: isSafeForGood(state) };
    }
    halvings = 0;
    // A step cut short at a corner says nothing against the stride before it.
    if (width === stride) stride *= Math.min(3, 0.9 * Math.max(quality, 1e-12) ** (-1 / 11));
    width = stride;
  }
  return { steps, cut_s: Infinity, safeForGood: isSafeForGood(state) };
}

function tooLong(time_s: number): InvalidQuantity {
  return new InvalidQuantity(
    '/until_s',
    `covers more oscillations of inductor and snubber than are followed; stop before ${time_s} s, or damp it`,
  );
}

/** Refuses a window whose oscillations are too many even if all went at the largest inductance and slowest decay. */
function checkOscillations({ characteristic, resistance_ohm, capacitance_F }: SnubberEquation, until_s: number): void {
  const currents = [0, ...(characteristic.slopeTurns_A ?? [])];
  const inductance_H = Math.max(...currents.map(characteristic.differentialInductance_H));
  const slowest = 1 / (Math.sqrt(inductance_H) * Math.sqrt(capacitance_F));
  const decay = resistance_ohm / (2 * inductance_H);
  if (decay >= slowest) return;
  const spent_s = -Math.log(SPENT) / (2 * decay);
  const longest_s = (MOST_OSCILLATIONS * 2 * Math.PI) / Math.sqrt((slowest - decay) * (slowest + decay));
  if (Math.min(until_s, spent_s) > longest_s) throw tooLong(longest_s);
}

function firstWidth(
  { characteristic, resistance_ohm, capacitance_F }: SnubberEquation,
  { current_A }: SnubberState,
): number {
  const ringing = Math.sqrt(capacitance_F) / Math.sqrt(characteristic.differentialInductance_H(current_A));
  return 0.5 * Math.min(1 / resistance_ohm, ringing);
}

/** Whether no swing to come from a state exceeds the safe current (see the head of saturatingSnubberCourse). */
function safeTest(
  { characteristic, resistance_ohm, capacitance_F }: SnubberEquation,
  safe: number | undefined,
  stored: (state: SnubberState) => number,
): (state: SnubberState) => boolean {
  if (safe === undefined || safe === 0) return () => false;
  const allowed =
    safe > characteristic.maximumCurrent_A
      ? Infinity
      : characteristic.energy_J(safe) + (capacitance_F / 2) * (resistance_ohm * safe) ** 2;
  return (state) => Math.abs(state.current_A) <= safe && stored(state) <= allowed;
}

/** The width at which a step's current first passes one of `corners`, null where it passes none. */
function widthToCorner(
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
function exceeds(step: SnubberStep, limit_A: number): boolean {
  if (step.largestCurrent_A > limit_A) return true;
  return step.largestCurrent_A > 0.9 * limit_A && [...pieces(step)].some(({ last }) => Math.abs(last) > limit_A);
}

/** Seconds from the start of a step to where |i| first exceeds `limit_A`. */
function leavesAt(step: SnubberStep, limit_A: number): number {
  for (const piece of pieces(step)) {
    if (Math.abs(piece.first) > limit_A) return elapsedAt(step, piece.from);
    if (Math.abs(piece.last) > limit_A)
      return elapsedAt(step, positionOf(step, Math.sign(piece.last) * limit_A, piece));
  }
  return step.duration_s;
}

function beyondCharacteristic({ maximumCurrent_A }: FluxCharacteristic, { until_s }: Window): InvalidQuantity {
  return new InvalidQuantity(
    until_s === undefined ? '/source_V' : '/until_s',
    `the source drives the current beyond ${maximumCurrent_A} A, where the characteristic of the inductor ends; it is not extrapolated`,
  );
}

/** The step in which the horizon lies, taken again to end there. */
function closingStep(equation: SnubberEquation, steps: readonly TimedStep[], horizon_s: number): TimedStep {
  const step = lastStarting(steps, (candidate) => candidate.start_s < horizon_s);
  const x = positionAt(step.inductance, step.width, horizon_s - step.start_s);
  if (x === 1) return step;
  const shorter = snubberStep(equation, step.start, (step.width * (1 + x)) / 2);
  return shorter === null ? step : { ...step, ...shorter };
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

function firstZero(steps: readonly TimedStep[]): number | null {
  for (const step of steps) {
    const zero_s = zeroIn(step);
    if (zero_s !== null) return zero_s;
  }
  return null;
}

/** When the current passes zero in a step, not counting its start; null where it does not. A step is shorter than a swing. */
function zeroIn(step: TimedStep): number | null {
  if (step.start.current_A * step.end.current_A > 0) return null;
  for (const piece of pieces(step)) {
    if (piece.first !== 0 && piece.first * piece.last <= 0)
      return step.start_s + elapsedAt(step, positionOf(step, 0, piece));
  }
  return null;
}

/** When |i| falls to `safe` for the last time; 0 if it never was above. It is not above at the end of the last step. */
function lastFall(steps: readonly TimedStep[], safe: number): number {
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

function peakVoltage(steps: readonly TimedStep[], horizon_s: number, loop: SnubberLoop): number {
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
