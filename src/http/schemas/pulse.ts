import { z } from 'zod';
import type { Pulse } from '../../evidence/pulse.ts';
import { list } from './list.ts';
import { resistanceOrZero_ohm } from './quantities.ts';

/** Samples in one pulse. */
const MAXIMUM_SAMPLES = 100_000;
/** A body that holds as many samples, twenty digits each. */
export const PULSE_BODY_BYTES = 16 * 1024 * 1024;

const samples = (description: string) =>
  list(z.number().min(-1e12).max(1e12), { min: 8, max: MAXIMUM_SAMPLES }).meta({ description });

export const PulseSchema = z
  .strictObject({
    time_s: samples('s, increasing'),
    voltage_V: samples('V, at the terminals'),
    current_A: samples('A'),
    resistance_ohm: resistanceOrZero_ohm.meta({ description: 'Ω, of the winding while it was pulsed' }),
    voltageOffset_V: z
      .union([z.number().min(-1e6).max(1e6), z.literal('auto')])
      .exactOptional()
      .meta({ description: 'V, what the voltage reads at zero; default auto: found in the pulse' }),
  })
  .meta({ description: 'raw voltage and current of one pulse, equal arrays' }) satisfies z.ZodType<Pulse>;
