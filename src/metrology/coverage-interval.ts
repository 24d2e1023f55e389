/** Coverage intervals from trials, JCGM 101:2008 7.7: order statistics as they are, without interpolation. */

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
 * Both coverage intervals of `values` (M of them, finite, in any order) for the probability `coverage`; M(1 − coverage) ≥ 1.
 * Exact: the order statistics are those of a full sort, but only the two tails that the intervals can end in are sorted.
 * With q the integer part of coverage·M + 1/2 they run from the r-th smallest value to the (r + q)-th (JCGM 101 7.7.2).
 */
export function coverageIntervals(values: Float64Array, coverage: number): CoverageIntervals {
  const inside = Math.floor(coverage * values.length + 0.5);
  const outside = values.length - inside;
  const { lowest, highest } = tails(values, outside);
  // highest[r] is the value `inside` places above lowest[r].
  const interval = (r: number): Interval => ({ lower: lowest[r]!, upper: highest[r]! });
  let best = 0;
  for (let r = 1; r < outside; r++) if (highest[r]! - lowest[r]! < highest[best]! - lowest[best]!) best = r;
  return { symmetric: interval(Math.ceil(outside / 2) - 1), shortest: interval(best) };
}

/** The `count` smallest and the `count` largest of `values`, ascending. */
function tails(values: Float64Array, count: number): { lowest: Float64Array; highest: Float64Array } {
  const sorted = (all: Float64Array) => ({
    lowest: all.subarray(0, count),
    highest: all.subarray(all.length - count),
  });
  // The trials are independent, so the first few tell where to cut, with five standard deviations to spare.
  const pilot = values.slice(0, PILOT).sort();
  const expected = (pilot.length * count) / values.length;
  const rank = Math.ceil(expected + 5 * Math.sqrt(expected));
  if (2 * rank >= pilot.length) return sorted(values.slice().sort());
  const low = pilot[rank]!;
  const high = pilot[pilot.length - 1 - rank]!;
  const below = new Float64Array(values.length);
  const above = new Float64Array(values.length);
  let belowCount = 0;
  let aboveCount = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    if (value <= low) below[belowCount++] = value;
    if (value >= high) above[aboveCount++] = value;
  }
  // Cut too close, where the first trials were not like the others.
  if (belowCount < count || aboveCount < count) return sorted(values.slice().sort());
  return {
    lowest: below.subarray(0, belowCount).sort().subarray(0, count),
    highest: above
      .subarray(0, aboveCount)
      .sort()
      .subarray(aboveCount - count),
  };
}
