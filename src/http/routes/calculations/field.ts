import type { FastifyInstance } from 'fastify';
import { z } from 'zod';
import { field } from '../../../physics/calculations/field.ts';
import { Multilayer, RoundLoop, Solenoid } from '../../schemas/coils.ts';
import { list } from '../../schemas/list.ts';
import { MethodSchema } from '../../schemas/method.ts';
import { current_A, fluxDensity_T } from '../../schemas/quantities.ts';
import { uncertaintyFields } from '../../schemas/uncertainty.ts';
import { type CalculationPorts, calculation } from './calculation.ts';

/** Points in one request: a plot's worth. */
const MAXIMUM_POINTS = 1000;

/** POST /v1/field */
export const fieldRoute = (app: FastifyInstance, ports: CalculationPorts) =>
  calculation(app, ports, {
    name: 'field',
    path: '/v1/field',
    operationId: 'calculateField',
    summary: 'Flux density of a coil at points, and where it falls to a limit',
    request: z.strictObject({
      ...uncertaintyFields,
      coil: z.discriminatedUnion('shape', [RoundLoop, Solenoid, Multilayer]),
      current_A,
      points: list(z.strictObject({ radius_m: z.number().min(0).max(1e6), axial_m: z.number().min(-1e6).max(1e6) }), {
        max: MAXIMUM_POINTS,
      }).meta({ description: "m, from the coil's centre" }),
      limit_T: fluxDensity_T.exactOptional(),
    }),
    answer: z
      .object({
        points: list(
          z.object({
            radial_T: z.number(),
            axial_T: z.number(),
            magnitude_T: z.number(),
            energyDensity_J_per_m3: z.number(),
          }),
        ),
        limitDistance: z
          .object({ axial_m: z.number().nullable(), radial_m: z.number().nullable() })
          .exactOptional()
          .meta({
            description:
              "m from the coil's centre, along the axis and in the mid-plane, beyond which the flux density stays at or below limit_T",
          }),
        method: MethodSchema,
      })
      .meta({ id: 'FieldAnswer' }),
    examples: [
      {
        coil: { shape: 'multilayer', turns: 800, innerDiameter_m: 0.06, outerDiameter_m: 0.1, length_m: 0.05 },
        current_A: 8,
        points: [
          { radius_m: 0, axial_m: 0 },
          { radius_m: 0.02, axial_m: 0.03 },
          { radius_m: 0.3, axial_m: 0 },
        ],
        limit_T: 0.0005,
      },
    ],
    calculation: field,
    hazards: (_request, { points }) => ({
      fluxDensity_T: Math.max(0, ...points.map(({ magnitude_T }) => magnitude_T)),
    }),
  });
