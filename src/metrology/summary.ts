import { type CoverageIntervals, coverageIntervals } from './coverage-interval.ts';
import { tooManyFailures } from './trials.ts';

/**
 * Largest part of the trials that may leave the model's domain. Leaving them out distorts the distribution by about as
 * much, which is little beside the 0.025 in each tail of a 95 % interval.
 */
export const TOLERATED_FAILURES = 1e-3;

/** Below it a reciprocal overflows. */
const SMALLEST_NORMAL = 2 ** -1022;

export interface Distribution extends CoverageIntervals {
  readonly mean: number;
  /** Standard deviation of the trials, JCGM 101 7.6. */
  readonly standardUncertainty: number;
}

export interface Summary extends Distribution {
  /** Trials left out because they had no result. */
  readonly failedTrials: number;
}

/**
 * Mean, standard uncertainty and coverage intervals of one output, whose samples come in any number of arrays, NaN for
 * failed trials. Throws `InvalidQuantity` '' where more than `TOLERATED_FAILURES` of them failed.
 */
export function summarise(samples: readonly Float64Array[], coverage: number): Summary {
  const trials = countOf(samples);
  const all = moments(samples);
  // NaN tells that a trial failed; as a rule none did, and nothing is copied.
  const failed = Number.isNaN(all.mean);
  const succeeded = failed ? samples.map(withoutFailures).filter(({ length }) => length > 0) : samples;
  const failedTrials = trials - countOf(succeeded);
  if (failedTrials > TOLERATED_FAILURES * trials) throw tooManyFailures(failedTrials, trials);
  const { mean, standardUncertainty } = failed ? moments(succeeded) : all;
  // An output that does not depend on what is uncertain.
  const point = { lower: mean, upper: mean };
  const intervals =
    standardUncertainty === 0 ? { symmetric: point, shortest: point } : coverageIntervals(succeeded, coverage);
  return { mean, standardUncertainty, ...intervals, failedTrials };
}

function countOf(samples: readonly Float64Array[]): number {
  return samples.reduce((sum, { length }) => sum + length, 0);
}

function withoutFailures(array: Float64Array): Float64Array {
  return array.filter((value) => !Number.isNaN(value));
}

/**
 * Mean and standard deviation. Sums are taken of distances from one of the values in units of how far others lie from
 * it: numbers of about 1 whatever the samples are, so that nothing cancels and no square overflows or vanishes.
 */
function moments(samples: readonly Float64Array[]): { mean: number; standardUncertainty: number } {
  const origin = samples[0]![0]!;
  const reach = reachOf(samples[0]!, origin) || Math.max(...samples.map((array) => reachOf(array, origin)));
  if (reach === 0) return { mean: origin, standardUncertainty: 0 };
  const unit = Math.max(reach, SMALLEST_NORMAL);
  const count = countOf(samples);
  let sum = 0;
  let squares = 0;
  for (const array of samples) {
    const sums = distanceSums(array, origin, 1 / unit);
    sum += sums.sum;
    squares += sums.squares;
  }
  const variance = Math.max(0, squares - (sum / count) * sum) / (count - 1);
  return { mean: origin + (sum / count) * unit, standardUncertainty: Math.sqrt(variance) * unit };
}

function reachOf(array: Float64Array, origin: number): number {
  let reach = 0;
  for (let i = 0; i < array.length; i++) reach = Math.max(reach, Math.abs(array[i]! - origin));
  return reach;
}

function distanceSums(array: Float64Array, origin: number, perUnit: number): { sum: number; squares: number } {
  let sum = 0;
  let squares = 0;
  for (let i = 0; i < array.length; i++) {
    const distance = (array[i]! - origin) * perUnit;
    sum += distance;
    squares += distance * distance;
  }
  return { sum, squares };
}
