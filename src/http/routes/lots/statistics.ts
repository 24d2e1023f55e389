import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import { lotUnderTest, type UnitDesk } from '../../../approval/measuring.ts';
import { lotStatistics } from '../../../evidence/lot-statistics.ts';
import { operation } from '../../operation.ts';
import { list } from '../../schemas/list.ts';
import { QuantityStatisticsSchema } from '../../schemas/statistics.ts';
import { CountsSchema } from './get-lot.ts';
import { LotParams } from './parameters.ts';

const Answer = z
  .object({ lot: z.string(), counts: CountsSchema, quantities: list(QuantityStatisticsSchema) })
  .meta({ id: 'LotStatistics' });

/** GET /v1/lots/{lot}/statistics: from rollups, so that a lot of a million units costs no more than one of a thousand. */
export function getStatistics(app: FastifyInstance, { registry, units }: UnitDesk): void {
  app.withTypeProvider<ZodTypeProvider>().get(
    '/v1/lots/:lot/statistics',
    {
      schema: {
        ...operation({
          operationId: 'getLotStatistics',
          summary:
            'Statistics of every quantity over a lot: spread, quantiles, histogram, capability, tolerance interval',
          tag: 'evidence',
          scope: 'read',
          success: { 200: Answer },
          problems: ['not-found', 'invalid-parameter', 'unknown-reference', 'overloaded', 'internal'],
        }),
        params: LotParams,
      },
    },
    async (request) => {
      const { id, yardstick } = await lotUnderTest(registry, request.params.lot);
      const [counts, rollups] = await Promise.all([units.counts(id), units.rollups([id])]);
      return { lot: id, counts, quantities: lotStatistics(rollups, yardstick) };
    },
  );
}
