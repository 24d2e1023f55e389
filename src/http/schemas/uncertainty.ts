import { z } from 'zod';
import { standardUncertainty } from './quantities.ts';

/** Inputs that may carry an uncertainty at once; each costs a few evaluations. */
const MAXIMUM_INPUTS = 100;

export const UncertaintyMap = z
  .record(z.string().regex(/^(\/([^~/]|~[01])*)+$/, 'must be an RFC 6901 pointer into the request'), standardUncertainty)
  .refine((map) => Object.keys(map).length <= MAXIMUM_INPUTS, `at most ${MAXIMUM_INPUTS} inputs`)
  .meta({
    id: 'UncertaintyMap',
    description: 'standard uncertainty of numbers in the request, by RFC 6901 pointer, in the unit of the field',
    examples: [{ '/coil/diameter_m': 2e-5 }],
  });
