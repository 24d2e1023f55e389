import { integrate } from '../numerics/quadrature.ts';
import { findRoot } from '../numerics/roots.ts';
import { type Course, HORIZON_DECAY, outOfRange } from './course.ts';
import type { Window } from './loop.ts';
import { type Damping, dampingOf, type SnubberLoop, slowestRate } from './snubber-loop.ts';
import { decayMean, logMean } from './unit-response.ts';

/**
 * With no resistance at all the default horizon is this many periods. Not a whole number: there the capacitor would be as empty as
 * at the start, and the energy audit would be made of what is left of large terms.
 */
export const UNDAMPED_PERIODS = 20.5;

/**
 * The course of the current of a constant inductance into a snubber, in closed form, whatever the damping.
 *
 * Without `until_s` it ends where what dies away last is down to 0.1 % (20.5 periods where nothing is damped) and, if that is
 * later, where the current is safe for good: below the safe current with no swing to come that exceeds it.
 *
 * | quantity | domain | worst relative error | against |
 * |---|---|---|---|
 * | times, peak voltage | R²C/L from 0 to 4e18, through critical | 1e-15 | mpmath, 80 digits |
 * | current at the horizon, of the initial one | the same | 5e-15 | the same |
 * | charge, ∫ i² dt, capacitor voltage | the same | 5e-14 | the same |
 */
export function linearSnubberCourse(inductance_H: number, loop: SnubberLoop, window: Window): Course {
  const { source_V, initialCurrent_A, pathResistance_ohm, capacitance_F } = loop;
  const damping = dampingOf(inductance_H, loop);
  const resistance = loop.windingResistance_ohm + pathResistance_ohm;
  const slope = (source_V - resistance * initialCurrent_A) / inductance_H;
  // i' + rate·i at the start, formed without the cancellation of its two parts.
  const residue = source_V / inductance_H - damping.otherRate * initialCurrent_A;
  const scale = damping.alpha + damping.naturalSquared + slope + residue + initialCurrent_A / capacitance_F;
  if (!(Number.isFinite(scale) && damping.naturalSquared > 0)) throw outOfRange();
  const current = (time_s: number) => solution(damping, initialCurrent_A, residue, time_s);
  const capacitor = (time_s: number) =>
    source_V * stepResponse(damping, time_s) + (initialCurrent_A / capacitance_F) * impulse(damping, time_s);
  const voltage = (time_s: number) => capacitor(time_s) + pathResistance_ohm * current(time_s);

  const firstExtremum_s = firstZero(
    damping,
    slope,
    -damping.otherRate * slope - damping.naturalSquared * initialCurrent_A,
  );
  const safe_s =
    window.safeCurrent_A === undefined ? null : safeTime(damping, current, firstExtremum_s, window.safeCurrent_A);
  const slow = slowestRate(damping);
  const natural_s = slow > 0 ? HORIZON_DECAY / slow : (UNDAMPED_PERIODS * 2 * Math.PI) / damping.split;
  const horizon_s = window.until_s ?? Math.max(natural_s, safe_s ?? 0);
  const zero_s = firstZero(damping, initialCurrent_A, residue);

  // The path's voltage less the source obeys the same equation: its first two extremes, one to each side, are the largest.
  const above = pathResistance_ohm * initialCurrent_A - source_V;
  const voltageSlope = initialCurrent_A / capacitance_F + pathResistance_ohm * slope;
  const peak_s = firstZero(damping, voltageSlope, -damping.otherRate * voltageSlope - damping.naturalSquared * above);
  const candidates = [0, horizon_s];
  if (peak_s !== null) candidates.push(peak_s);
  if (peak_s !== null && damping.rings) candidates.push(peak_s + Math.PI / damping.split);
  return {
    horizon_s,
    timeToSafe_s: safe_s !== null && safe_s <= horizon_s ? safe_s : null,
    timeToZero_s: zero_s !== null && zero_s <= horizon_s ? zero_s : null,
    peakVoltage_V: Math.max(...candidates.filter((t) => t <= horizon_s).map((t) => Math.abs(voltage(t)))),
    charge: capacitance_F * capacitor(horizon_s),
    square: squareIntegral(damping, initialCurrent_A, residue, horizon_s),
    capacitorVoltage_V: capacitor(horizon_s),
    at: (time_s) => ({ current_A: current(time_s), voltage_V: voltage(time_s) }),
  };
}

/** The solution with y(0) = 0 and y'(0) = 1. */
function impulse({ rings, alpha, split, otherRate }: Damping, time_s: number): number {
  if (rings) return (Math.exp(-alpha * time_s) * Math.sin(split * time_s)) / split;
  return time_s * Math.exp(-otherRate * time_s) * decayMean(2 * split * time_s);
}

/** The solution with y(0) = `initial` and y'(0) + rate·y(0) = `residue`. */
function solution(damping: Damping, initial: number, residue: number, time_s: number): number {
  const { rings, rate, split } = damping;
  const swing = rings ? Math.cos(split * time_s) : 1;
  return initial * Math.exp(-rate * time_s) * swing + residue * impulse(damping, time_s);
}

