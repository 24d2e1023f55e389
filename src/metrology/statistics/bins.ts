/**
 * Counts of any number of values in at most 256 bins, which merge exactly: the same counts come out whatever the order in which
 * values came and parts were merged.
 *
 * Bins are dyadic: the drawing's tolerance (its scale, from its lower limit) halved 32 times, of which only occupied ones are kept.
 * Whenever more than 256 are occupied, neighbours are joined in pairs, which doubles the width. The width reached is the smallest at
 * which all values together occupy no more than 256 bins; parts occupy no more than the whole, so none is ever coarser than that.
 * - Up to 256 units keep each its own bin, 2⁻³² of the tolerance wide: as good as the values themselves.
 * - A million units of a normal lot reach bins of about 0.04 to 0.08 standard deviations, whatever the drawing's limits are beside the
 *   spread. (200 fixed bins over the tolerance would put a lot with Cp = 20 into ten of them.)
 * - Stray values cost a bin each and not the resolution of the others, unlike bins between the extremes.
 * - The limits are edges at every width up to the tolerance itself, so a histogram never blurs them.
 * Values further than 2²⁰ scales from the origin, such as an instrument's overflow code of 9.9e37, are counted as below or above.
 *
 * The record is plain JSON of at most about 4 kB; a rollup row keeps it as text beside its moments.
 */
import { InvalidQuantity } from '../../physics/invalid-quantity.ts';

/** Where bins lie; kept nowhere, made again from the limits. Only bins of the same binning merge. */
export interface Binning {
  readonly origin: number;
  readonly scale: number;
}

export interface Bins {
  /** a bin is scale·2^−halvings wide */
  readonly halvings: number;
  /** ascending; bin k holds origin + k·width ≤ value < origin + (k + 1)·width */
  readonly indices: readonly number[];
  /** of the same length, each at least 1 */
  readonly counts: readonly number[];
  /** values too far under the origin for any bin */
  readonly below: number;
  readonly above: number;
}

export const MOST_BINS = 256;
const MOST_HALVINGS = 32;
/** Indices stay under 2⁵², exact in a double and in JSON. */
const FURTHEST_SCALES = 2 ** 20;

export const EMPTY_BINS: Bins = { halvings: MOST_HALVINGS, indices: [], counts: [], below: 0, above: 0 };

/**
 * Binning of a quantity with these limits: the tolerance from the lower limit on; with one limit, or two equal ones, the limit's own
 * magnitude (1 for a limit of 0) from there on.
 * Throws `InvalidQuantity` '/lower' (no limit at all, not finite, above upper), '/upper' (not finite).
 */
export function binning({
  lower,
  upper,
}: {
  readonly lower?: number | undefined;
  readonly upper?: number | undefined;
}): Binning {
  if (lower !== undefined && !Number.isFinite(lower)) throw new InvalidQuantity('/lower', 'must be a finite number');
  if (upper !== undefined && !Number.isFinite(upper)) throw new InvalidQuantity('/upper', 'must be a finite number');
  const origin = lower ?? upper;
  if (origin === undefined) throw new InvalidQuantity('/lower', 'at least one of lower and upper is needed');
  const tolerance = lower !== undefined && upper !== undefined ? upper - lower : 0;
  if (tolerance < 0) throw new InvalidQuantity('/lower', `must not exceed upper (${lower} > ${upper})`);
  return { origin, scale: tolerance || Math.abs(origin) || 1 };
}

/** Bins of the values. Throws `InvalidQuantity` at the index of a value that is not finite. */
export function binsOf(where: Binning, values: ArrayLike<number>): Bins {
  let halvings = MOST_HALVINGS;
  let occupied = new Map<number, number>();
  let below = 0;
  let above = 0;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    if (!Number.isFinite(value)) throw new InvalidQuantity(`/${i}`, 'must be a finite number');
    const scales = (value - where.origin) / where.scale;
    if (scales < -FURTHEST_SCALES) below++;
    else if (scales >= FURTHEST_SCALES) above++;
    else {
      const index = Math.floor(scales * 2 ** halvings);
      occupied.set(index, (occupied.get(index) ?? 0) + 1);
      while (occupied.size > MOST_BINS) {
        occupied = joinedPairs(occupied);
        halvings--;
      }
    }
  }
  const sorted = [...occupied].sort(([a], [b]) => a - b);
  return { halvings, indices: sorted.map(([index]) => index), counts: sorted.map(([, count]) => count), below, above };
}

/** `bins` with one more value. Throws `InvalidQuantity` '' for a value that is not finite. */
export function addToBins(where: Binning, bins: Bins, value: number): Bins {
  if (!Number.isFinite(value)) throw new InvalidQuantity('', 'must be a finite number');
  return mergeBins(bins, binsOf(where, [value]));
}

/** Bins of all values of `a` and `b`, which are of the same binning. */
export function mergeBins(a: Bins, b: Bins): Bins {
  const halvings = Math.min(a.halvings, b.halvings);
  const [first, second] = [coarser(a, halvings), coarser(b, halvings)];
  const indices: number[] = [];
  const counts: number[] = [];
  let [i, j] = [0, 0];
  while (i < first.indices.length || j < second.indices.length) {
    const index = Math.min(first.indices[i] ?? Number.POSITIVE_INFINITY, second.indices[j] ?? Number.POSITIVE_INFINITY);
    let count = 0;
    if (first.indices[i] === index) count += first.counts[i++]!;
    if (second.indices[j] === index) count += second.counts[j++]!;
    indices.push(index);
    counts.push(count);
  }
  return bounded({ halvings, indices, counts, below: a.below + b.below, above: a.above + b.above });
}

/** The same counts in bins of scale·2^−halvings, which are no narrower than those of `bins`. */
export function coarser(bins: Bins, halvings: number): Bins {
  if (halvings === bins.halvings) return bins;
  const indices: number[] = [];
  const counts: number[] = [];
  bins.indices.forEach((fine, i) => {
    // Exact: both are integers under 2⁵³, and only the exponent changes.
    const index = Math.floor(fine * 2 ** (halvings - bins.halvings));
    if (indices.at(-1) === index) counts[counts.length - 1]! += bins.counts[i]!;
    else {
      indices.push(index);
      counts.push(bins.counts[i]!);
    }
  });
  return { ...bins, halvings, indices, counts };
}

function bounded(bins: Bins): Bins {
  let kept = bins;
  while (kept.indices.length > MOST_BINS) kept = coarser(kept, kept.halvings - 1);
  return kept;
}

/** Bin width in the values' unit. */
export function binWidth({ scale }: Binning, { halvings }: Pick<Bins, 'halvings'>): number {
  return scale * 2 ** -halvings;
}

/** Lower edge of bin `index`; the upper limit, too, is such an edge, to its last place. */
export function binEdge({ origin, scale }: Binning, halvings: number, index: number): number {
  return origin + index * 2 ** -halvings * scale;
}

/** Number of values counted, those below and above included. */
export function countOf({ counts, below, above }: Bins): number {
  return counts.reduce((sum, count) => sum + count, below + above);
}

function joinedPairs(occupied: ReadonlyMap<number, number>): Map<number, number> {
  const pairs = new Map<number, number>();
  for (const [index, count] of occupied) {
    const pair = Math.floor(index / 2);
    pairs.set(pair, (pairs.get(pair) ?? 0) + count);
  }
  return pairs;
}
