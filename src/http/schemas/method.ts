import { z } from 'zod';
import { CAUTION_CODES } from '../../approval/cautions.ts';
import { list } from './list.ts';

export const MethodSchema = z
  .object({
    name: z.string(),
    references: list(z.string()),
    relativeError: z.number().meta({ description: "honest bound on the model's own error, not on rounding" }),
    validity: z.string(),
  })
  .meta({ id: 'Method', description: 'how the numbers were obtained' });

export const CautionSchema = z
  .object({ code: z.enum(CAUTION_CODES), text: z.string() })
  .meta({ id: 'Caution', description: 'something that can hurt; defers to local codes and licensed practice' });
