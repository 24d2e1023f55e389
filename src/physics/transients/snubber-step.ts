import type { FluxCharacteristic } from '../characteristic.ts';
import { type Collocation, radauCollocation, seriesThrough } from '../numerics/collocation.ts';
import { type LegendreSeries, seriesIntegral, seriesSlope } from '../numerics/legendre-series.ts';
import { solveInPlace } from '../numerics/linear-solve.ts';
import { bounded } from './panel.ts';

/** Where a saturating inductor and its snubber stand: u = capacitor voltage − source, which tends to zero as the current does. */
export interface SnubberState {
  readonly current_A: number;
  readonly excess_V: number;
}

/** One step in σ = ∫ dt/L_d (see unit-response.ts), with what happened in it as Legendre series over x from −1 to 1. */
export interface SnubberStep {
  readonly start: SnubberState;
  readonly end: SnubberState;
  readonly width: number;
  readonly duration_s: number;
  /** ∫ i dt over the step in A·s, ∫ i² dt in A²·s. */
  readonly charge: number;
  readonly square: number;
  readonly current: LegendreSeries;
  readonly excess: LegendreSeries;
  readonly inductance: LegendreSeries;
  readonly largestCurrent_A: number;
  /** Truncation over its tolerance, relative to the step's own largest values and all the time so far: 1 or less is good. */
  readonly truncation: (elapsed_s: number) => number;
  /** Flux linkage lost over its tolerance: 1 or less is good. */
  readonly fluxLost: number;
}

/** The equation that is stepped through: the loop's resistance, the capacitance, and the characteristic. */
export interface SnubberEquation {
  readonly characteristic: FluxCharacteristic;
  readonly resistance_ohm: number;
  readonly capacitance_F: number;
}

const RULE: Collocation = radauCollocation(12);

/** Of the last two Legendre coefficients of current, voltage and inductance, relative to the largest value in the step. */
const TAIL_TOLERANCE = 1e-11;

/** Of ∫ L_d di against λ(i₁) − λ(i₀), relative to λ: catches a knee that the current passes between two nodes. */
const FLUX_TOLERANCE = 1e-11;

const NEWTON_TOLERANCE = 2e-14;

/**
 * One step of Radau IIA collocation (12 stages, order 23, L-stable) of
 *
 *     di/dσ = −R·i − u,   du/dσ = i·L_d(i)/C,   dt/dσ = L_d(i).
 *
 * In σ the stiff part is linear with a constant coefficient, saturated or not, and the inverse characteristic is not
 * needed. The capacitor's equation is put into the current's, which leaves the stage currents as unknowns:
 *
 *     I + h·R·A·I + (h²/C)·A²·(L_d(I)·I) = i₀ − h·u₀·A·1,
 *
 * solved by Newton's iteration with the slope of L_d of each stage from its last two iterates (a secant, since L_d at a stage
 * depends on that stage's current only). Null where that does not converge: the step is too long.
 */
export function snubberStep(equation: SnubberEquation, start: SnubberState, width: number): SnubberStep | null {
  const { resistance_ohm, capacitance_F, characteristic } = equation;
  const { stages, matrix, weights, nodes } = RULE;
  const inductanceAt = boundedInductance(characteristic);
  const solved = stageCurrents(equation, inductanceAt, start, width);
  if (solved === null) return null;
  const { currents, inductances } = solved;

  const charging = currents.map((current, j) => (current * inductances[j]! * width) / capacitance_F);
  const excesses = new Float64Array(stages);
  let mean = 0;
  let charge = 0;
  let square = 0;
  for (let j = 0; j < stages; j++) {
    let rise = 0;
    for (let k = 0; k < stages; k++) rise += matrix[j * stages + k]! * charging[k]!;
    excesses[j] = start.excess_V + rise;
    mean += weights[j]! * inductances[j]!;
    charge += width * weights[j]! * inductances[j]! * currents[j]!;
    square += width * weights[j]! * inductances[j]! * currents[j]! * currents[j]!;
  }
  const end = { current_A: currents[stages - 1]!, excess_V: excesses[stages - 1]! };
  const current = seriesThrough(RULE, currents);
  const excess = seriesThrough(RULE, excesses);
  const inductance = seriesThrough(RULE, inductances);
  const largestCurrent_A = largest(currents, start.current_A);
  const duration_s = width * mean;
  if (!Number.isFinite(duration_s + end.current_A + end.excess_V + resistance_ohm)) return null;

  let swept = 0;
  for (let j = 0; j < stages; j++) swept += 2 * weights[j]! * inductances[j]! * seriesSlope(current, nodes[j]!);
  const clamp = (i: number) => bounded(i, characteristic.maximumCurrent_A);
  const [before, after] = [
    characteristic.fluxLinkage_Wb(clamp(start.current_A)),
    characteristic.fluxLinkage_Wb(clamp(end.current_A)),
  ];
  const fluxScale = Math.max(Math.abs(before), Math.abs(after), Number.MIN_VALUE);
  const fluxLost = Math.abs(swept - (after - before)) / fluxScale / FLUX_TOLERANCE;
  const truncation = (elapsed_s: number) => {
    const inductanceTail = tail(inductance) * width;
    return Math.max(
      tail(current) / (TAIL_TOLERANCE * (largestCurrent_A + Number.MIN_VALUE)),
      tail(excess) / (TAIL_TOLERANCE * (largest(excesses, start.excess_V) + Number.MIN_VALUE)),
      // Only its integral, the time, matters: a jump of L_d needs no more than a short step across it.
      inductanceTail / (TAIL_TOLERANCE * (duration_s + elapsed_s)),
    );
  };
  return {
    start,
    end,
    width,
    duration_s,
    charge,
    square,
    current,
    excess,
    inductance,
    largestCurrent_A,
    truncation,
    fluxLost,
  };
}

