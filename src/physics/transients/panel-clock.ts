import type { FluxCharacteristic } from '../characteristic.ts';
import { type Collocation, radauCollocation, seriesThrough } from '../numerics/collocation.ts';
import type { LegendreSeries } from '../numerics/legendre-series.ts';
import { type Clock, type ClockEnd, reaches } from './clock.ts';
import { outOfRange } from './course.ts';
import { bounded, lastStarting, positionAt } from './panel.ts';
import { continued, type Drive, driveFrom, responseCurrent, responseSigma, responseVoltage } from './unit-response.ts';

interface Panel {
  /** The response from the panel's own start. */
  readonly drive: Drive;
  readonly width: number;
  readonly endCurrent_A: number;
  readonly startTime_s: number;
  readonly startCharge: number;
  readonly startSquare: number;
  /** L_d over the panel. */
  readonly inductance: LegendreSeries;
}

const RULE: Collocation = radauCollocation(12);

/** What the last two Legendre coefficients of each integrand may leave, relative to its integral so far. */
const TAIL_TOLERANCE = 1e-13;

/** How far ∫ L_d di over a panel may be from λ(i₁) − λ(i₀), relative to λ: catches a knee that falls between the nodes. */
const FLUX_TOLERANCE = 1e-11;

/**
 * The clock of any characteristic: panels of 12-point Radau quadrature, halved until the integrands' Legendre series have
 * converged and the flux linkage is conserved, until the end is reached. Null where the characteristic ends before that.
 *
 * The way is cut at known currents, and the response counted anew from each: at zero and where L_d may have a corner
 * (`slopeTurns_A`), and at every decade on the way down to zero, because counted from the start a small current would be the
 * difference of two large ones. A corner that is not announced is closed in on by halving; a characteristic that is itself noisy
 * by more than the tolerance costs more panels but still ends.
 */
export function panelClock(characteristic: FluxCharacteristic, drive: Drive, end: ClockEnd): Clock | null {
  const panels: Panel[] = [];
  const total: Total = { sigma: 0, time_s: 0, charge: 0, square: 0 };
  const cuts = cutsBetween(characteristic, drive, end.current_A);
  const isOver = () => total.time_s >= end.time_s || total.sigma >= end.sigma;
  let from = drive.initialCurrent_A;
  for (const to of cuts) {
    if (isOver()) break;
    const way = driveFrom(drive.drive_V, drive.resistance_ohm, from);
    addPanels(panels, total, characteristic, way, { ...end, current_A: to });
    from = to;
  }
  // The way may end where the characteristic does, and not where it should.
  const last = cuts.at(-1) ?? drive.initialCurrent_A;
  if (last !== end.current_A && !isOver()) return null;
  return clockOver(panels, characteristic, end.time_s === Infinity ? total.time_s : Infinity);
}

interface Total {
  sigma: number;
  time_s: number;
  charge: number;
  square: number;
}

/** Currents at which the way to `target_A` is cut, in order, the last one the target or the end of the characteristic. */
function cutsBetween(
  { slopeTurns_A = [], maximumCurrent_A }: FluxCharacteristic,
  { initialCurrent_A }: Drive,
  target_A: number,
): number[] {
  const last = bounded(target_A, maximumCurrent_A);
  if (last === initialCurrent_A) return [];
  const decades = Array.from({ length: 16 }, (_, k) => initialCurrent_A * 10 ** -(k + 1));
  const direction = Math.sign(last - initialCurrent_A);
  const inside = [0, ...slopeTurns_A.flatMap((turn) => [turn, -turn]), ...decades].filter(
    (current) => (current - initialCurrent_A) * (last - current) > 0,
  );
  return [...new Set(inside)].sort((a, b) => direction * (a - b)).concat(last);
}

/** Panels from the way's initial current to the end. */
function addPanels(panels: Panel[], total: Total, characteristic: FluxCharacteristic, way: Drive, end: ClockEnd): void {
  const sigmaThere = reaches(way, end.current_A) ? responseSigma(way, end.current_A) : Infinity;
  const isThere = sigmaThere <= end.sigma - total.sigma;
  let left = isThere ? sigmaThere : end.sigma - total.sigma;
  let drive = way;
  let width = Math.min(
    left,
    (end.time_s - total.time_s) / characteristic.differentialInductance_H(way.initialCurrent_A),
  );
  // Less is a subnormal number, with digits missing.
  if (!(width > 1e-290 && Number.isFinite(width))) throw outOfRange();
  let halvings = 0;
  while (left > 0 && total.time_s < end.time_s) {
    // A sliver left before the end would cost a panel of its own.
    const wanted = 1.001 * width >= left ? left : width;
    const endCurrent_A = isThere && wanted === left ? end.current_A : responseCurrent(drive, wanted);
    const panel = integratePanel(characteristic, drive, wanted, endCurrent_A);
    const truncation = judge(panel, total, wanted);
    const quality = Math.max(truncation, panel.fluxLost);
    const noise = halvings >= 40 && (panels.length > 0 || quality < 1e4);
    if (!(quality <= 1) && !noise) {
      width = wanted / 2;
      if (++halvings > 2100 || Number.isNaN(quality)) throw outOfRange();
      continue;
    }
    panels.push({
      drive,
      width: wanted,
      endCurrent_A,
      startTime_s: total.time_s,
      startCharge: total.charge,
      startSquare: total.square,
      inductance: panel.inductance,
    });
    if (panels.length > 20_000) throw outOfRange();
    // Exactly its end where that is reached: what is summed up may stay short of it by rounding.
    total.sigma = wanted === left && !isThere ? end.sigma : total.sigma + wanted;
    total.time_s += panel.time_s;
    total.charge += panel.charge;
    total.square += panel.square;
    left = wanted === left ? 0 : left - wanted;
    drive = continued(drive, wanted, endCurrent_A);
    width = wanted * (truncation < 1e-3 ? 3 : truncation < 0.1 ? 1.5 : 1);
    halvings = 0;
  }
}

