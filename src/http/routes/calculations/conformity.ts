import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import { conformity } from '../../../metrology/conformity.ts';
import { BODY_PROBLEMS, operation } from '../../operation.ts';
import { list } from '../../schemas/list.ts';
import { risk, standardUncertainty } from '../../schemas/quantities.ts';

const value = z.number().min(-1e300).max(1e300);

const Request = z
  .strictObject({
    measured: value,
    standardUncertainty,
    lower: value.exactOptional(),
    upper: value.exactOptional(),
    rule: z
      .strictObject({
        kind: z.enum(['simple-acceptance', 'guarded-acceptance', 'guarded-rejection', 'three-zone']),
        risk: risk.exactOptional(),
      })
      .exactOptional()
      .meta({ description: 'default three-zone at a risk of 0.05' }),
  })
  .meta({
    examples: [
      { measured: -5.47, standardUncertainty: 0.05, upper: -5.4 },
      {
        measured: 0.00102,
        standardUncertainty: 0.000012,
        lower: 0.0009,
        upper: 0.0011,
        rule: { kind: 'guarded-acceptance', risk: 0.025 },
      },
    ],
  });

const Answer = z
  .object({
    outcome: z.enum(['pass', 'fail', 'inconclusive']),
    conformanceProbability: z.number(),
    nonconformanceProbability: z.number().meta({ description: 'computed apart, so that 1e-20 is not lost beside 1' }),
    acceptance: z.object({ lower: z.number().nullable(), upper: z.number().nullable() }).nullable().meta({
      description: 'the measured values that pass, ends included; a null bound is none; null where no value passes',
    }),
    margin: z.number().meta({ description: 'to the nearest limit, positive inside' }),
    normalisedMargin: z
      .number()
      .nullable()
      .meta({ description: 'margin in standard uncertainties; null where that is 0' }),
    method: z.object({
      name: z.string(),
      references: list(z.string()),
      relativeError: z.number(),
      validity: z.string(),
    }),
  })
  .meta({ id: 'ConformityAnswer' });

const METHOD = {
  name: 'conformance probability of a normally distributed true value',
  references: ['JCGM 106:2012, clauses 7 and 8', 'ISO 14253-1:2017'],
  relativeError: 0,
  validity: 'normal distribution about the measured value; no prior knowledge of the production',
};

/** POST /v1/conformity */
export const conformityRoute = (app: FastifyInstance) =>
  app.withTypeProvider<ZodTypeProvider>().post(
    '/v1/conformity',
    {
      schema: {
        ...operation({
          operationId: 'decideConformity',
          summary: 'Whether a measured value conforms to its limits, its uncertainty taken into account',
          tag: 'calculation',
          scope: 'calculate',
          success: { 200: Answer },
          problems: BODY_PROBLEMS,
        }),
        body: Request,
      },
    },
    async (request) => ({ ...conformity(request.body), method: METHOD }),
  );
