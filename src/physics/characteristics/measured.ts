import type { FluxCharacteristic } from '../characteristic.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { fivePointSlopes, hermite, limitSlopes, type PiecewiseCubic } from '../numerics/monotone-interpolation.ts';
import { findRoot } from '../numerics/roots.ts';
import { sweepError } from './sweep-error.ts';

/** Inductance over current as a rig reads it: differential dλ/di (small signal on a bias) or apparent λ/i (one large pulse). */
export interface Sweep {
  readonly kind: 'differential' | 'apparent';
  readonly current_A: readonly number[];
  readonly inductance_H: readonly number[];
}

/** A current that was computed as the last reading is not refused for its last bit. */
const ROUNDING = 4 * Number.EPSILON;

/** λ and its relatives for 0 ≤ i ≤ the last reading. */
interface Branch {
  readonly fluxLinkage_Wb: (current_A: number) => number;
  readonly differentialInductance_H: (current_A: number) => number;
  readonly energy_J: (current_A: number) => number;
  readonly coenergy_J: (current_A: number) => number;
  readonly slopeTurns_A: () => number[];
}

/**
 * The flux characteristic through a measured sweep, never beyond its last reading; below the first reading above zero current the
 * inductance is held constant.
 *
 * - differential: dλ/di is interpolated between the readings (piecewise cubic, no overshoot, so positive) and λ is its integral;
 * - apparent: λ = L·i is interpolated through the readings, with slopes L + i dL/di, which the readings of L determine better
 *   than those of λ, limited so that λ keeps rising.
 *
 * Energy ∫ i dλ and co-energy are the exact integrals of the interpolant, never ½·L·i². `relativeError` bounds what the
 * readings leave open in λ and energy (see `sweepError`); between them, dλ/di of an apparent sweep is less sure.
 *
 * Throws `InvalidQuantity` at `/current_A…` or `/inductance_H…`: fewer than two readings, unequal lengths, currents that do not
 * increase or are negative, an inductance that is not positive, an apparent inductance that falls so steeply that λ = L·i does.
 *
 * Error of the interpolation over nine analytic curves λ = L∞·i + Λ·f(i), f of the three saturation laws, readings equally spaced up to
 * 1, 2 and 4 times the current of half inductance; typical (geometric mean), worst; dλ/di relative to its value at zero:
 *
 * | readings | kind | λ | energy | dλ/di |
 * |---|---|---|---|---|
 * | 6 | differential | 7e-4, 4e-2 | 1e-3, 5e-2 | 1e-3, 5e-2 |
 * | 6 | apparent | 8e-4, 2e-2 | 1e-3, 2e-2 | 3e-3, 2e-2 |
 * | 10 | differential | 4e-5, 1e-3 | 7e-5, 2e-3 | 1e-4, 3e-3 |
 * | 10 | apparent | 1e-4, 2e-3 | 1e-4, 2e-3 | 3e-4, 3e-3 |
 * | 20 | differential | 2e-6, 6e-5 | 3e-6, 1e-4 | 5e-6, 2e-4 |
 * | 20 | apparent | 7e-6, 1e-4 | 1e-5, 2e-4 | 3e-5, 5e-4 |
 * | 50 | differential | 4e-8, 2e-6 | 5e-8, 3e-6 | 9e-8, 6e-6 |
 * | 50 | apparent | 2e-7, 6e-6 | 2e-7, 5e-6 | 2e-6, 2e-5 |
 */
