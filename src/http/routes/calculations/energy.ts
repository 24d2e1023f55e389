import type { FastifyInstance } from 'fastify';
import { z } from 'zod';
import { energy } from '../../../physics/calculations/energy.ts';
import { InductorSchema } from '../../schemas/inductor.ts';
import { list } from '../../schemas/list.ts';
import { MethodSchema } from '../../schemas/method.ts';
import { current_A, temperature_degC } from '../../schemas/quantities.ts';
import { uncertaintyFields } from '../../schemas/uncertainty.ts';
import { type CalculationPorts, calculation } from './calculation.ts';

/** Coupled inductors in one request. */
const MAXIMUM_COUPLED = 50;

/** POST /v1/energy */
export const energyRoute = (app: FastifyInstance, ports: CalculationPorts) =>
  calculation(app, ports, {
    name: 'energy',
    path: '/v1/energy',
    operationId: 'calculateEnergy',
    summary: 'Energy that an inductor stores at a current, saturating or not',
    request: z.union([
      z.strictObject({
        ...uncertaintyFields,
        inductor: InductorSchema,
        current_A,
        temperature_degC: temperature_degC.exactOptional().meta({ description: '°C, of the core' }),
      }),
      z.strictObject({
        ...uncertaintyFields,
        inductanceMatrix_H: list(list(z.number().min(-1e9).max(1e9), { min: 1, max: MAXIMUM_COUPLED }), {
          min: 1,
          max: MAXIMUM_COUPLED,
        }).meta({
          description:
            'H, rows of the matrix of several coupled inductors: self-inductances on the diagonal, mutual ones beside it',
        }),
        current_A: list(current_A, { min: 1, max: MAXIMUM_COUPLED }).meta({ description: 'A, one for each inductor' }),
      }),
    ]),
    answer: z.union([
      z
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
      z
        .object({
          energy_J: z.number().meta({ description: 'J, ½ iᵀ L i' }),
          fluxLinkages_Wb: list(z.number()).meta({ description: 'Wb, of each inductor' }),
          method: MethodSchema,
        })
        .meta({ id: 'CoupledEnergyAnswer' }),
    ]),
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
      {
        inductanceMatrix_H: [
          [0.0012, 0.0007],
          [0.0007, 0.0009],
        ],
        current_A: [4, -2.5],
      },
    ],
    calculation: energy,
    hazards: (_request, { energy_J }) => ({ storedEnergy_J: energy_J }),
  });
