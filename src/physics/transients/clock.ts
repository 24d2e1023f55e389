import type { FluxCharacteristic } from '../characteristic.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import { type Collocation, radauCollocation, seriesThrough } from '../numerics/collocation.ts';
import { type LegendreSeries, seriesIntegral, seriesValue } from '../numerics/legendre-series.ts';
import {
  type Drive,
  responseCurrent,
  responseIntegral,
  responseSigma,
  responseSquareIntegral,
  responseVoltage,
  settledCurrent,
} from './unit-response.ts';

/** Time and the integrals over it along a response in σ (see unit-response.ts): dt = L_d dσ. */
export interface Clock {
  /** t(σ) in s. */
  timeAt(sigma: number): number;
  /** The inverse, in 1/Ω. */
  sigmaAt(time_s: number): number;
  /** ∫ i dt from the start, in A·s. */
  chargeTo(sigma: number): number;
  /** ∫ i² dt from the start, in A²·s. */
  squareTo(sigma: number): number;
}

/** Where a clock has to reach: whichever of the two comes last where both are finite is not needed, one is enough. */
export interface ClockEnd {
  readonly sigma: number;
  readonly time_s: number;
}

/** The clock of a constant inductance: closed forms. */
export function linearClock(inductance_H: number, drive: Drive): Clock {
  return {
    timeAt: (sigma) => inductance_H * sigma,
    sigmaAt: (time_s) => time_s / inductance_H,
    chargeTo: (sigma) => inductance_H * responseIntegral(drive, sigma),
    squareTo: (sigma) => inductance_H * responseSquareIntegral(drive, sigma),
  };
}

