/** Histograms for people, made from bins: few, equally wide, with the limits on edges. */
import { InvalidQuantity } from '../../physics/invalid-quantity.ts';
import { quantilesFromBins } from './binned-quantiles.ts';
import { type Binning, type Bins, binEdge, binWidth, coarser, countOf } from './bins.ts';
import { isUnavailable, type Unavailable } from './unavailable.ts';

export interface Histogram {
  /** ascending, equally far apart, one more than there are counts; bar i holds edges[i] ≤ value < edges[i + 1] */
  readonly edges: readonly number[];
  readonly counts: readonly number[];
  /** values below the first edge */
  readonly below: number;
  /** values from the last edge on */
  readonly above: number;
}

export interface HistogramRange {
  /** the bars cover at least from here, such as the lower limit */
  readonly from?: number | undefined;
  readonly to?: number | undefined;
  /** default 60 */
  readonly mostBars?: number | undefined;
}

/**
 * Histogram of the counted values. The bars are as wide as the power of two of the tolerance nearest to Freedman and Diaconis' rule,
 * 2·IQR·n^(−1/3) (Zeitschrift für Wahrscheinlichkeitstheorie 57 (1981) 453-476), wider where the range would need more than `mostBars`.
 * The range is from the smallest to the largest value, strays left out (those further than three interquartile ranges outside the
 * quartiles, J. W. Tukey's outer fences), and whatever `from` and `to` add. All counts are exact and sum to the number of values.
 * Throws `InvalidQuantity` '/from' (not finite, above `to`), '/to', '/mostBars' (not an integer of at least 2).
 */
export function histogramOf(where: Binning, bins: Bins, range: HistogramRange = {}): Histogram | Unavailable {
  requireRange(range);
  const inside: Bins = { ...bins, below: 0, above: 0 };
  if (inside.indices.length === 0) return { unavailable: 'there are no values near the limits' };
  const { fineFrom, fineTo, ruleWidth } = extent(where, inside);
  const indexOf = (value: number, halvings: number) =>
    Math.floor(((value - where.origin) / where.scale) * 2 ** halvings);
  const coarsened = (index: number, halvings: number) => Math.floor(index * 2 ** (halvings - bins.halvings));
  const reach = (halvings: number) => ({
    first: Math.min(coarsened(fineFrom, halvings), range.from === undefined ? Infinity : indexOf(range.from, halvings)),
    last: Math.max(coarsened(fineTo, halvings), range.to === undefined ? -Infinity : indexOf(range.to, halvings)),
  });
  let halvings =
    ruleWidth > 0 ? Math.min(bins.halvings, Math.round(Math.log2(where.scale / ruleWidth))) : bins.halvings;
  while (reach(halvings).last - reach(halvings).first + 1 > (range.mostBars ?? 60)) halvings--;
  const { first, last } = reach(halvings);
  const counts = new Array<number>(last - first + 1).fill(0);
  let { below, above } = bins;
  const bars = coarser(inside, halvings);
  bars.indices.forEach((index, i) => {
    const count = bars.counts[i]!;
    if (index < first) below += count;
    else if (index > last) above += count;
    else counts[index - first]! += count;
  });
  return {
    edges: Array.from({ length: counts.length + 1 }, (_, i) => binEdge(where, halvings, first + i)),
    counts,
    below,
    above,
  };
}

/** First and last bin that a histogram should show of the values alone, and the width of its bars, 0 where they tell none. */
function extent(where: Binning, inside: Bins): { fineFrom: number; fineTo: number; ruleWidth: number } {
  const n = countOf(inside);
  const quartiles = quantilesFromBins(where, inside, { minimum: null, maximum: null }, [0.25, 0.75]);
  const [low, high] = quartiles.map((quartile) => (isUnavailable(quartile) ? 0 : quartile.value));
  // Half the values in one bin, as coarse instruments make it: the quartiles then tell neither a width nor who is a stray.
  const spread = high! - low! > binWidth(where, inside) ? high! - low! : 0;
  const isStray = (index: number) =>
    spread > 0 &&
    (binEdge(where, inside.halvings, index + 1) < low! - 3 * spread ||
      binEdge(where, inside.halvings, index) > high! + 3 * spread);
  const shown = inside.indices.filter((index) => !isStray(index));
  return { fineFrom: shown[0]!, fineTo: shown.at(-1)!, ruleWidth: 2 * spread * n ** (-1 / 3) };
}

function requireRange({ from, to, mostBars }: HistogramRange): void {
  if (from !== undefined && !Number.isFinite(from)) throw new InvalidQuantity('/from', 'must be a finite number');
  if (to !== undefined && !Number.isFinite(to)) throw new InvalidQuantity('/to', 'must be a finite number');
  if (from !== undefined && to !== undefined && from > to) throw new InvalidQuantity('/from', 'must not exceed to');
  if (mostBars !== undefined && !(Number.isInteger(mostBars) && mostBars >= 2)) {
    throw new InvalidQuantity('/mostBars', 'must be an integer of at least 2');
  }
}
