import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import { cautionsOf, type Hazards } from '../../../approval/cautions.ts';
import { propagateOverRecord } from '../../../metrology/propagation.ts';
import type { Calculation } from '../../../physics/calculations/calculation.ts';
import { BODY_PROBLEMS, operation } from '../../operation.ts';
import { CautionSchema } from '../../schemas/method.ts';
import { UncertaintyMap, UncertaintySchema } from '../../schemas/uncertainty.ts';

interface Description<Request extends z.ZodObject, Answer extends z.ZodObject> {
  readonly path: string;
  readonly operationId: string;
  readonly summary: string;
  readonly description?: string;
  readonly request: Request;
  readonly answer: Answer;
  readonly examples: readonly z.input<Request>[];
  readonly calculation: Calculation<z.output<Request>, z.input<Answer>>;
  readonly hazards?: (request: z.output<Request>, answer: z.input<Answer>) => Hazards;
}

/** Registers one calculation: nothing stored, uncertainty of any number in the request propagated, cautions added. */
export function calculation<Request extends z.ZodObject, Answer extends z.ZodObject>(
  app: FastifyInstance,
  c: Description<Request, Answer>,
): void {
  const Body = c.request
    .extend({ uncertainty: UncertaintyMap.exactOptional() })
    .meta({ examples: c.examples as unknown[] });
  const Response = c.answer.extend({
    uncertainty: UncertaintySchema.exactOptional(),
    cautions: z.array(CautionSchema),
  });
  app.withTypeProvider<ZodTypeProvider>().post(
    c.path,
    {
      schema: {
        ...operation({
          operationId: c.operationId,
          summary: c.summary,
          ...(c.description !== undefined && { description: c.description }),
          tag: 'calculation',
          scope: 'calculate',
          success: { 200: Response },
          problems: BODY_PROBLEMS,
        }),
        body: Body,
      },
    },
    async (request, reply) => {
      const { uncertainty, ...body } = request.body as z.output<Request> & { uncertainty?: Record<string, number> };
      const input = body as unknown as z.output<Request>;
      const answer = c.calculation.calculate(input);
      return reply.send({
        ...answer,
        ...(uncertainty && { uncertainty: firstOrder(c.calculation, input, uncertainty) }),
        cautions: cautionsOf(c.hazards?.(input, answer) ?? {}),
      } as never);
    },
  );
}

function firstOrder<Request, Answer>(
  { calculate, mainOutputs }: Calculation<Request, Answer>,
  request: Request,
  uncertainty: Record<string, number>,
) {
  return {
    method: 'first-order' as const,
    outputs: propagateOverRecord(request as object, uncertainty, (record) => mainOutputs(calculate(record as Request))),
  };
}
