import type { FluxCharacteristic } from '../characteristic.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import { type Clock, type ClockEnd, linearClock, standingClock } from './clock.ts';
import { type Course, HORIZON_DECAY } from './course.ts';
import { panelClock } from './panel-clock.ts';
import type { StaticPath } from './path.ts';
import { type Drive, driveFrom, settledCurrent } from './unit-response.ts';

/** An inductor in a loop of constant voltages and resistances. */
export interface Loop {
  readonly windingResistance_ohm: number;
  readonly initialCurrent_A: number;
  /** 0 where no source is in the loop. */
  readonly source_V: number;
  /** null: none, the source is connected straight to the inductor. */
  readonly path: StaticPath | null;
}

/** How long to look and what counts as safe. */
export interface Window {
  readonly until_s?: number | undefined;
  readonly safeCurrent_A?: number | undefined;
}

/**
 * The course of the current in a loop without a capacitor: dλ/dt = source − R_w·i − v_path(i), exactly in closed form where
 * the inductance is constant, else by the quadrature of clock.ts (the current moves one way, so no differential equation has
 * to be stepped through).
 *
 * Without `until_s` the course ends where a one-way path has brought the current to zero, or where the current has come within
 * 0.1 % of its change to where it settles (6.9 time constants of a constant inductance) and, if it does so later, is safe.
 *
 * Throws `InvalidQuantity` (pointers relative to the transient's request) where the path can't bring the current down, where
 * no horizon is given and none is natural, and where the characteristic ends before the current does.
 */
export function loopCourse(characteristic: FluxCharacteristic, loop: Loop, window: Window): Course {
  const drive = driveOf(loop);
  checkThatItEnds(loop, drive);
  const endsAtZero = loop.path?.oneWay === true && drive.drive_V < 0;
  const restsAt = endsAtZero ? 0 : settledCurrent(drive);
  const safe_A = safeLevel(drive, restsAt, endsAtZero, window.safeCurrent_A);
  const end =
    window.until_s === undefined
      ? naturalEnd(drive, endsAtZero, restsAt, safe_A)
      : { current_A: restsAt, sigma: Infinity, time_s: window.until_s };
  const clock = clockOf(characteristic, drive, end, restsAt);
  const horizon_s = window.until_s ?? clock.duration_s;
  const reached = (current_A: number) => {
    const time_s = clock.timeOf(current_A);
    return time_s <= horizon_s ? time_s : null;
  };
  const timeToZero_s = loop.initialCurrent_A === 0 ? null : reached(0);
  const blocked_s = endsAtZero && timeToZero_s !== null ? timeToZero_s : Infinity;
  const at = (time_s: number) => {
    // A one-way path blocks from then on: no current, and what the source holds across it.
    if (time_s >= blocked_s) return { current_A: 0, voltage_V: loop.source_V };
    const { current_A, voltage_V } = clock.at(time_s);
    return { current_A, voltage_V: loop.path === null ? voltage_V : pathVoltage(loop.path, current_A) };
  };
  // The voltage goes one way with the current: its extremes are at the ends, and where a one-way path blocks.
  const voltages = [at(0).voltage_V, at(horizon_s).voltage_V];
  if (loop.path !== null) voltages.push(pathVoltage(loop.path, clock.at(Math.min(horizon_s, blocked_s)).current_A));
  return {
    horizon_s,
    timeToSafe_s: safe_A === null ? null : reached(safe_A),
    timeToZero_s,
    peakVoltage_V: Math.max(...voltages.map(Math.abs)),
    ...clock.integralsTo(Math.min(horizon_s, blocked_s)),
    capacitorVoltage_V: 0,
    at,
  };
}

function pathVoltage({ constantVoltage_V, resistance_ohm }: StaticPath, current_A: number): number {
  return constantVoltage_V + resistance_ohm * current_A;
}

