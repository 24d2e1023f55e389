import type { FastifyInstance } from 'fastify';
import { z } from 'zod';
import { losses } from '../../../physics/calculations/losses.ts';
import { SteinmetzLossSchema } from '../../schemas/core.ts';
import { CoolingSchema, WindingSchema } from '../../schemas/inductor.ts';
import { list } from '../../schemas/list.ts';
import { MethodSchema } from '../../schemas/method.ts';
import { frequency_Hz, positiveCurrent_A, temperature_degC, volume_m3 } from '../../schemas/quantities.ts';
import { uncertaintyFields } from '../../schemas/uncertainty.ts';
import { type CalculationPorts, calculation } from './calculation.ts';

/** Harmonics, or points of a flux waveform, in one request. */
const MAXIMUM_POINTS = 10_000;

const fluxDensity_T = z.number().min(-100).max(100);

/** POST /v1/losses */
export const lossesRoute = (app: FastifyInstance, ports: CalculationPorts) =>
  calculation(app, ports, {
    name: 'losses',
    path: '/v1/losses',
    operationId: 'calculateLosses',
    summary: 'Losses of winding and core, and the temperature rise that they lead to',
    request: z.strictObject({
      ...uncertaintyFields,
      winding: WindingSchema,
      current: z.strictObject({
        direct_A: z.number().min(-1e9).max(1e9),
        harmonics: list(z.strictObject({ frequency_Hz, rms_A: positiveCurrent_A }), {
          max: MAXIMUM_POINTS,
        }).exactOptional(),
      }),
      core: z.strictObject({ volume_m3, loss: SteinmetzLossSchema }).exactOptional(),
      flux: z
        .union([
          z.strictObject({ frequency_Hz, amplitude_T: z.number().min(0).max(100) }),
          z.strictObject({
            frequency_Hz,
            phase: list(z.number().min(0).max(1), { min: 2, max: MAXIMUM_POINTS }).meta({
              description: 'fractions of the period, increasing',
            }),
            fluxDensity_T: list(fluxDensity_T, { min: 2, max: MAXIMUM_POINTS }),
          }),
        ])
        .exactOptional()
        .meta({
          description:
            'a sine for the Steinmetz equation, piecewise linear for the improved generalised Steinmetz equation',
        }),
      temperature_degC: temperature_degC.meta({
        description: '°C, of the winding; with cooling, of what surrounds the part',
      }),
      cooling: CoolingSchema.exactOptional(),
    }),
    answer: z
      .object({
        directResistance_ohm: z.number(),
        harmonics: list(
          z.object({ frequency_Hz: z.number(), resistanceRatio: z.number(), power_W: z.number() }),
        ).exactOptional(),
        copper_W: z.number(),
        core_W: z.number(),
        total_W: z.number(),
        rise_K: z.number().exactOptional(),
        temperature_degC: z.number().meta({ description: '°C, at which resistances and powers hold' }),
        conductorFillFactor: z.number().exactOptional(),
        method: MethodSchema,
        methods: z.object({
          copper: MethodSchema,
          core: MethodSchema.exactOptional(),
          rise: MethodSchema.exactOptional(),
        }),
      })
      .meta({ id: 'LossesAnswer' }),
    examples: [
      {
        winding: { turns: 60, meanTurnLength_m: 0.142, wireDiameter_m: 0.0018, layers: 3 },
        current: { direct_A: 8, harmonics: [{ frequency_Hz: 20000, rms_A: 0.6 }] },
        core: { volume_m3: 7.9e-5, loss: { k: 8.5, alpha: 1.3, beta: 2.5 } },
        flux: { frequency_Hz: 20000, phase: [0, 0.3, 1], fluxDensity_T: [-0.03, 0.03, -0.03] },
        temperature_degC: 40,
        cooling: { thermalResistance_K_per_W: 5.5 },
      },
    ],
    calculation: losses,
    hazards: (_request, answer) => ({ surface_degC: answer.temperature_degC }),
  });