export function measuredCharacteristic(sweep: Sweep): FluxCharacteristic {
  checkReadings(sweep);
  const { current, inductance } = fromZero(sweep);
  const branch =
    sweep.kind === 'differential' ? differentialBranch(current, inductance) : apparentBranch(current, inductance);
  const maximumCurrent_A = current.at(-1)!;
  const magnitude = (current_A: number) => {
    const i = Math.abs(current_A);
    if (i <= maximumCurrent_A * (1 + ROUNDING)) return Math.min(i, maximumCurrent_A);
    throw new InvalidQuantity('', `${current_A} A is beyond the last reading of the sweep, at ${maximumCurrent_A} A`);
  };
  const fluxLinkage_Wb = (current_A: number) => Math.sign(current_A) * branch.fluxLinkage_Wb(magnitude(current_A));
  const atReading = current.map(branch.fluxLinkage_Wb);
  return {
    kind: 'measured',
    maximumCurrent_A,
    method: methodOf(sweep, sweepError(sweep.kind, current, inductance, branch.fluxLinkage_Wb, branch.energy_J)),
    slopeTurns_A: branch.slopeTurns_A().slice(1),
    fluxLinkage_Wb,
    differentialInductance_H: (current_A) => branch.differentialInductance_H(magnitude(current_A)),
    apparentInductance_H: (current_A) =>
      current_A === 0 ? branch.differentialInductance_H(0) : fluxLinkage_Wb(current_A) / current_A,
    energy_J: (current_A) => branch.energy_J(magnitude(current_A)),
    coenergy_J: (current_A) => branch.coenergy_J(magnitude(current_A)),
    current_A: (fluxLinkage) =>
      Math.sign(fluxLinkage) * currentAt(Math.abs(fluxLinkage), current, atReading, branch.fluxLinkage_Wb),
  };
}

/** λ as the integral of an interpolated dλ/di; with y = dλ/di, W = ∫ i y di. */
function differentialBranch(current: readonly number[], inductance: readonly number[]): Branch {
  const curve = hermite(current, inductance, fivePointSlopes(current, inductance));
  return {
    fluxLinkage_Wb: curve.integral,
    differentialInductance_H: curve.value,
    energy_J: curve.moment,
    coenergy_J: (i) => i * curve.integral(i) - curve.moment(i),
    slopeTurns_A: () => [...current],
  };
}

/** λ itself interpolated; with y = λ, W = ∫ i dy and W′ = ∫ y di. */
function apparentBranch(current: readonly number[], inductance: readonly number[]): Branch {
  const curve = fluxCurve(current, inductance);
  return {
    fluxLinkage_Wb: curve.value,
    differentialInductance_H: curve.slope,
    energy_J: curve.stieltjes,
    coenergy_J: curve.integral,
    slopeTurns_A: curve.slopeTurns,
  };
}

/** Slopes between a tenth of the flatter neighbouring secant and this many of it keep dλ/di positive inside a piece as well. */
const STEEPEST = 2.85;
const FLATTEST = 0.1;

function fluxCurve(current: readonly number[], inductance: readonly number[]): PiecewiseCubic {
  const inductanceSlopes = fivePointSlopes(current, inductance);
  const points = current.map((i, k) => ({
    i,
    linkage: i * inductance[k]!,
    slope: inductance[k]! + i * inductanceSlopes[k]!,
  }));
  const [origin, first] = [points[0]!, points[1]!];
  const secant = first.linkage / first.i;
  if (origin.slope > STEEPEST * secant) points.splice(1, 0, kneeBefore(first, origin.slope));
  const i = points.map((point) => point.i);
  const linkage = points.map((point) => point.linkage);
  const slopes = points.map((point, k) => Math.max(point.slope, FLATTEST * flattest(i, linkage, k)));
  return hermite(i, linkage, limitSlopes(i, linkage, slopes, STEEPEST));
}

/** The smaller of the secants on either side of point k. */
function flattest(i: readonly number[], linkage: readonly number[], k: number): number {
  const secant = (j: number) => (linkage[j + 1]! - linkage[j]!) / (i[j + 1]! - i[j]!);
  if (k === 0) return secant(0);
  return k === i.length - 1 ? secant(k - 1) : Math.min(secant(k - 1), secant(k));
}

interface FluxPoint {
  readonly i: number;
  readonly linkage: number;
  readonly slope: number;
}

/**
 * A point to put between zero current and the first reading where one cubic cannot start at the inductance read at zero, because it falls
 * too far before that reading: dλ/di then falls along two straight lines, steeply to here and gently after. (L. L. Schumaker, "On
 * shape preserving quadratic spline interpolation", SIAM J. Numer. Anal. 20 (1983) 854-864, from memory.)
 */