interface Panel {
  readonly startSigma: number;
  readonly width: number;
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
const FLUX_TOLERANCE = 1e-12;

/**
 * The clock of any characteristic: panels of 12-point Radau quadrature, halved until the integrands' Legendre series have
 * converged and the flux linkage is conserved, from σ = 0 to `end.sigma` or until `end.time_s` is covered, whichever comes
 * first. `sigmaLimit` is where the characteristic ends (Infinity for a construction); returns null where that comes first.
 *
 * A corner or jump of L_d (a measured sweep's readings) is closed in on by halving; a characteristic that is itself noisy by
 * more than the tolerance costs more panels but still ends.
 */
export function panelClock(
  characteristic: FluxCharacteristic,
  drive: Drive,
  end: ClockEnd,
  sigmaLimit: number,
): Clock | null {
  const panels: Panel[] = [];
  const lastSigma = Math.min(end.sigma, sigmaLimit);
  const state = { sigma: 0, time_s: 0, charge: 0, square: 0 };
  // L_d is even in i and may peak at zero current: a panel never straddles it.
  const sigmaZero = drive.initialCurrent_A * settledCurrent(drive) < 0 ? responseSigma(drive, 0) : Infinity;
  let width = firstWidth(characteristic, drive, end, lastSigma);
  let halvings = 0;
  while (state.sigma < lastSigma && state.time_s < end.time_s) {
    const stop = state.sigma < sigmaZero ? Math.min(lastSigma, sigmaZero) : lastSigma;
    // A sliver left before the stop would cost a panel of its own.
    const wanted = state.sigma + 1.001 * width >= stop ? stop - state.sigma : width;
    const panel = integratePanel(characteristic, drive, state.sigma, wanted);
    const quality = judge(panel, state, wanted);
    const noise = halvings >= 45 && (panels.length > 0 || quality < 1e4);
    if (!(quality <= 1) && !noise) {
      width = wanted / 2;
      if (++halvings > 2100 || Number.isNaN(quality)) throw outOfRange();
      continue;
    }
    panels.push({
      startSigma: state.sigma,
      width: wanted,
      startTime_s: state.time_s,
      startCharge: state.charge,
      startSquare: state.square,
      inductance: panel.inductance,
    });
    if (panels.length > 20_000) throw outOfRange();
    state.sigma = wanted === stop - state.sigma ? stop : state.sigma + wanted;
    state.time_s += panel.time_s;
    state.charge += panel.charge;
    state.square += panel.square;
    width = wanted * (quality < 1e-3 ? 3 : quality < 0.1 ? 1.5 : 1);
    halvings = 0;
  }
  if (sigmaLimit < end.sigma && state.time_s < end.time_s) return null;
  return clockOver(panels, characteristic, drive);
}

function outOfRange(): InvalidQuantity {
  return new InvalidQuantity('', 'the transient leaves the range of numbers that can be calculated with');
}

/** A first panel width: an eighth of the way, or the whole time at the initial inductance; halving does the rest. */
function firstWidth(characteristic: FluxCharacteristic, drive: Drive, end: ClockEnd, lastSigma: number): number {
  const byTime = end.time_s / characteristic.differentialInductance_H(drive.initialCurrent_A);
  const width = Math.min(lastSigma / 8, byTime);
  if (!(width > 0 && Number.isFinite(width))) throw outOfRange();
  return width;
}

interface PanelIntegrals {
  readonly time_s: number;
  readonly charge: number;
  readonly square: number;
  readonly inductance: LegendreSeries;
  /** The last two Legendre coefficients' magnitude of L_d, i·L_d and i²·L_d. */
  readonly tails: readonly [number, number, number];
  /** |∫ L_d di − Δλ| over the larger |λ| at the ends. */
  readonly fluxMismatch: number;
}

function integratePanel(
  characteristic: FluxCharacteristic,
  drive: Drive,
  startSigma: number,
  width: number,
): PanelIntegrals {
  const { stages, nodes, weights } = RULE;
  const integrands = [new Float64Array(stages), new Float64Array(stages), new Float64Array(stages)] as const;
  const sums = [0, 0, 0];
  let flux = 0;
  let current = drive.initialCurrent_A;
  for (let j = 0; j < stages; j++) {
    const sigma = startSigma + (width * (1 + nodes[j]!)) / 2;
    current = responseCurrent(drive, sigma);
    let value = characteristic.differentialInductance_H(current);
    flux += weights[j]! * value * responseVoltage(drive, sigma);
    for (let power = 0; power < 3; power++) {
      integrands[power]![j] = value;
      sums[power]! += weights[j]! * value;
      value *= current;
    }
  }
  const series = integrands.map((values) => seriesThrough(RULE, values));
  const tails = series.map((c) => Math.abs(c[stages - 1]!) + Math.abs(c[stages - 2]!));
  const start = characteristic.fluxLinkage_Wb(responseCurrent(drive, startSigma));
  const finish = characteristic.fluxLinkage_Wb(current);
  const scale = Math.max(Math.abs(start), Math.abs(finish));
  return {
    time_s: width * sums[0]!,
    charge: width * sums[1]!,
    square: width * sums[2]!,
    inductance: series[0]!,
    tails: [tails[0]!, tails[1]!, tails[2]!],
    fluxMismatch: scale === 0 ? 0 : Math.abs(width * flux - (finish - start)) / scale,
  };
}

/** The panel's worst error over its tolerance: 1 or less is accepted. */
function judge(
  panel: PanelIntegrals,
  before: { readonly time_s: number; readonly charge: number; readonly square: number },
  width: number,
): number {
  const [time, charge, square] = panel.tails;
  const ratio = (tail: number, total: number) => (tail === 0 ? 0 : (width * tail) / (TAIL_TOLERANCE * total));
  return Math.max(
    ratio(time, before.time_s + panel.time_s),
    ratio(charge, Math.abs(before.charge) + Math.abs(panel.charge)),
    ratio(square, before.square + panel.square),
    panel.fluxMismatch / FLUX_TOLERANCE,
  );
}

function clockOver(panels: readonly Panel[], characteristic: FluxCharacteristic, drive: Drive): Clock {
  const panelAtSigma = (sigma: number) => lastStarting(panels, (panel) => panel.startSigma <= sigma);
  const partial = (sigma: number) => {
    const panel = panelAtSigma(sigma);
    return { panel, integrals: integratePanel(characteristic, drive, panel.startSigma, sigma - panel.startSigma) };
  };
  return {
    timeAt: (sigma) => {
      if (sigma === 0) return 0;
      const { panel, integrals } = partial(sigma);
      return panel.startTime_s + integrals.time_s;
    },
    sigmaAt: (time_s) => {
      const panel = lastStarting(panels, (candidate) => candidate.startTime_s <= time_s);
      const x = positionAt(panel.inductance, panel.width, time_s - panel.startTime_s);
      return panel.startSigma + (panel.width * (1 + x)) / 2;
    },
    chargeTo: (sigma) => {
      if (sigma === 0) return 0;
      const { panel, integrals } = partial(sigma);
      return panel.startCharge + integrals.charge;
    },
    squareTo: (sigma) => {
      if (sigma === 0) return 0;
      const { panel, integrals } = partial(sigma);
      return panel.startSquare + integrals.square;
    },
  };
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
