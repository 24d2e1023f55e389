import { z } from 'zod';
import type { Path } from '../../physics/transients/path.ts';
import {
  capacitance_F,
  positiveVoltage_V,
  resistance_ohm,
  resistanceOrZero_ohm,
  voltageOrZero_V,
} from './quantities.ts';

export const PathSchema = z
  .discriminatedUnion('kind', [
    z.strictObject({ kind: z.literal('resistor'), resistance_ohm }),
    z.strictObject({
      kind: z.literal('diode'),
      forwardDrop_V: voltageOrZero_V,
      resistance_ohm: resistanceOrZero_ohm.exactOptional(),
    }),
    z.strictObject({
      kind: z.literal('clamp'),
      clamp_V: positiveVoltage_V,
      resistance_ohm: resistanceOrZero_ohm.exactOptional(),
    }),
    z.strictObject({ kind: z.literal('snubber'), resistance_ohm: resistanceOrZero_ohm, capacitance_F }),
  ])
  .meta({ id: 'Path', description: 'what takes the current on when it is interrupted' }) satisfies z.ZodType<Path>;
