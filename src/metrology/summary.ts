import { type CoverageIntervals, coverageIntervals } from './coverage-interval.ts';
import { tooManyFailures } from './trials.ts';

/**
 * Largest part of the trials that may leave the model's domain. Leaving them out distorts the distribution by about as much,
 * which is little beside the 0.025 in each tail of a 95 % interval.
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
 * Mean, standard uncertainty and coverage intervals of one output, whose samples come in any number of arrays, NaN for failed
 * trials. Throws `InvalidQuantity` '' where more than `TOLERATED_FAILURES` of them failed.
 */
export function summarise(samples: readonly Float64Array[], coverage: number): Summary {
  const values = finiteValues(samples);
  const trials = samples.reduce((sum, { length }) => sum + length, 0);
  const failedTrials = trials - values.length;
  if (failedTrials > TOLERATED_FAILURES * trials) {
    throw tooManyFailures(failedTrials, trials);
  }
  return { ...moments(values), ...coverageIntervals(values, coverage), failedTrials };
}

function finiteValues(samples: readonly Float64Array[]): Float64Array {
  const values = new Float64Array(samples.reduce((sum, { length }) => sum + length, 0));
  let count = 0;
  for (const array of samples) {
    values.set(array, count);
    const end = count + array.length;
    // Compacted in place; where nothing failed, which is the rule, the copy already stands.
    for (let i = count; i < end; i++) {
      const value = values[i]!;
      if (!Number.isNaN(value)) values[count++] = value;
    }
  }
  return values.subarray(0, count);
}

/** Mean and standard deviation, from differences to one of the values and then to the mean, so that neither cancels. */
function moments(values: Float64Array): { mean: number; standardUncertainty: number } {
  const origin = values[0]!;
  let sum = 0;
  let least = 0;
  let most = 0;
  for (let i = 0; i < values.length; i++) {
    const difference = values[i]! - origin;
    sum += difference;
    if (difference < least) least = difference;
    if (difference > most) most = difference;
  }
  const shift = sum / values.length;
  const spread = most - least;
  if (spread === 0) return { mean: origin, standardUncertainty: 0 };
  // In units of the spread, so that the squares neither overflow nor vanish.
  const scale = 1 / Math.max(spread, SMALLEST_NORMAL);
  let squares = 0;
  for (let i = 0; i < values.length; i++) {
    const deviation = (values[i]! - origin - shift) * scale;
    squares += deviation * deviation;
  }
  return { mean: origin + shift, standardUncertainty: Math.sqrt(squares / (values.length - 1)) / scale };
}
