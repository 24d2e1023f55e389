/** Coverage intervals from trials, JCGM 101:2008 7.7: order statistics as they are, without interpolation. */
import { sortByDistribution } from './distribution-sort.ts';

export interface Interval {
  readonly lower: number;
  readonly upper: number;
}

export interface CoverageIntervals {
  /** As much probability below as above. */
  readonly symmetric: Interval;
  /** The shortest of all; of several equally short the lowest. */
  readonly shortest: Interval;
}

/** Values looked at to guess where the tails begin. */
const PILOT = 4096;

/**
 * Both coverage intervals of the values in `samples` (M of them, finite, in any order, in any number of arrays) for the
 * probability `coverage`; M(1 − coverage) ≥ 1. With q the integer part of coverage·M + 1/2 they run from the r-th
 * smallest value to the (r + q)-th (JCGM 101 7.7.2). Exact: the order statistics are those of a full sort, but only the
 * two tails that the intervals can end in are sorted.
 */
export function coverageIntervals(samples: readonly Float64Array[], coverage: number): CoverageIntervals {
  const count = samples.reduce((sum, { length }) => sum + length, 0);
  const inside = Math.floor(coverage * count + 0.5);
  const outside = count - inside;
  const { lowest, highest } = tails(samples, count, outside) ?? sortedTails(samples, count, outside);
  // highest[r] is the value `inside` places above lowest[r].
  const interval = (r: number): Interval => ({ lower: lowest[r]!, upper: highest[r]! });
  let best = 0;
  for (let r = 1; r < outside; r++) if (highest[r]! - lowest[r]! < highest[best]! - lowest[best]!) best = r;
  return { symmetric: interval(Math.ceil(outside / 2) - 1), shortest: interval(best) };
}

interface Tails {
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
}

/** The `size` smallest and `size` largest of `count` values, ascending; null where the guess of where to cut fails. */
function tails(samples: readonly Float64Array[], count: number, size: number): Tails | null {
  // The trials are independent, so the first few tell where to cut, with five standard deviations to spare.
  const pilot = samples[0]!.slice(0, PILOT).sort();
  const expected = (pilot.length * size) / count;
  const rank = Math.ceil(expected + 5 * Math.sqrt(expected));
  if (2 * rank >= pilot.length) return null;
  const low = pilot[rank]!;
  const high = pilot[pilot.length - 1 - rank]!;
  const capacity = 2 * Math.ceil((count * rank) / pilot.length);
  const below = new Float64Array(capacity);
  const above = new Float64Array(capacity);
  let belowCount = 0;
  let aboveCount = 0;
  for (const array of samples) {
    belowCount = keepBelow(array, low, below, belowCount);
    aboveCount = keepAbove(array, high, above, aboveCount);
  }
  // Wrong where the first trials were not like the others.
  const fits = (found: number) => found >= size && found <= capacity;
  if (!fits(belowCount) || !fits(aboveCount)) return null;
  return {
    lowest: sortByDistribution(below.subarray(0, belowCount)).subarray(0, size),
    highest: sortByDistribution(above.subarray(0, aboveCount)).subarray(aboveCount - size),
  };
}

/**
 * Appends what of `array` is at most `cut` to the first `filled` of `kept`; counts but does not store what exceeds its
 * length.
 */
function keepBelow(array: Float64Array, cut: number, kept: Float64Array, filled: number): number {
  let count = filled;
  for (let i = 0; i < array.length; i++) if (array[i]! <= cut) kept[count++] = array[i]!;
  return count;
}

function keepAbove(array: Float64Array, cut: number, kept: Float64Array, filled: number): number {
  let count = filled;
  for (let i = 0; i < array.length; i++) if (array[i]! >= cut) kept[count++] = array[i]!;
  return count;
}

function sortedTails(samples: readonly Float64Array[], count: number, size: number): Tails {
  const all = new Float64Array(count);
  let filled = 0;
  for (const array of samples) {
    all.set(array, filled);
    filled += array.length;
  }
  all.sort();
  return { lowest: all.subarray(0, size), highest: all.subarray(count - size) };
}
