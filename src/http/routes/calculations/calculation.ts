import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import type { z } from 'zod';
import { cautionsOf, type Hazards } from '../../../approval/cautions.ts';
import { resolveMaterials } from '../../../approval/references.ts';
import type { Registry } from '../../../approval/registry.ts';
import { propagateOverRecord } from '../../../metrology/propagation.ts';
import type { Calculation } from '../../../physics/calculations/calculation.ts';
import { BODY_PROBLEMS, operation } from '../../operation.ts';
import { list } from '../../schemas/list.ts';
import { CautionSchema } from '../../schemas/method.ts';
import { type UncertaintyFields, UncertaintySchema } from '../../schemas/uncertainty.ts';

interface Description<Request extends UncertaintyFields, Answer extends object> {
  readonly path: string;
  readonly operationId: string;
  readonly summary: string;
  /** Strict, and spread with `uncertaintyFields`. */
  readonly request: z.ZodType<Request>;
  readonly answer: z.ZodObject & z.ZodType<unknown, Answer>;
  readonly examples: readonly NoInfer<Request>[];
  readonly calculation: Calculation<NoInfer<Request>, NoInfer<Answer>>;
  readonly hazards?: (request: NoInfer<Request>, answer: NoInfer<Answer>) => Hazards;
}

/** Registers one calculation: nothing stored, uncertainty of any number in the request propagated, cautions added. */
export function calculation<Request extends UncertaintyFields, Answer extends object>(
  app: FastifyInstance,
  registry: Registry,
  c: Description<Request, Answer>,
): void {
  const Response = c.answer.extend({ uncertainty: UncertaintySchema.exactOptional(), cautions: list(CautionSchema) });
  app.withTypeProvider<ZodTypeProvider>().post(
    c.path,
    {
      schema: {
        ...operation({
          operationId: c.operationId,
          summary: c.summary,
          tag: 'calculation',
          scope: 'calculate',
          success: { 200: Response },
          problems: [...BODY_PROBLEMS, 'unknown-reference'],
        }),
        body: c.request.meta({ examples: c.examples as unknown[] }),
      },
    },
    async (request, reply) => {
      const { uncertainty, ...asSent } = request.body as Request;
      const { body: input } = await resolveMaterials(asSent, registry);
      const answer = c.calculation.calculate(input as Request);
      return reply.send({
        ...answer,
        ...(uncertainty && { uncertainty: firstOrder(c.calculation, input as Request, uncertainty) }),
        cautions: cautionsOf(c.hazards?.(input as Request, answer) ?? {}),
      } as never);
    },
  );
}

function firstOrder<Request, Answer>(
  { calculate, mainOutputs }: Calculation<Request, Answer>,
  request: Request,
  uncertainty: Readonly<Record<string, number>>,
) {
  const outputs = propagateOverRecord(request as object, uncertainty, (record) =>
    mainOutputs(calculate(record as Request)),
  );
  return {
    method: 'first-order' as const,
    outputs: Object.fromEntries(
      Object.entries(outputs).map(([output, { standardUncertainty, contributions }]) => [
        output,
        {
          standardUncertainty,
          contributions: contributions.map(({ name, ...contribution }) => ({ pointer: name, ...contribution })),
        },
      ]),
    ),
  };
}
