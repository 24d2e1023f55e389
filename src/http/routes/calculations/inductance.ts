import type { FastifyInstance } from 'fastify';
import { z } from 'zod';
import { inductance } from '../../../physics/calculations/inductance.ts';
import { CoilSchema } from '../../schemas/coils.ts';
import { WindingSchema } from '../../schemas/inductor.ts';
import { MethodSchema } from '../../schemas/method.ts';
import { current_A, temperature_degC } from '../../schemas/quantities.ts';
import { uncertaintyFields } from '../../schemas/uncertainty.ts';
import { type CalculationPorts, calculation } from './calculation.ts';

/** POST /v1/inductance */
export const inductanceRoute = (app: FastifyInstance, ports: CalculationPorts) =>
  calculation(app, ports, {
    name: 'inductance',
    path: '/v1/inductance',
    operationId: 'calculateInductance',
    summary: 'Inductance of a construction, and what it stores at a current',
    request: z.strictObject({
      ...uncertaintyFields,
      coil: CoilSchema,
      current_A: current_A.exactOptional(),
      temperature_degC: temperature_degC.exactOptional().meta({
        description: '°C, of core and winding; absent: 25 for a saturation list, 20 for the winding',
      }),
      winding: WindingSchema.exactOptional(),
    }),
    answer: z
      .object({
        inductance_H: z.number().meta({ description: 'H, at zero current' }),
        closedForm_H: z
          .number()
          .exactOptional()
          .meta({ description: 'H, of a flat spiral: a published closed form beside the sum over turns' }),
        energy_J: z.number().exactOptional(),
        fluxLinkage_Wb: z.number().exactOptional(),
        apparentInductance_H: z.number().exactOptional().meta({ description: 'H, flux linkage over current' }),
        differentialInductance_H: z
          .number()
          .exactOptional()
          .meta({ description: 'H, slope of flux linkage over current' }),
        resistance_ohm: z.number().exactOptional().meta({ description: 'Ω, of the winding, direct current' }),
        timeConstant_s: z.number().exactOptional(),
        method: MethodSchema,
      })
      .meta({ id: 'InductanceAnswer' }),
    examples: [
      {
        coil: { shape: 'solenoid', turns: 40, diameter_m: 0.03, length_m: 0.06, wireDiameter_m: 0.0012 },
        current_A: 5,
        winding: { turns: 40, meanTurnLength_m: 0.0942, wireDiameter_m: 0.0012 },
      },
      { coil: { shape: 'multilayer', turns: 300, innerDiameter_m: 0.04, outerDiameter_m: 0.07, length_m: 0.03 } },
      { coil: { shape: 'round-loop', diameter_m: 0.5, wireDiameter_m: 0.001 } },
      { coil: { shape: 'rectangular-loop', sideA_m: 0.4, sideB_m: 0.3, wireDiameter_m: 0.002 } },
      { coil: { shape: 'straight-wire', length_m: 0.25, wireDiameter_m: 0.001 } },
      { coil: { shape: 'parallel-wires', length_m: 12, spacing_m: 0.006, wireDiameter_m: 0.0018 } },
      {
        coil: {
          shape: 'coaxial-line',
          length_m: 25,
          innerDiameter_m: 0.001,
          shieldInnerDiameter_m: 0.008,
          shieldOuterDiameter_m: 0.0084,
        },
      },
      {
        coil: {
          shape: 'flat-spiral',
          outline: 'circle',
          turns: 12,
          outerDiameter_m: 0.04,
          trackWidth_m: 0.0008,
          trackSpacing_m: 0.0004,
        },
      },
      {
        coil: {
          shape: 'toroid',
          section: 'rectangle',
          turns: 80,
          innerDiameter_m: 0.015,
          outerDiameter_m: 0.025,
          height_m: 0.01,
        },
      },
      {
        coil: {
          shape: 'cored',
          turns: 48,
          core: {
            effectiveArea_m2: 5.35e-4,
            effectiveLength_m: 0.147,
            material: {
              initialPermeability: 2200,
              saturation: [
                { temperature_degC: 25, fluxDensity_T: 0.49 },
                { temperature_degC: 100, fluxDensity_T: 0.39 },
              ],
            },
            gap: { length_m: 0.0024, legWidth_m: 0.02, legDepth_m: 0.027 },
          },
        },
        current_A: 12,
        temperature_degC: 90,
        uncertainty: { '/coil/core/gap/length_m': 2e-5 },
      },
    ],
    calculation: inductance,
    hazards: (_request, { energy_J }) => (energy_J === undefined ? {} : { storedEnergy_J: energy_J }),
  });
