import type { FastifyInstance } from 'fastify';
import { z } from 'zod';
import { energy } from '../../../physics/calculations/energy.ts';
import { InductorSchema } from '../../schemas/inductor.ts';
import { MethodSchema } from '../../schemas/method.ts';
import { current_A, temperature_degC } from '../../schemas/quantities.ts';
import { uncertaintyFields } from '../../schemas/uncertainty.ts';
import { type CalculationPorts, calculation } from './calculation.ts';

/** POST /v1/energy */
export const energyRoute = (app: FastifyInstance, ports: CalculationPorts) =>
  calculation(app, ports, {
    name: 'energy',
    path: '/v1/energy',
    operationId: 'calculateEnergy',
    summary: 'Energy that an inductor stores at a current, saturating or not',
    request: z.strictObject({
      ...uncertaintyFields,
      inductor: InductorSchema,
      current_A,
      temperature_degC: temperature_degC.exactOptional().meta({ description: '°C, of the core' }),
    }),
    answer: z
      .object({
        energy_J: z.number().meta({ description: 'J, ∫ i dλ' }),
        coenergy_J: z.number().meta({ description: 'J, ∫ λ di' }),
        fluxLinkage_Wb: z.number(),
        apparentInductance_H: z.number(),
        differentialInductance_H: z.number(),
        linearEstimate_J: z.number().meta({ description: 'J, ½·L₀·I² with the inductance at zero current' }),
        linearEstimateError: z.number().meta({ description: 'of that estimate, relative to the energy' }),
        method: MethodSchema,
      })
      .meta({ id: 'EnergyAnswer' }),
    examples: [
      { inductor: { inductance_H: 0.000632 }, current_A: 30 },
      {
        inductor: {
          sweep: {
            kind: 'differential',
            current_A: [0, 2, 4, 6, 8, 10, 12],
            inductance_H: [0.00084, 0.000838, 0.000832, 0.00082, 0.00079, 0.0007, 0.00052],
          },
        },
        current_A: 11,
      },
    ],
    calculation: energy,
    hazards: (_request, { energy_J }) => ({ storedEnergy_J: energy_J }),
  });
