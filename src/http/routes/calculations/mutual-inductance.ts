import type { FastifyInstance } from 'fastify';
import { z } from 'zod';
import { mutualInductance } from '../../../physics/calculations/mutual-inductance.ts';
import { Multilayer, RoundLoop, Solenoid } from '../../schemas/coils.ts';
import { MethodSchema } from '../../schemas/method.ts';
import { current_A } from '../../schemas/quantities.ts';
import { uncertaintyFields } from '../../schemas/uncertainty.ts';
import { type CalculationPorts, calculation } from './calculation.ts';

const CoaxialCoil = z.discriminatedUnion('shape', [RoundLoop, Solenoid, Multilayer]);

/** POST /v1/mutual-inductance */
export const mutualInductanceRoute = (app: FastifyInstance, ports: CalculationPorts) =>
  calculation(app, ports, {
    name: 'mutual-inductance',
    path: '/v1/mutual-inductance',
    operationId: 'calculateMutualInductance',
    summary: 'Mutual inductance of two coaxial coils; with currents their energy and axial force',
    request: z.strictObject({
      ...uncertaintyFields,
      primary: CoaxialCoil,
      secondary: CoaxialCoil,
      axialDistance_m: z
        .number()
        .min(-1e6)
        .max(1e6)
        .meta({ description: "m, from the primary's centre to the secondary's" }),
      primaryCurrent_A: current_A.exactOptional(),
      secondaryCurrent_A: current_A.exactOptional(),
    }),
    answer: z
      .object({
        mutualInductance_H: z.number().meta({ description: 'H, of coils wound in the same sense' }),
        primaryInductance_H: z.number(),
        secondaryInductance_H: z.number(),
        couplingCoefficient: z.number(),
        energy_J: z.number().exactOptional(),
        axialForce_N: z
          .number()
          .exactOptional()
          .meta({ description: 'N, on the secondary, positive towards greater axial distance' }),
        method: MethodSchema,
      })
      .meta({ id: 'MutualInductanceAnswer' }),
    examples: [
      {
        primary: { shape: 'solenoid', turns: 500, diameter_m: 0.062, length_m: 0.75 },
        secondary: { shape: 'round-loop', diameter_m: 0.07, wireDiameter_m: 0.001, turns: 10 },
        axialDistance_m: 0,
        primaryCurrent_A: 2,
        secondaryCurrent_A: 0.5,
      },
    ],
    calculation: mutualInductance,
    hazards: (_request, { energy_J = 0 }) => ({ storedEnergy_J: energy_J }),
  });
