import { inverse } from './pulse-cholesky.ts';
import {
  addLogSlopeSensitivity,
  arcAt,
  type Curve,
  curveOf,
  exchanged,
  linkageAt,
  logSlopeAt,
  logSlopeTurnAt,
  onTwiceTheIntervals,
  sensitivityAt,
  sensitivityOf,
} from './pulse-curve.ts';
import {
  DIFFERENCE,
  type Fit,
  fitCurve,
  NUISANCES,
  ORDER,
  type Prior,
  type Readings,
  thirdDifference,
  type Zeros,
} from './pulse-fit.ts';
import { unimodal } from './pulse-shape.ts';

/** A fit with how likely the readings are under its smoothing. */
interface Candidate extends Fit {
  readonly prior: Prior;
  /** log₁₀ μ, of coefficients on one interval a unit of s */
  readonly level: number;
  /** −2 ln of the readings' restricted likelihood, up to a constant of the readings and the number of intervals */
  readonly deviance: number;
  /** estimated noise variance of a reading of weight one */
  readonly variance: number;
}

/** The smooth curve through noisy readings, and how sure it is. */
export interface SmoothCurve {
  readonly curve: Curve;
  readonly zeros: Zeros;
  /** of the coefficients, shift and offset, row-major */
  readonly covariance: Float64Array;
  /** s of the readings, increasing */
  readonly places: Float64Array;
}

/** From so stiff that f is a quadratic to so soft that readings a thousandth of 12 bit noisy decide every coefficient. */
const STIFFEST = -2;
const SOFTEST = -16;
/** A likelihood e¹⁰ below the best one ends the search, half that is too little to count. */
const HOPELESS = 20;
const NEGLIGIBLE = 10;
/** Residuals above this many times the noise variance known beforehand mean that the search has not come to the curve yet. */
const MISFIT = 1.5;

/** Spline intervals, doubled where these are too few. */
const INTERVALS = 40;

/**
 * Smooths readings: f = ln(di/dλ) is taken as a random function whose third derivative is white noise, and everything else follows from the
 * likelihood of the readings. That is a penalised spline whose smoothing is chosen by restricted maximum likelihood (G. Wahba, Ann. Statist. 13
 * (1985) 1378-1402; S. N. Wood, J. R. Statist. Soc. B 73 (2011) 3-36), linearised at each fit; over the smoothings that the likelihood leaves
 * open the curves are averaged by it, so that the covariance has both the noise's part, the smoothing's bias as its prior has it (D. Nychka,
 * J. Amer. Statist. Assoc. 83 (1988) 1134-1143) and what is open about the smoothing. References from memory.
 *
 * A knee between two straight parts needs softness in one place alone. The roughness that the first fits find over s is therefore given
 * back as the prior's own, and kept where the likelihood rises by it.
 *
 * `noiseVariance`: of a reading of weight one, known beforehand, 0 where it is not; it only keeps the search going until the curve follows
 * the readings. `zeroDeviations`: standard uncertainties of the readings' zeros. Null where no fit could be made.
 */
export function smoothCurve(readings: Readings, noiseVariance: number, zeroDeviations: Zeros): SmoothCurve | null {
  const task: Task = { readings, noiseVariance, zeroDeviations };
  const even = (intervals: number) => new Float64Array(intervals).fill(1);
  let plain = scan(task, even(INTERVALS), new Float64Array(INTERVALS + ORDER), STIFFEST);
  if (plain.length === 0) return null;
  const { curve, level } = best(plain);
  // Where the readings decide half of what the spline can be, its knots limit it and no longer its prior.
  if (2 * decided(best(plain)) > INTERVALS && readings.linkage.length > 2 * INTERVALS) {
    const finer = scan(
      task,
      even(2 * INTERVALS),
      onTwiceTheIntervals(curve.coefficients),
      Math.min(level + 2, STIFFEST),
    );
    if (finer.length > 0) plain = finer;
  }
  return averageOf(adapted(task, plain), readings);
}

/** A first curve through readings, soon made and good enough to group samples along. Null where none could be made. */
export function roughCurve(readings: Readings, noiseVariance: number, zeroDeviations: Zeros): Fit | null {
  const start = new Float64Array(ROUGH_INTERVALS + ORDER);
  const candidates = scan(
    { readings, noiseVariance, zeroDeviations },
    new Float64Array(ROUGH_INTERVALS).fill(1),
    start,
    STIFFEST,
  );
  return candidates.length > 0 ? best(candidates) : null;
}

const ROUGH_INTERVALS = 20;

interface Task {
  readonly readings: Readings;
  readonly noiseVariance: number;
  readonly zeroDeviations: Zeros;
}

/** Rounds of giving the roughness back to the prior, at most. */
const ROUNDS = 4;

