import { z } from 'zod';
import { list } from './list.ts';
import { standardUncertainty } from './quantities.ts';

/** Inputs that may carry an uncertainty at once; each costs a few evaluations. */
const MAXIMUM_INPUTS = 100;

export const UncertaintyMap = z
  .record(
    z.string().regex(/^(\/([^~/]|~[01])*)+$/, 'must be an RFC 6901 pointer into the request'),
    standardUncertainty,
  )
  .refine((map) => Object.keys(map).length <= MAXIMUM_INPUTS, `at most ${MAXIMUM_INPUTS} inputs`)
  .meta({
    id: 'UncertaintyMap',
    description: 'standard uncertainty of numbers in the request, by RFC 6901 pointer, in the unit of the field',
    examples: [{ '/coil/diameter_m': 2e-5 }],
  });

/** What every calculating request may carry beside its own fields. */
export const uncertaintyFields = {
  uncertainty: UncertaintyMap.exactOptional(),
  method: z
    .enum(['first-order', 'monte-carlo'])
    .exactOptional()
    .meta({ description: 'how uncertainty is propagated: JCGM 100 (default) or JCGM 101' }),
  trials: z.int().min(1000).max(2_000_000).exactOptional().meta({ description: 'of monte-carlo; default 100000' }),
  seed: z.int().min(0).max(Number.MAX_SAFE_INTEGER).exactOptional().meta({ description: 'of monte-carlo; default 1' }),
  coverage: z
    .number()
    .gt(0)
    .lt(1)
    .exactOptional()
    .meta({ description: 'of the intervals of monte-carlo; default 0.95' }),
};

export interface UncertaintyFields {
  readonly uncertainty?: Readonly<Record<string, number>>;
  readonly method?: 'first-order' | 'monte-carlo';
  readonly trials?: number;
  readonly seed?: number;
  readonly coverage?: number;
}

const interval = z.object({ lower: z.number(), upper: z.number() });

export const UncertaintySchema = z
  .discriminatedUnion('method', [
    z.object({
      method: z.literal('first-order'),
      outputs: z.record(
        z.string(),
        z.object({
          standardUncertainty: z.number(),
          contributions: list(
            z.object({
              pointer: z.string(),
              sensitivity: z
                .number()
                .nullable()
                .meta({ description: 'partial derivative; null where the input has no uncertainty' }),
              standardUncertainty: z.number().meta({ description: "what the input contributes, in the output's unit" }),
              share: z.number().meta({ description: "of the output's variance; all add up to 1" }),
            }),
          ),
        }),
      ),
    }),
    z.object({
      method: z.literal('monte-carlo'),
      trials: z.int(),
      seed: z.int(),
      coverage: z.number(),
      failedTrials: z
        .int()
        .meta({ description: "trials left out because their inputs lay outside the model's domain" }),
      outputs: z.record(
        z.string(),
        z.object({
          mean: z.number(),
          standardUncertainty: z.number(),
          symmetric: interval.meta({ description: 'probabilistically symmetric' }),
          shortest: interval,
        }),
      ),
    }),
  ])
  .meta({ id: 'Uncertainty', description: 'of each main output: JCGM 100 with the share of each input, or JCGM 101' });