/** Seconds from the step's start to x. */
export function elapsedAt(step: SnubberStep, x: number): number {
  return (step.width / 2) * seriesIntegral(step.inductance, x);
}

/** L_d, held past the end of the characteristic: for Newton's iterates and rejected steps only, never for an accepted one. */
function boundedInductance({ differentialInductance_H, maximumCurrent_A }: FluxCharacteristic) {
  return (current_A: number) => differentialInductance_H(bounded(current_A, maximumCurrent_A));
}

function tail(series: LegendreSeries): number {
  return Math.abs(series[series.length - 1]!) + Math.abs(series[series.length - 2]!);
}

function largest(values: Float64Array, first: number): number {
  return values.reduce((most, value) => Math.max(most, Math.abs(value)), Math.abs(first));
}

function stageCurrents(
  { resistance_ohm, capacitance_F }: SnubberEquation,
  inductanceAt: (current_A: number) => number,
  start: SnubberState,
  width: number,
): { currents: Float64Array; inductances: Float64Array } | null {
  const { stages: s, matrix, matrixSquared, nodes } = RULE;
  const damping = width * resistance_ohm;
  const stiffness = (width / capacitance_F) * width;
  const currents = new Float64Array(s).fill(start.current_A);
  const inductances = currents.map(inductanceAt);
  const slopes = new Float64Array(s);
  const jacobian = new Float64Array(s * s);
  const change = new Float64Array(s);
  let lastMove = Infinity;
  for (let iteration = 0; iteration < 20; iteration++) {
    for (let j = 0; j < s; j++) {
      let residual = start.current_A - (width * start.excess_V * (1 + nodes[j]!)) / 2 - currents[j]!;
      for (let k = 0; k < s; k++) {
        const resistive = damping * matrix[j * s + k]!;
        const capacitive = stiffness * matrixSquared[j * s + k]!;
        residual -= (resistive + capacitive * inductances[k]!) * currents[k]!;
        jacobian[j * s + k] =
          resistive + capacitive * (inductances[k]! + currents[k]! * slopes[k]!) + (j === k ? 1 : 0);
      }
      change[j] = residual;
    }
    if (!solveInPlace(jacobian, change)) return null;
    let move = 0;
    let size = Math.abs(start.current_A);
    for (let j = 0; j < s; j++) {
      const next = currents[j]! + change[j]!;
      const inductance = inductanceAt(next);
      // A difference over less than this would be rounding; the slope of the iterate before is kept.
      if (Math.abs(change[j]!) > 1e-9 * Math.abs(next)) slopes[j] = (inductance - inductances[j]!) / change[j]!;
      currents[j] = next;
      inductances[j] = inductance;
      move = Math.max(move, Math.abs(change[j]!));
      size = Math.max(size, Math.abs(next));
    }
    // The secant's order is 1.6: a small move that is a thousandth of the one before leaves an error below rounding.
    if (move <= NEWTON_TOLERANCE * size || (move <= 1e-9 * size && move <= 1e-3 * lastMove))
      return { currents, inductances };
    if (!Number.isFinite(move) || (iteration > 4 && move > lastMove && move > 1e-10 * size)) return null;
    lastMove = move;
  }
  return null;
}
