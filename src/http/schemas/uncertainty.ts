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
export const uncertaintyFields = { uncertainty: UncertaintyMap.exactOptional() };

export interface UncertaintyFields {
  readonly uncertainty?: Readonly<Record<string, number>>;
}

export const UncertaintySchema = z
  .object({
    method: z.enum(['first-order', 'monte-carlo']),
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
  })
  .meta({
    id: 'Uncertainty',
    description: "standard uncertainty of each main output, and each input's share of its variance",
  });