/** The candidates and those whose prior is as rough over s as the candidates are, for as long as the likelihood rises. */
function adapted(task: Task, plain: Candidate[]): Candidate[] {
  let candidates = plain;
  for (let round = 0; round < ROUNDS; round++) {
    const before = best(candidates);
    const weights = priorWeights(curveOf(meanOf(sharesOf(candidates)).slice(0, -NUISANCES)));
    candidates = [
      ...candidates,
      ...scan(task, weights, before.curve.coefficients, Math.min(before.level + 2, STIFFEST)),
    ];
    if (best(candidates).deviance > before.deviance - 1) break;
  }
  return candidates;
}

/** Fits from stiff to soft by decades, each from the last; then half decades where it matters. */
function scan(task: Task, weights: Float64Array, start: Float64Array, stiffest: number): Candidate[] {
  const { readings, noiseVariance } = task;
  const candidates: Candidate[] = [];
  let last: Candidate | null = null;
  let least = Number.POSITIVE_INFINITY;
  for (let level = stiffest; level >= SOFTEST; level--) {
    const candidate = candidateAt(task, weights, level, last?.curve.coefficients ?? start, last ?? null);
    if (!candidate) break;
    candidates.push(candidate);
    last = candidate;
    least = Math.min(least, candidate.deviance);
    const follows = candidate.residual < MISFIT * noiseVariance * readings.linkage.length;
    if (follows && candidate.deviance > least + HOPELESS) break;
  }
  const between = candidates
    .filter(({ deviance }) => deviance < least + NEGLIGIBLE)
    .map((near) => candidateAt(task, weights, near.level - 0.5, near.curve.coefficients, near));
  return [...candidates, ...between.filter((candidate) => candidate !== null)];
}

/** A zero with no more uncertainty than this is known. */
const KNOWN = 1e-9;

function candidateAt(
  { readings, noiseVariance, zeroDeviations }: Task,
  weights: Float64Array,
  level: number,
  start: Float64Array,
  before: Candidate | null,
): Candidate | null {
  const intervals = start.length - 3;
  // ∫(f‴)² ds ≈ intervals⁵·Σ(third differences)²
  const logSmoothing = level * Math.LN10 + 5 * Math.log(intervals);
  const smoothing = Math.exp(logSmoothing);
  const variance = before?.variance ?? noiseVariance;
  const prior = {
    smoothing,
    weights,
    shiftPrecision: variance / Math.max(zeroDeviations.shift, KNOWN) ** 2,
    offsetPrecision: variance / Math.max(zeroDeviations.offset, KNOWN) ** 2,
  };
  const fit = fitCurve(readings, prior, start, before?.zeros ?? { shift: 0, offset: 0 });
  if (!fit) return null;
  const freedom = readings.linkage.length - ORDER;
  const deviance = freedom * Math.log(fit.objective) + fit.logDeterminant - weights.length * logSmoothing;
  return Number.isFinite(deviance) ? { ...fit, prior, level, deviance, variance: fit.objective / freedom } : null;
}

function best(candidates: readonly Candidate[]): Candidate {
  return candidates.reduce((a, b) => (b.deviance < a.deviance ? b : a));
}

/** Width over which the roughness found is spread, in s, and the least of it beside its mean: both by trial over simulated pulses. */
const SPREAD = 0.06;
const LEAST_ROUGHNESS = 1e-4;

/** Weights of the third differences, inversely as the curve's own mean square of them around each place; geometric mean one. */
function priorWeights({ intervals, coefficients }: Curve): Float64Array {
  const count = coefficients.length - ORDER;
  const width = SPREAD * intervals;
  const rough = new Float64Array(count);
  for (let r = 0; r < count; r++) {
    let sum = 0;
    let total = 0;
    for (let q = 0; q < count; q++) {
      const share = Math.exp(-(((r - q) / width) ** 2) / 2);
      sum += share * thirdDifference(coefficients, q) ** 2;
      total += share;
    }
    rough[r] = sum / total;
  }
  const mean = rough.reduce((a, b) => a + b) / count;
  if (!(mean > 0)) return new Float64Array(count).fill(1);
  const logs = rough.map((value) => -Math.log(value / mean + LEAST_ROUGHNESS));
  const middle = logs.reduce((a, b) => a + b) / count;
  return logs.map((value) => Math.exp(value - middle));
}

/** A candidate and its share of the average: by likelihood, each smoothing as likely beforehand as the next on a logarithmic scale. */
interface Share {
  readonly candidate: Candidate;
  readonly share: number;
}

function sharesOf(candidates: readonly Candidate[]): Share[] {
  const { deviance: least } = best(candidates);
  const counted = candidates
    .filter(({ deviance }) => deviance < least + NEGLIGIBLE)
    .map((candidate) => ({ candidate, share: Math.exp((least - candidate.deviance) / 2) }));
  const total = counted.reduce((sum, { share }) => sum + share, 0);
  return counted.map(({ candidate, share }) => ({ candidate, share: share / total }));
}