function kneeBefore(first: FluxPoint, initialSlope: number): FluxPoint {
  const i = first.linkage / initialSlope; // here a line of the initial slope would meet the first reading's flux
  const end = Math.min(Math.max(first.slope, 0), first.linkage / first.i);
  const slope = (2 * first.linkage - initialSlope * i - end * (first.i - i)) / first.i;
  return { i, linkage: ((initialSlope + slope) / 2) * i, slope };
}

/** The inverse of a rising λ(i): the piece by its ends, then Brent. */
function currentAt(
  fluxLinkage_Wb: number,
  current: readonly number[],
  atReading: readonly number[],
  fluxAt: (current_A: number) => number,
): number {
  const last = atReading.length - 1;
  if (!(fluxLinkage_Wb <= atReading[last]! * (1 + ROUNDING))) {
    throw new InvalidQuantity(
      '',
      `${fluxLinkage_Wb} Wb is beyond the last reading of the sweep, at ${atReading[last]} Wb`,
    );
  }
  const upper = atReading.findIndex((linkage) => linkage >= fluxLinkage_Wb);
  if (upper < 0) return current[last]!;
  if (upper === 0 || atReading[upper] === fluxLinkage_Wb) return current[upper]!;
  return findRoot((i) => fluxAt(i) - fluxLinkage_Wb, current[upper - 1]!, current[upper]!);
}

/** The sweep starting at zero current, where the first reading's inductance is repeated if there was none. */
function fromZero({ current_A, inductance_H }: Sweep): { current: readonly number[]; inductance: readonly number[] } {
  if (current_A[0] === 0) return { current: current_A, inductance: inductance_H };
  return { current: [0, ...current_A], inductance: [inductance_H[0]!, ...inductance_H] };
}

function checkReadings({ kind, current_A, inductance_H }: Sweep): void {
  if (current_A.length < 2) throw new InvalidQuantity('/current_A', 'a sweep has at least two readings');
  if (inductance_H.length !== current_A.length) {
    throw new InvalidQuantity(
      '/inductance_H',
      `as many inductances as currents are needed: ${inductance_H.length} for ${current_A.length}`,
    );
  }
  current_A.forEach((current, k) => {
    const [inductance, before] = [inductance_H[k]!, current_A[k - 1]];
    if (!(current >= 0 && Number.isFinite(current))) {
      throw new InvalidQuantity(`/current_A/${k}`, `a sweep's currents are not negative, as ${current} A is`);
    }
    if (before !== undefined && !(current > before)) {
      throw new InvalidQuantity(
        `/current_A/${k}`,
        `currents increase along a sweep, but ${current} A follows ${before} A`,
      );
    }
    if (!(inductance > 0 && Number.isFinite(inductance))) {
      throw new InvalidQuantity(`/inductance_H/${k}`, `an inductance is positive, not ${inductance} H`);
    }
    if (kind === 'apparent' && before !== undefined && !(inductance * current > inductance_H[k - 1]! * before)) {
      throw new InvalidQuantity(
        `/inductance_H/${k}`,
        `flux linkage falls: ${inductance * current} Wb at ${current} A after ${inductance_H[k - 1]! * before} Wb at ${before} A`,
      );
    }
  });
}

function methodOf({ kind, current_A }: Sweep, relativeError: number): Method {
  const [first, last] = [current_A[0]!, current_A.at(-1)!];
  return {
    name: `measured ${kind} inductance, interpolated without overshoot`,
    references: [
      'F. N. Fritsch, R. E. Carlson, SIAM J. Numer. Anal. 17 (1980)',
      'J. M. Hyman, SIAM J. Sci. Stat. Comput. 4 (1983)',
    ],
    relativeError,
    validity:
      `from 0 A to the last reading at ${last} A, nothing extrapolated` +
      (first > 0 ? `; inductance held constant below the first reading at ${first} A` : ''),
  };
}
