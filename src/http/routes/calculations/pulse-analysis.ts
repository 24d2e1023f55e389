import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import { cautionsOf } from '../../../approval/cautions.ts';
import { BODY_PROBLEMS, operation } from '../../operation.ts';
import { list } from '../../schemas/list.ts';
import { CautionSchema, MethodSchema } from '../../schemas/method.ts';
import { PULSE_BODY_BYTES, PulseSchema } from '../../schemas/pulse.ts';
import type { CalculationPorts } from './calculation.ts';
import { EXAMPLE_PULSE } from './example-pulse.ts';

const Answer = z
  .object({
    sweep: z
      .object({
        current_A: list(z.number()),
        fluxLinkage_Wb: list(z.number()),
        differentialInductance_H: list(z.number()),
        standardUncertainty_H: list(z.number()).meta({ description: 'H, of the differential inductance (k = 1)' }),
      })
      .meta({ description: 'from zero current to the peak of the pulse' }),
    energy: z
      .object({
        delivered_J: z.number().meta({ description: 'J, into the terminals' }),
        dissipated_J: z.number().meta({ description: "J, in the winding's resistance" }),
        stored_J: z.number().meta({ description: 'J, held at the peak current, ∫ i dλ' }),
        recovered_J: z.number().meta({ description: 'J, back out of the terminals' }),
        remaining_J: z.number().meta({ description: 'J, still held at the last sample' }),
        residual_J: z.number().meta({ description: 'J, what the others leave over' }),
        residualUncertainty_J: z.number(),
      })
      .meta({ description: 'audit of the whole pulse' }),
    voltageOffset_V: z.number(),
    voltageOffsetSource: z.enum(['given', 'quiet part', 'closed loop', 'none']),
    currentOffset_A: z.number(),
    voltageNoise_V: z.number(),
    currentNoise_A: z.number(),
    method: MethodSchema,
    cautions: list(CautionSchema),
  })
  .meta({ id: 'PulseAnalysis' });

/** POST /v1/pulse-analysis */
export const pulseAnalysisRoute = (app: FastifyInstance, { compute }: CalculationPorts) =>
  app.withTypeProvider<ZodTypeProvider>().post(
    '/v1/pulse-analysis',
    {
      bodyLimit: PULSE_BODY_BYTES,
      schema: {
        ...operation({
          operationId: 'analysePulse',
          summary: 'Flux characteristic and energies of an inductor from one pulse of voltage and current',
          tag: 'calculation',
          scope: 'calculate',
          success: { 200: Answer },
          problems: BODY_PROBLEMS,
        }),
        body: PulseSchema.meta({ examples: [EXAMPLE_PULSE] }),
      },
    },
    async (request) => {
      const analysis = await compute.analysePulse(request.body);
      return { ...analysis, cautions: cautionsOf({ storedEnergy_J: analysis.energy.stored_J }) };
    },
  );