/** ω₀²·∫ impulse: what the capacitor of a circuit at rest takes of a step of 1 V. */
function stepResponse(damping: Damping, time_s: number): number {
  const { rings, alpha, naturalSquared, split, otherRate } = damping;
  const early = (2 * alpha + Math.sqrt(naturalSquared)) * time_s < 1;
  // It starts as ω₀²t²/2: the closed forms would be left with the rounding of 1.
  if (early) return naturalSquared * integrate((t) => impulse(damping, t), 0, time_s, 16);
  if (!rings) return -Math.expm1(-otherRate * time_s) - otherRate * impulse(damping, time_s);
  return 1 - Math.exp(-alpha * time_s) * Math.cos(split * time_s) - alpha * impulse(damping, time_s);
}

/**
 * The first time after 0 at which the solution with y(0) = `initial` and y'(0) + rate·y(0) = `residue` is zero, or null.
 * Ringing: tan(ωt)/ω = −y/(y' + αy). Not ringing: tanh(βt)/β = the same, so 2βt = log(1 + 2βx), x = −y/(y' + fast·y).
 */
function firstZero({ rings, split }: Damping, initial: number, residue: number): number | null {
  if (rings) {
    if (initial === 0) return Math.PI / split;
    return Math.atan2(split * Math.abs(initial), -residue * Math.sign(initial)) / split;
  }
  const x = -initial / residue;
  return x > 0 && Number.isFinite(x) ? x * logMean(2 * split * x) : null;
}

/** The time from which |i| stays at or below `safe`, or null where it never does. */
function safeTime(
  damping: Damping,
  current: (time_s: number) => number,
  firstExtremum_s: number | null,
  safe: number,
): number | null {
  const startsAbove = current(0) > safe;
  const extremum = firstExtremum_s === null ? 0 : current(firstExtremum_s);
  if (firstExtremum_s === null || Math.abs(extremum) <= safe) {
    if (!startsAbove) return 0;
    if (safe === 0) return null;
    const fall = (time_s: number) => current(time_s) - safe;
    return fallBetween(fall, 0, firstExtremum_s ?? firstBelow(fall, 0, damping));
  }
  if (safe === 0) return null;
  const side = Math.sign(extremum);
  if (!damping.rings) {
    const fall = (time_s: number) => side * current(time_s) - safe;
    return fallBetween(fall, firstExtremum_s, firstBelow(fall, firstExtremum_s, damping));
  }
  // Each extremum is the one before turned round and smaller by e^(−απ/ω): count those above `safe`, then the fall after the last.
  const half_s = Math.PI / damping.split;
  const loss = damping.alpha * half_s;
  if (loss === 0) return null;
  let swings = Math.floor(Math.log(Math.abs(extremum) / safe) / loss);
  if (Math.abs(extremum) <= safe * Math.exp(swings * loss)) swings -= 1;
  const level = safe * Math.exp(swings * loss);
  const fall = (time_s: number) => side * current(time_s) - level;
  return fallBetween(fall, firstExtremum_s, firstExtremum_s + half_s) + swings * half_s;
}

/** The zero of a falling `f` between two times. Throws where its values at them overflow. */
function fallBetween(f: (time_s: number) => number, start_s: number, stop_s: number): number {
  if (!(f(start_s) >= 0 && f(stop_s) <= 0 && Number.isFinite(f(start_s) - f(stop_s)))) throw outOfRange();
  return findRoot(f, start_s, stop_s);
}

/** A time after `start_s` at which the falling `f` is no longer positive. */
function firstBelow(f: (time_s: number) => number, start_s: number, damping: Damping): number {
  let step = 1 / damping.rate;
  while (f(start_s + step) > 0 && step < 1e300) step *= 2;
  return start_s + step;
}

/**
 * ∫₀^T y² dt of that solution, T = `time_s`. Ringing, as y = e^{−αt}·Re(P e^{jωt}): ½|P|²∫e^{−2αt} + ½Re(P²∫e^{2(jω − α)t}).
 * Where those two would cancel (near critical damping, or less than a radian of ringing) and where nothing rings, by 20-point
 * Gauss-Legendre panels that double from the fastest rate up. Independent of the energy balance either way.
 */
function squareIntegral(damping: Damping, initial: number, residue: number, time_s: number): number {
  const { rings, alpha, split, naturalSquared } = damping;
  if (rings && split >= alpha / 4 && split * time_s >= 1) {
    const [re, im] = [initial, -residue / split];
    const [squareRe, squareIm] = [(re - im) * (re + im), 2 * re * im];
    const decayed = Math.exp(-2 * alpha * time_s);
    const [x, y] = [decayed * Math.cos(2 * split * time_s) - 1, decayed * Math.sin(2 * split * time_s)];
    // (x + jy)/(2(jω − α)), whose modulus squared is 4ω₀².
    const [quotientRe, quotientIm] = [
      (split * y - alpha * x) / (2 * naturalSquared),
      (-alpha * y - split * x) / (2 * naturalSquared),
    ];
    const steady = (re * re + im * im) * time_s * decayMean(2 * alpha * time_s);
    return (steady + squareRe * quotientRe - squareIm * quotientIm) / 2;
  }
  const square = (t: number) => solution(damping, initial, residue, t) ** 2;
  const last_s = Math.min(time_s, 60 / slowestRate(damping));
  let sum = 0;
  let start = 0;
  let stop = Math.min(last_s, rings ? 1 / Math.sqrt(naturalSquared) : 1 / damping.rate);
  while (start < last_s) {
    sum += integrate(square, start, stop, 20);
    [start, stop] = [stop, Math.min(2 * stop, last_s)];
  }
  return sum;
}
