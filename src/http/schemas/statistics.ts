import { z } from 'zod';
import { UNIT_QUANTITIES } from '../../evidence/judged-unit.ts';
import type { QuantityStatistics, TrendOfQuantity } from '../../evidence/lot-statistics.ts';
import { list } from './list.ts';

const interval = z.object({ lower: z.number(), upper: z.number() });
const unavailable = z.object({ unavailable: z.string() });
const index = z.object({ value: z.number(), interval, method: z.string() });

const spread = {
  n: z.int(),
  mean: z.number().exactOptional(),
  standardDeviation: z.number().exactOptional(),
  minimum: z.number().exactOptional(),
  maximum: z.number().exactOptional(),
};

const described = {
  quantity: z.enum(UNIT_QUANTITIES),
  unit: z.string(),
  limit: z.object({ lower: z.number().exactOptional(), upper: z.number().exactOptional() }),
  notes: list(z.string()).meta({ description: 'what is absent, and why' }),
};

export const QuantityStatisticsSchema = z
  .object({
    ...described,
    ...spread,
    meanInterval: interval.exactOptional(),
    quantiles: list(z.object({ probability: z.number(), value: z.number(), errorBound: z.number() })),
    histogram: z
      .object({ edges: list(z.number()), counts: list(z.int()), below: z.int(), above: z.int() })
      .exactOptional(),
    capability: z
      .object({
        cp: z.union([index, unavailable]),
        cpk: index,
        nonconforming: z.object({
          fraction: z.number(),
          below: z.number(),
          above: z.number(),
          interval,
          method: z.string(),
        }),
        confidence: z.number(),
      })
      .exactOptional(),
    toleranceInterval: z
      .object({
        lower: z.number().nullable(),
        upper: z.number().nullable(),
        factor: z.number(),
        content: z.number(),
        confidence: z.number(),
      })
      .exactOptional(),
  })
  .meta({
    id: 'QuantityStatistics',
    description: 'one quantity over a lot; intervals at 95 % confidence',
  }) satisfies z.ZodType<unknown, QuantityStatistics>;

const varianceTest = {
  F: z.number(),
  degreesOfFreedom: z.object({ between: z.number(), within: z.number() }),
  pValue: z.number(),
  differ: z.boolean(),
};

export const TrendOfQuantitySchema = z
  .object({
    ...described,
    groups: list(z.object({ group: z.string(), ...spread })),
    analysisOfVariance: z
      .object({
        ...varianceTest,
        sumOfSquares: z.object({ between: z.number(), within: z.number() }),
        withinStandardDeviation: z.number(),
        betweenStandardDeviation: z.number(),
        welch: z.union([z.object(varianceTest), unavailable]),
      })
      .exactOptional()
      .meta({ description: 'whether the groups differ by more than their own spread' }),
  })
  .meta({ id: 'TrendOfQuantity' }) satisfies z.ZodType<unknown, TrendOfQuantity>;
