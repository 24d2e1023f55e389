import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import { cautionsOf, type Hazards } from '../../../approval/cautions.ts';
import type { Compute, Simulation } from '../../../approval/compute.ts';
import { resolveMaterials } from '../../../approval/references.ts';
import type { Registry } from '../../../approval/registry.ts';
import { propagateOverRecord } from '../../../metrology/propagation.ts';
import type { Calculation } from '../../../physics/calculations/calculation.ts';
import { type CalculationName, exclusiveMinimum } from '../../../physics/calculations/index.ts';
import { BODY_PROBLEMS, operation } from '../../operation.ts';
import { list } from '../../schemas/list.ts';
import { CautionSchema } from '../../schemas/method.ts';
import { type UncertaintyFields, UncertaintySchema } from '../../schemas/uncertainty.ts';

/** What calculations need from outside. */
export interface CalculationPorts {
  readonly registry: Registry;
  readonly compute: Compute;
}

interface Description<Request extends UncertaintyFields, Answer extends object> {
  readonly path: string;
  readonly operationId: string;
  readonly summary: string;
  /** Strict, and spread with `uncertaintyFields`. */
  readonly request: z.ZodType<Request>;
  /** One form, or several that are told apart by their fields. */
  readonly answer: (z.ZodObject | z.ZodUnion<readonly z.ZodObject[]>) & z.ZodType<unknown, Answer>;
  readonly examples: readonly NoInfer<Request>[];
  readonly name: CalculationName;
  readonly calculation: Calculation<NoInfer<Request>, NoInfer<Answer>>;
  readonly hazards?: (request: NoInfer<Request>, answer: NoInfer<Answer>) => Hazards;
}

/** Registers one calculation: nothing stored, uncertainty of any number in the request propagated, cautions added. */
export function calculation<Request extends UncertaintyFields, Answer extends object>(
  app: FastifyInstance,
  { registry, compute }: CalculationPorts,
  c: Description<Request, Answer>,
): void {
  const added = { uncertainty: UncertaintySchema.exactOptional(), cautions: list(CautionSchema) };
  const Response =
    'options' in c.answer ? z.union(c.answer.options.map((form) => form.extend(added))) : c.answer.extend(added);
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
      const { uncertainty, method, trials, seed, coverage, ...asSent } = request.body as Request;
      const { body: input } = await resolveMaterials(asSent as unknown as Request, registry);
      const answer = c.calculation.calculate(input);
      const options = { trials: trials ?? DEFAULT_TRIALS, seed: seed ?? 1, coverage: coverage ?? 0.95 };
      return reply.send({
        ...answer,
        ...(uncertainty && {
          uncertainty:
            method === 'monte-carlo'
              ? await simulated(compute, { calculation: c.name, request: input, uncertainty, options })
              : firstOrder(c.calculation, input, uncertainty),
        }),
        cautions: cautionsOf(c.hazards?.(input, answer) ?? {}),
      } as never);
    },
  );
}

/** Enough for two significant digits of a standard uncertainty and of a 95 % interval (JCGM 101, 7.2.3). */
const DEFAULT_TRIALS = 100_000;

async function simulated(compute: Compute, simulation: Simulation) {
  return { method: 'monte-carlo' as const, ...(await compute.simulate(simulation)) };
}

function firstOrder<Request, Answer>(
  { calculate, mainOutputs }: Calculation<Request, Answer>,
  request: Request,
  uncertainty: Readonly<Record<string, number>>,
) {
  const outputs = propagateOverRecord(
    request as object,
    uncertainty,
    (record) => mainOutputs(calculate(record as Request)),
    exclusiveMinimum,
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
