import type { FastifyInstance } from 'fastify';
import { z } from 'zod';
import { energyDensity } from '../../../physics/calculations/energy-density.ts';
import { MaterialSchema } from '../../schemas/core.ts';
import { MethodSchema } from '../../schemas/method.ts';
import { relativePermeability, temperature_degC, volume_m3 } from '../../schemas/quantities.ts';
import { uncertaintyFields } from '../../schemas/uncertainty.ts';
import { type CalculationPorts, calculation } from './calculation.ts';

/** POST /v1/energy-density */
export const energyDensityRoute = (app: FastifyInstance, ports: CalculationPorts) =>
  calculation(app, ports, {
    name: 'energy-density',
    path: '/v1/energy-density',
    operationId: 'calculateEnergyDensity',
    summary: 'Energy density and pressure of a magnetic field',
    request: z.strictObject({
      ...uncertaintyFields,
      fluxDensity_T: z.number().min(-1000).max(1000).meta({ description: 'T; magnitude up to 1000' }),
      relativePermeability: relativePermeability.exactOptional().meta({ description: 'of a linear medium; default 1' }),
      material: MaterialSchema.exactOptional().meta({
        description: 'a saturating medium, in place of a relative permeability',
      }),
      temperature_degC: temperature_degC.exactOptional().meta({ description: '°C, of the material' }),
      volume_m3: volume_m3.exactOptional(),
    }),
    answer: z
      .object({
        energyDensity_J_per_m3: z.number(),
        pressure_Pa: z.number().meta({ description: 'Pa, B²/2µ₀: the pull per area of a pole face across an air gap' }),
        energy_J: z.number().exactOptional(),
        method: MethodSchema,
      })
      .meta({ id: 'EnergyDensityAnswer' }),
    examples: [{ fluxDensity_T: 1 }, { fluxDensity_T: 0.3, relativePermeability: 60, volume_m3: 2.1e-5 }],
    calculation: energyDensity,
    hazards: (request, { energy_J = 0 }) => ({
      fluxDensity_T: Math.abs(request.fluxDensity_T),
      storedEnergy_J: energy_J,
    }),
  });
