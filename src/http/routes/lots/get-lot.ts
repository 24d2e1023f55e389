import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import type { UnitDesk } from '../../../approval/measuring.ts';
import { CoilproofError } from '../../../errors.ts';
import { operation } from '../../operation.ts';
import { LotSchema } from '../../schemas/registry.ts';
import { LotParams } from './parameters.ts';

export const CountsSchema = z
  .object({
    pass: z.int(),
    inconclusive: z.int(),
    fail: z.int(),
    outOfCalibration: z.int().meta({ description: 'of these, measured by a rig out of calibration' }),
  })
  .meta({ id: 'UnitCounts', description: 'measured units by outcome' });

const Answer = LotSchema.extend({ id: z.string(), counts: CountsSchema }).meta({ id: 'LotWithCounts' });

/** GET /v1/lots/{lot} */
export function getLot(app: FastifyInstance, { registry, units }: UnitDesk): void {
  app.withTypeProvider<ZodTypeProvider>().get(
    '/v1/lots/:lot',
    {
      schema: {
        ...operation({
          operationId: 'getLot',
          summary: 'A lot, and how many of its measured units pass',
          description:
            'The entity tag is that of the lot as it was registered, for If-Match; it does not cover the counts.',
          tag: 'evidence',
          scope: 'read',
          success: { 200: Answer },
          problems: ['not-found', 'invalid-parameter', 'overloaded', 'internal'],
        }),
        params: LotParams,
      },
    },
    async (request, reply) => {
      const { lot } = request.params;
      const registered = await registry.get('lot', lot);
      if (!registered) throw new CoilproofError('not-found', `No lot ${lot} is registered here.`);
      reply.header('etag', `"${registered.tag}"`);
      return { id: lot, ...registered.value, counts: await units.counts(lot) };
    },
  );
}
