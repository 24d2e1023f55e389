import type { Interval } from '../metrology/coverage-interval.ts';
import { analyseVariance, type VarianceAnalysis } from '../metrology/statistics/analysis-of-variance.ts';
import { quantilesFromBins } from '../metrology/statistics/binned-quantiles.ts';
import { type Capability, capability } from '../metrology/statistics/capability.ts';
import { type Histogram, histogramOf } from '../metrology/statistics/histogram.ts';
import type { Moments } from '../metrology/statistics/moments.ts';
import { standardDeviation } from '../metrology/statistics/moments.ts';
import { meanInterval } from '../metrology/statistics/normal-intervals.ts';
import { type ToleranceInterval, toleranceInterval } from '../metrology/statistics/tolerance-interval.ts';
import { isUnavailable } from '../metrology/statistics/unavailable.ts';
import { measurementsOf, type UnitQuantity, type Yardstick } from './judged-unit.ts';
import type { Limit } from './observation.ts';
import { binningOf, mergeRolled, NOTHING_ROLLED_UP, type Rolled } from './rollup.ts';
import type { Rollup } from './unit-store.ts';

/** Confidence of every interval, and of the tolerance interval that `CONTENT` of the population lies in it. */
const CONFIDENCE = 0.95;
const CONTENT = 0.99;
const PROBABILITIES = [0.01, 0.05, 0.25, 0.5, 0.75, 0.95, 0.99];

/** Number, mean and spread of some values; what so few values cannot have is absent. */
export interface Spread {
  readonly n: number;
  readonly mean?: number;
  readonly standardDeviation?: number;
  readonly minimum?: number;
  readonly maximum?: number;
}

/** One quantity over a lot. `notes` say what is absent and why. */
export interface QuantityStatistics extends Spread {
  readonly quantity: UnitQuantity;
  readonly unit: string;
  readonly limit: Limit;
  readonly meanInterval?: Interval;
  readonly quantiles: readonly { readonly probability: number; readonly value: number; readonly errorBound: number }[];
  readonly histogram?: Histogram;
  readonly capability?: Capability;
  readonly toleranceInterval?: ToleranceInterval & { readonly content: number; readonly confidence: number };
  readonly notes: readonly string[];
}

/** The statistics of every quantity that the drawing has units measured for, from the lot's rollups. */
export function lotStatistics(rollups: readonly Rollup[], yardstick: Yardstick): QuantityStatistics[] {
  return measurementsOf(yardstick).map(({ quantity, measurement }) => {
    const rolled = rollups
      .filter((rollup) => rollup.quantity === quantity)
      .reduce<Rolled>(mergeRolled, NOTHING_ROLLED_UP);
    return {
      quantity,
      unit: measurement.unit,
      limit: measurement.limit,
      ...statisticsOf(rolled, quantity, measurement.limit, yardstick),
    };
  });
}

function statisticsOf({ moments, bins }: Rolled, quantity: UnitQuantity, limit: Limit, yardstick: Yardstick) {
  const where = binningOf(quantity, yardstick);
  const spread = spreadOf(moments);
  const notes: string[] = [];
  const quantiles = where
    ? quantilesFromBins(where, bins, moments, PROBABILITIES).flatMap((entry) => (isUnavailable(entry) ? [] : [entry]))
    : [];
  const histogram =
    where &&
    histogramOf(where, bins, {
      ...(limit.lower !== undefined && { from: limit.lower }),
      ...(limit.upper !== undefined && { to: limit.upper }),
    });
  if (histogram && isUnavailable(histogram)) notes.push(`histogram: ${histogram.unavailable}`);
  return {
    ...spread,
    quantiles,
    ...(histogram && !isUnavailable(histogram) && { histogram }),
    ...normalTheory(spread, limit, notes),
    notes,
  };
}

/** What supposes that the values are normal, and at least two of them that differ. */
function normalTheory({ n, mean, standardDeviation: s }: Spread, limit: Limit, notes: string[]) {
  const limited = limit.lower !== undefined || limit.upper !== undefined;
  if (mean === undefined || s === undefined || !(s > 0)) {
    notes.push('capability and tolerance interval: at least two values that differ are needed');
    return {};
  }
  const sample = { n, mean, standardDeviation: s };
  const sides = limit.lower === undefined ? 'upper' : limit.upper === undefined ? 'lower' : 'two-sided';
  notes.push('capability, tolerance interval and fraction nonconforming suppose a normal distribution');
  return {
    meanInterval: meanInterval(sample, CONFIDENCE),
    ...(limited && { capability: capability(sample, limit, CONFIDENCE) }),
    toleranceInterval: {
      ...toleranceInterval(sample, { content: CONTENT, confidence: CONFIDENCE, sides: limited ? sides : 'two-sided' }),
      content: CONTENT,
      confidence: CONFIDENCE,
    },
  };
}

export function spreadOf(moments: Moments): Spread {
  const { n, mean, minimum, maximum } = moments;
  const s = standardDeviation(moments);
  return {
    n,
    ...(n > 0 && { mean }),
    ...(!isUnavailable(s) && { standardDeviation: s }),
    ...(minimum !== null && { minimum }),
    ...(maximum !== null && { maximum }),
  };
}

export type TrendKey = 'lot' | 'day' | 'rig';

/** One quantity over the groups of a trend, in their order, and whether the groups differ by more than their own spread. */
export interface TrendOfQuantity {
  readonly quantity: UnitQuantity;
  readonly unit: string;
  readonly limit: Limit;
  readonly groups: readonly ({ readonly group: string } & Spread)[];
  readonly analysisOfVariance?: VarianceAnalysis;
  readonly notes: readonly string[];
}

/** Trend of every quantity by lot, day or rig ('' : units whose instrument came inline). */
export function trendOf(rollups: readonly Rollup[], by: TrendKey, yardstick: Yardstick): TrendOfQuantity[] {
  return measurementsOf(yardstick).map(({ quantity, measurement }) => {
    const grouped = Map.groupBy(
      rollups.filter((rollup) => rollup.quantity === quantity),
      (rollup) => rollup[by],
    );
    const groups = [...grouped]
      .map(([group, parts]) => ({ group, moments: parts.reduce<Rolled>(mergeRolled, NOTHING_ROLLED_UP).moments }))
      .sort((a, b) => (a.group < b.group ? -1 : 1));
    const analysis = analyseVariance(groups.map(({ moments }) => moments));
    return {
      quantity,
      unit: measurement.unit,
      limit: measurement.limit,
      groups: groups.map(({ group, moments }) => ({ group, ...spreadOf(moments) })),
      ...(isUnavailable(analysis) ? { notes: [analysis.unavailable] } : { analysisOfVariance: analysis, notes: [] }),
    };
  });
}
