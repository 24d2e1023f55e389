import type { FastifyInstance } from 'fastify';
import { z } from 'zod';
import { transient } from '../../../physics/calculations/transient.ts';
import { InductorSchema } from '../../schemas/inductor.ts';
import { list } from '../../schemas/list.ts';
import { MethodSchema } from '../../schemas/method.ts';
import { PathSchema } from '../../schemas/path.ts';
import {
  positiveCurrent_A,
  resistanceOrZero_ohm,
  temperature_degC,
  time_s,
  voltage_V,
} from '../../schemas/quantities.ts';
import { uncertaintyFields } from '../../schemas/uncertainty.ts';
import { type CalculationPorts, calculation } from './calculation.ts';

const anyEvent = {
  ...uncertaintyFields,
  inductor: InductorSchema,
  temperature_degC: temperature_degC.exactOptional().meta({ description: '°C, of the core' }),
  windingResistance_ohm: resistanceOrZero_ohm,
  until_s: time_s.exactOptional().meta({ description: "s; absent: the event's own end" }),
  samples: z.int().min(2).max(10_000).exactOptional().meta({ description: 'points of the waveform; default 200' }),
  safeCurrent_A: positiveCurrent_A.exactOptional(),
};

/** POST /v1/transient */
export const transientRoute = (app: FastifyInstance, ports: CalculationPorts) =>
  calculation(app, ports, {
    name: 'transient',
    path: '/v1/transient',
    operationId: 'calculateTransient',
    summary: 'Turn-on and turn-off of an inductor: voltage, time, and where the energy goes',
    request: z.discriminatedUnion('event', [
      z.strictObject({ ...anyEvent, event: z.literal('energise'), source_V: voltage_V }),
      z.strictObject({
        ...anyEvent,
        event: z.literal('interrupt'),
        initialCurrent_A: positiveCurrent_A,
        path: PathSchema.exactOptional().meta({
          description: 'without one the voltage has no bound, which is refused',
        }),
        source_V: voltage_V.exactOptional().meta({
          description: 'V, where the source stays connected: the path is then across the opened switch',
        }),
      }),
    ]),
    answer: z
      .object({
        peakVoltage_V: z
          .number()
          .meta({ description: 'V, largest across the path; when energising, across the inductance' }),
        timeToSafe_s: z
          .number()
          .nullable()
          .meta({ description: 's, from which |current| stays at or below safeCurrent_A; null: not by the end' }),
        timeToZero_s: z.number().nullable().meta({ description: 's; null where the current only approaches zero' }),
        finalCurrent_A: z.number(),
        energy: z
          .object({
            initial_J: z.number(),
            delivered_J: z.number(),
            winding_J: z.number(),
            path_J: z.number(),
            capacitor_J: z.number().meta({ description: "J, left in the snubber's capacitor; part of path_J" }),
            final_J: z.number(),
            residual_J: z.number(),
          })
          .meta({
            description: 'initial + delivered = winding + path + final + residual; each term is integrated on its own',
          }),
        waveform: z.object({
          time_s: list(z.number()),
          current_A: list(z.number()),
          voltage_V: list(z.number()),
        }),
        method: MethodSchema,
      })
      .meta({ id: 'TransientAnswer' }),
    examples: [
      {
        inductor: { inductance_H: 0.25 },
        windingResistance_ohm: 8,
        event: 'interrupt',
        initialCurrent_A: 3,
        path: { kind: 'clamp', clamp_V: 120 },
        safeCurrent_A: 0.05,
        samples: 50,
      },
      {
        inductor: { inductance_H: 4 },
        windingResistance_ohm: 4,
        event: 'energise',
        source_V: 2,
        until_s: 2,
        samples: 21,
      },
    ],
    calculation: transient,
    hazards: ({ event }, { peakVoltage_V, energy }) => ({
      // What a source puts on when energising is its own voltage, not one that turning off raises.
      ...(event === 'interrupt' && { turnOffVoltage_V: peakVoltage_V }),
      storedEnergy_J: Math.max(energy.initial_J, energy.final_J),
    }),
  });
