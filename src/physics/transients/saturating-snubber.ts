import type { FluxCharacteristic } from '../characteristic.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import { seriesValue } from '../numerics/legendre-series.ts';
import { type Course, HORIZON_DECAY, outOfRange } from './course.ts';
import { UNDAMPED_PERIODS } from './linear-snubber.ts';
import type { Window } from './loop.ts';
import { bounded, lastStarting, positionAt } from './panel.ts';
import {
  exceeds,
  firstZero,
  lastFall,
  leavesAt,
  peakVoltage,
  type TimedStep,
  widthToCorner,
  zeroIn,
} from './snubber-events.ts';
import { dampingOf, type SnubberLoop, slowestRate } from './snubber-loop.ts';
import { type SnubberEquation, type SnubberState, snubberStep } from './snubber-step.ts';

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
    if (steps.length > MOST_STEPS) throw tooLong(time_s);
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
