import { z } from 'zod';
import type { Lot } from '../../evidence/lot.ts';
import type { Rig } from '../../evidence/rig.ts';
import { InstrumentSchema } from './approval-request.ts';
import { text } from './text.ts';

export const RigSchema = z
  .strictObject({
    description: text(500).exactOptional(),
    instrument: InstrumentSchema,
    calibrationDue: z.iso.date().meta({ description: 'last day of the calibration' }),
  })
  .meta({ id: 'Rig', description: 'a test rig' }) satisfies z.ZodType<Rig>;

export const LotSchema = z
  .strictObject({
    part: z.strictObject({ number: text(100), revision: text(40) }),
    size: z.int().min(1).max(1e9).exactOptional().meta({ description: 'units produced' }),
    supplierReference: text(200).exactOptional(),
  })
  .meta({ id: 'Lot', description: 'a production lot of one part at one revision' }) satisfies z.ZodType<Lot>;