function driveOf({ windingResistance_ohm, initialCurrent_A, source_V, path }: Loop): Drive {
  return driveFrom(
    source_V - (path?.constantVoltage_V ?? 0),
    windingResistance_ohm + (path?.resistance_ohm ?? 0),
    initialCurrent_A,
  );
}

/** Whether source and resistance balance, to rounding, so that the current stays where it is. */
function isStanding({ initialCurrent_A }: Drive, restsAt: number): boolean {
  return Math.abs(restsAt - initialCurrent_A) <= 4 * Number.EPSILON * Math.abs(initialCurrent_A);
}

function checkThatItEnds({ source_V, path }: Loop, { drive_V, resistance_ohm }: Drive): void {
  if (path === null) {
    if (source_V === 0) throw new InvalidQuantity('/source_V', 'no source: nothing drives a current into the inductor');
    return;
  }
  const pointer = `/path${path.field}`;
  if (path.oneWay && drive_V >= 0 && source_V > 0) {
    throw new InvalidQuantity(
      pointer,
      `${path.constantVoltage_V} V does not exceed the source of ${source_V} V that stays in the loop: the current is never brought down to zero`,
    );
  }
  if (drive_V === 0 && resistance_ohm === 0) {
    throw new InvalidQuantity(
      pointer,
      'no voltage opposes the current and no resistance is in the loop, the winding included: the current never decays',
    );
  }
}

/** The current at which |i| has come down to the safe current for good; null where it never does. */
function safeLevel(
  drive: Drive,
  restsAt: number,
  endsAtZero: boolean,
  safeCurrent_A: number | undefined,
): number | null {
  if (safeCurrent_A === undefined || !(Math.abs(restsAt) <= safeCurrent_A)) return null;
  // The current moves one way from the initial to the resting value, so between two safe ends it is safe throughout.
  if (Math.abs(drive.initialCurrent_A) <= safeCurrent_A) return drive.initialCurrent_A;
  const level = Math.sign(drive.initialCurrent_A) * safeCurrent_A;
  // What it settles at is only approached; zero through a one-way path is reached.
  return level === restsAt && !endsAtZero ? null : level;
}

function naturalEnd(drive: Drive, endsAtZero: boolean, restsAt: number, safe_A: number | null): ClockEnd {
  const time_s = Infinity;
  if (endsAtZero) return { current_A: 0, sigma: Infinity, time_s };
  if (!(drive.resistance_ohm > 0)) {
    throw new InvalidQuantity(
      '/until_s',
      'needed: with a source and no resistance in the loop the current grows without limit and has no end of its own',
    );
  }
  const nearly = Math.abs(drive.initialCurrent_A - restsAt) * Math.exp(-HORIZON_DECAY);
  return safe_A !== null && Math.abs(safe_A - restsAt) < nearly
    ? { current_A: safe_A, sigma: Infinity, time_s }
    : { current_A: restsAt, sigma: HORIZON_DECAY / drive.resistance_ohm, time_s };
}

function clockOf(characteristic: FluxCharacteristic, drive: Drive, end: ClockEnd, restsAt: number): Clock {
  if (isStanding(drive, restsAt)) {
    return standingClock(restsAt, end.sigma * characteristic.differentialInductance_H(restsAt));
  }
  if (characteristic.kind === 'linear') return linearClock(characteristic.differentialInductance_H(0), drive, end);
  const clock = panelClock(characteristic, drive, end);
  if (clock !== null) return clock;
  const limit_A = characteristic.maximumCurrent_A;
  const heading = Number.isFinite(restsAt) ? `heads for ${restsAt} A` : 'grows without limit';
  const detail = `the current ${heading}, but the characteristic of the inductor ends at ${limit_A} A and is not extrapolated`;
  throw end.time_s === Infinity
    ? new InvalidQuantity('/source_V', `${detail}; lower it, or stop before with until_s`)
    : new InvalidQuantity('/until_s', `${detail}; stop before, or lower source_V`);
}