interface PanelIntegrals {
  readonly time_s: number;
  readonly charge: number;
  readonly square: number;
  readonly inductance: LegendreSeries;
  /** The last two Legendre coefficients' magnitude of L_d, i·L_d and i²·L_d. */
  readonly tails: readonly [number, number, number];
  /** |∫ L_d di − Δλ| over the larger |λ| at the ends and the tolerance: 1 or less is good. */
  readonly fluxLost: number;
}

function integratePanel(
  characteristic: FluxCharacteristic,
  drive: Drive,
  width: number,
  endCurrent_A: number,
): PanelIntegrals {
  const { stages, nodes, weights } = RULE;
  const integrands = [new Float64Array(stages), new Float64Array(stages), new Float64Array(stages)] as const;
  const sums = [0, 0, 0];
  let flux = 0;
  for (let j = 0; j < stages; j++) {
    const sigma = (width * (1 + nodes[j]!)) / 2;
    const current = j === stages - 1 ? endCurrent_A : responseCurrent(drive, sigma);
    // Rounding may put it past the last reading.
    let value = characteristic.differentialInductance_H(bounded(current, characteristic.maximumCurrent_A));
    flux += weights[j]! * value * responseVoltage(drive, sigma);
    for (let power = 0; power < 3; power++) {
      integrands[power]![j] = value;
      sums[power]! += weights[j]! * value;
      value *= current;
    }
  }
  const series = integrands.map((values) => seriesThrough(RULE, values));
  const tails = series.map((c) => Math.abs(c[stages - 1]!) + Math.abs(c[stages - 2]!));
  const start = characteristic.fluxLinkage_Wb(drive.initialCurrent_A);
  const finish = characteristic.fluxLinkage_Wb(bounded(endCurrent_A, characteristic.maximumCurrent_A));
  const scale = Math.max(Math.abs(start), Math.abs(finish));
  return {
    time_s: width * sums[0]!,
    charge: width * sums[1]!,
    square: width * sums[2]!,
    inductance: series[0]!,
    tails: [tails[0]!, tails[1]!, tails[2]!],
    // Where the current has died away into subnormal numbers there is no flux to lose.
    fluxLost: scale < 1e-280 ? 0 : Math.abs(width * flux - (finish - start)) / scale / FLUX_TOLERANCE,
  };
}

/** The panel's worst truncation over its tolerance: 1 or less is good. */
function judge(panel: PanelIntegrals, before: Total, width: number): number {
  const [time, charge, square] = panel.tails;
  // Subnormal totals (i² of the smallest currents) have no digits to be judged by.
  const ratio = (tail: number, total: number) => (total < 1e-280 ? 0 : (width * tail) / (TAIL_TOLERANCE * total));
  return Math.max(
    ratio(time, before.time_s + panel.time_s),
    ratio(charge, Math.abs(before.charge) + Math.abs(panel.charge)),
    ratio(square, before.square + panel.square),
  );
}

function clockOver(panels: readonly Panel[], characteristic: FluxCharacteristic, duration_s: number): Clock {
  const first = panels[0]!;
  const direction = Math.sign(panels.at(-1)!.endCurrent_A - first.drive.initialCurrent_A);
  const place = (time_s: number) => {
    const panel = lastStarting(panels, (candidate) => candidate.startTime_s <= time_s);
    const x = positionAt(panel.inductance, panel.width, time_s - panel.startTime_s);
    const sigma = (panel.width * (1 + x)) / 2;
    return { panel, sigma, current_A: x === 1 ? panel.endCurrent_A : responseCurrent(panel.drive, sigma) };
  };
  return {
    duration_s,
    timeOf: (current_A) => {
      if (direction * (current_A - first.drive.initialCurrent_A) < 0) return Infinity;
      const panel = lastStarting(
        panels,
        (candidate) => direction * (current_A - candidate.drive.initialCurrent_A) >= 0,
      );
      if (direction * (current_A - panel.endCurrent_A) > 0) return Infinity;
      if (current_A === panel.drive.initialCurrent_A) return panel.startTime_s;
      const counted = responseSigma(panel.drive, current_A);
      const sigma = counted < panel.width && current_A !== panel.endCurrent_A ? counted : panel.width;
      return panel.startTime_s + integratePanel(characteristic, panel.drive, sigma, current_A).time_s;
    },
    at: (time_s) => {
      const { panel, sigma, current_A } = place(time_s);
      return { current_A, voltage_V: responseVoltage(panel.drive, sigma) };
    },
    integralsTo: (time_s) => {
      const { panel, sigma, current_A } = place(time_s);
      if (sigma === 0) return { charge: panel.startCharge, square: panel.startSquare };
      const { charge, square } = integratePanel(characteristic, panel.drive, sigma, current_A);
      return { charge: panel.startCharge + charge, square: panel.startSquare + square };
    },
  };
}