/** The average's coefficients and zeros. */
function meanOf(shares: readonly Share[]): Float64Array {
  const mean = new Float64Array(shares[0]!.candidate.curve.coefficients.length + NUISANCES);
  for (const { candidate, share } of shares) {
    parameters(candidate).forEach((value, a) => {
      mean[a]! += share * value;
    });
  }
  return mean;
}

function averageOf(candidates: readonly Candidate[], { linkage }: Readings): SmoothCurve {
  const shares = sharesOf(candidates);
  const mean = meanOf(shares);
  const size = mean.length;
  const covariance = new Float64Array(size * size);
  for (const { candidate, share } of shares) {
    const own = inverse(candidate.factor, size);
    const away = parameters(candidate).map((value, a) => value - mean[a]!);
    for (let a = 0; a < size; a++) {
      for (let b = 0; b < size; b++) {
        covariance[a * size + b]! += share * (candidate.variance * own[a * size + b]! + away[a]! * away[b]!);
      }
    }
  }
  const shaped = unimodal(mean, covariance, size - NUISANCES);
  const curve = curveOf(shaped.slice(0, -NUISANCES));
  const zeros = { shift: shaped[size - 2]!, offset: shaped[size - 1]! };
  return { curve, zeros, covariance, places: linkage.map((lambda) => arcAt(curve, lambda + zeros.shift)).sort() };
}

function parameters({ curve, zeros }: Fit): Float64Array {
  return Float64Array.from([...curve.coefficients, zeros.shift, zeros.offset]);
}

/** Parameters that the readings decide: the trace of the influence matrix, all parameters less those that the prior decides. */
function decided({ curve, prior, factor }: Candidate): number {
  const n = curve.coefficients.length;
  const size = n + NUISANCES;
  const inverseMatrix = inverse(factor, size);
  let byPrior =
    prior.shiftPrecision * inverseMatrix[n * (size + 1)]! +
    prior.offsetPrecision * inverseMatrix[(n + 1) * (size + 1)]!;
  for (let r = 0; r < prior.weights.length; r++) {
    let quadratic = 0;
    for (let a = 0; a <= ORDER; a++) {
      for (let b = 0; b <= ORDER; b++) {
        quadratic += DIFFERENCE[a]! * DIFFERENCE[b]! * inverseMatrix[(r + a) * size + r + b]!;
      }
    }
    byPrior += prior.smoothing * prior.weights[r]! * quadratic;
  }
  return size - byPrior;
}

/** A point of a smooth curve in coordinates of one, with relative standard uncertainties at its current. */
export interface CurvePoint {
  readonly linkage: number;
  readonly current: number;
  /** dλ/di */
  readonly slope: number;
  /** standard uncertainty of ln(dλ/di) at this current */
  readonly logSlopeDeviation: number;
  /** standard uncertainty of λ at this current */
  readonly linkageDeviation: number;
}

/** The curve at each s. */
export function pointsAlong(
  { curve, covariance, places: readAt }: SmoothCurve,
  places: readonly number[],
): CurvePoint[] {
  const n = curve.coefficients.length;
  const table = sensitivityOf(curve);
  const currents = exchanged(curve);
  const row = new Float64Array(n);
  const deviation = () => {
    let sum = 0;
    for (let a = 0; a < n; a++)
      for (let b = 0; b < n; b++) sum += row[a]! * row[b]! * covariance[a * (n + NUISANCES) + b]!;
    return Math.sqrt(Math.max(sum, 0));
  };
  return places.map((s) => {
    const linkage = linkageAt(curve, s);
    const steepness = Math.exp(logSlopeAt(curve, s));
    const turn = logSlopeTurnAt(curve, s);
    const p = steepness / (1 + steepness);
    // At given current s gives way: by −(∂i/∂c)/(2p), and f with it.
    sensitivityAt(table, n, s, -turn / (2 * p), row);
    addLogSlopeSensitivity(curve.intervals, s, row);
    const logSlopeDeviation = Math.hypot(deviation(), unseen(curve, readAt, s));
    sensitivityAt(table, n, s, 1 / p, row);
    return {
      linkage,
      current: linkageAt(currents, s),
      slope: 1 / steepness,
      logSlopeDeviation,
      linkageDeviation: deviation(),
    };
  });
}

/** What f could have done between two readings: its curvature there times an eighth of their distance squared. */
function unseen(curve: Curve, readAt: Float64Array, s: number): number {
  let low = 0;
  let high = readAt.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (readAt[middle]! <= s) low = middle;
    else high = middle;
  }
  const [a, b] = [readAt[low]!, readAt[high]!];
  const gap = b - a;
  let most = 0;
  for (let k = 0; k <= 4; k++) {
    const t = a + (gap * k) / 4;
    const h = 0.5 / curve.intervals;
    most = Math.max(most, Math.abs(logSlopeTurnAt(curve, t + h) - logSlopeTurnAt(curve, t - h)) / (2 * h));
  }
  return (most * gap * gap) / 8;
}
