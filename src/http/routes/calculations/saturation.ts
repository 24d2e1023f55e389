import type { FastifyInstance } from 'fastify';
import { z } from 'zod';
import { saturation } from '../../../physics/calculations/saturation.ts';
import { Cored } from '../../schemas/coils.ts';
import { MethodSchema } from '../../schemas/method.ts';
import { current_A, fraction, temperature_degC } from '../../schemas/quantities.ts';
import { uncertaintyFields } from '../../schemas/uncertainty.ts';
import { type CalculationPorts, calculation } from './calculation.ts';

/** POST /v1/saturation */
export const saturationRoute = (app: FastifyInstance, ports: CalculationPorts) =>
  calculation(app, ports, {
    name: 'saturation',
    path: '/v1/saturation',
    operationId: 'calculateSaturation',
    summary: 'Where a cored coil saturates, and the energy it holds there',
    request: z.strictObject({
      ...uncertaintyFields,
      coil: Cored,
      temperature_degC: temperature_degC
        .exactOptional()
        .meta({ description: '°C, of the core; default 25 for a saturation list' }),
      inductanceDrop: fraction
        .exactOptional()
        .meta({ description: 'relative fall of the differential inductance; default 0.3' }),
      current_A: current_A.exactOptional(),
    }),
    answer: z
      .object({
        dropCurrent_A: z.number().nullable().meta({ description: 'A; null where the inductance never drops so far' }),
        dropReason: z.string().exactOptional(),
        fluxLimitCurrent_A: z.number().nullable().meta({
          description: 'A, smallest section at its saturation flux density; null where the material has none',
        }),
        fluxLimitReason: z.string().exactOptional(),
        energyAtFluxLimit: z.object({ total_J: z.number(), core_J: z.number(), gap_J: z.number() }).nullable(),
        fluxDensity_T: z.number().exactOptional().meta({ description: 'T, in the smallest section at current_A' }),
        currentMargin: z.number().exactOptional().meta({ description: 'flux limit over current_A, less 1' }),
        method: MethodSchema,
      })
      .meta({ id: 'SaturationAnswer' }),
    examples: [
      {
        coil: {
          shape: 'cored',
          turns: 48,
          core: {
            dimensions: { kind: 'ring', outerDiameter_m: 0.047, innerDiameter_m: 0.024, height_m: 0.018 },
            material: { initialPermeability: 60, saturation: { fluxDensity_T: 1 }, magnetisation: 'froehlich' },
          },
        },
        inductanceDrop: 0.2,
        current_A: 10,
      },
    ],
    calculation: saturation,
    hazards: (_request, { energyAtFluxLimit }) => ({ storedEnergy_J: energyAtFluxLimit?.total_J ?? 0 }),
  });
