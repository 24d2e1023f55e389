import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import { partUnderTest, type UnitDesk } from '../../../approval/measuring.ts';
import { trendOf } from '../../../evidence/lot-statistics.ts';
import { operation } from '../../operation.ts';
import { list } from '../../schemas/list.ts';
import { TrendOfQuantitySchema } from '../../schemas/statistics.ts';
import { text } from '../../schemas/text.ts';

const Answer = z
  .object({ by: z.enum(['lot', 'day', 'rig']), lots: list(z.string()), quantities: list(TrendOfQuantitySchema) })
  .meta({ id: 'Trend' });

/** GET /v1/parts/{number}/revisions/{revision}/trend */
export function getTrend(app: FastifyInstance, { registry, units }: UnitDesk): void {
  app.withTypeProvider<ZodTypeProvider>().get(
    '/v1/parts/:number/revisions/:revision/trend',
    {
      schema: {
        ...operation({
          operationId: 'getTrend',
          summary: 'Each measured quantity of a part over its lots, days or rigs, and whether these differ',
          tag: 'evidence',
          scope: 'read',
          success: { 200: Answer },
          problems: ['not-found', 'invalid-parameter', 'unknown-reference', 'overloaded', 'internal'],
        }),
        params: z.object({ number: text(100), revision: text(40) }),
        querystring: z.strictObject({ by: z.enum(['lot', 'day', 'rig']) }),
      },
    },
    async (request) => {
      const { number, revision } = request.params;
      const { lots, yardstick } = await partUnderTest(registry, number, revision);
      const { by } = request.query;
      return { by, lots, quantities: trendOf(await units.rollups(lots), by, yardstick) };
    },
  );
}
