import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import { lotUnderTest, type UnitDesk } from '../../../approval/measuring.ts';
import { packCursor, unpackPosition } from '../../cursor.ts';
import { operation } from '../../operation.ts';
import { RecordedUnitSchema } from '../../schemas/approval-request.ts';
import { JudgedUnitSchema, OutcomeSchema } from '../../schemas/judged-unit.ts';
import { list } from '../../schemas/list.ts';
import { LotParams } from './parameters.ts';

const Page = z
  .object({
    units: list(z.object({ unit: RecordedUnitSchema, judged: JudgedUnitSchema })).meta({
      description: 'in the order of recording',
    }),
    after: z.string().nullable().meta({ description: 'send as after for the next page; null on the last' }),
  })
  .meta({ id: 'UnitPage' });

const Query = z.strictObject({
  outcome: OutcomeSchema.exactOptional(),
  after: z.string().min(1).max(100).exactOptional().meta({ description: 'cursor from the page before' }),
  limit: z.coerce.number().int().min(1).max(200).default(50),
});

/** GET /v1/lots/{lot}/units */
export function getUnits(app: FastifyInstance, { registry, units }: UnitDesk): void {
  app.withTypeProvider<ZodTypeProvider>().get(
    '/v1/lots/:lot/units',
    {
      schema: {
        ...operation({
          operationId: 'listUnits',
          summary: 'Recorded units of a lot, as they were sent and as they were judged, a page at a time',
          tag: 'evidence',
          scope: 'read',
          success: { 200: Page },
          problems: ['not-found', 'invalid-parameter', 'unknown-reference', 'overloaded', 'internal'],
        }),
        params: LotParams,
        querystring: Query,
      },
    },
    async (request) => {
      const { id } = await lotUnderTest(registry, request.params.lot);
      const { after, limit, ...filter } = request.query;
      const found = await units.list(id, {
        ...filter,
        ...(after !== undefined && { after: unpackPosition(after) }),
        limit: limit + 1,
      });
      const page = found.slice(0, limit);
      const last = page.at(-1);
      return { units: page, after: found.length > limit && last ? packCursor(String(last.position)) : null };
    },
  );
}
