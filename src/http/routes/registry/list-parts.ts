import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import { partId, type Registry } from '../../../approval/registry.ts';
import { CoilproofError } from '../../../errors.ts';
import { packCursor, unpackCursor } from '../../cursor.ts';
import { operation } from '../../operation.ts';
import { list } from '../../schemas/list.ts';
import { text } from '../../schemas/text.ts';

const Page = z
  .object({
    parts: list(z.object({ number: z.string(), revision: z.string(), description: z.string().exactOptional() })),
    after: z.string().nullable().meta({ description: 'send as after for the next page; null on the last' }),
  })
  .meta({ id: 'PartPage' });

const Query = z.strictObject({
  after: z.string().min(1).max(1000).exactOptional().meta({ description: 'cursor from the page before' }),
  limit: z.coerce.number().int().min(1).max(200).default(50),
});

/** GET /v1/parts and GET /v1/parts/{number}: released parts by number and revision, a page at a time. */
export function listParts(app: FastifyInstance, store: Registry): void {
  const page = async (prefix: string, { after, limit }: z.output<typeof Query>) => {
    const found = await store.list('part', {
      prefix,
      ...(after !== undefined && { after: unpackCursor(after) }),
      limit: limit + 1,
    });
    const shown = found.slice(0, limit);
    const last = shown.at(-1);
    return {
      parts: shown.map(({ value }) => value),
      after: found.length > limit && last ? packCursor(last.id) : null,
    };
  };
  const typed = app.withTypeProvider<ZodTypeProvider>();
  const common = { tag: 'registry', scope: 'read', success: { 200: Page } } as const;
  typed.get(
    '/v1/parts',
    {
      schema: {
        ...operation({
          ...common,
          operationId: 'listParts',
          summary: 'Released parts',
          problems: ['invalid-parameter', 'overloaded', 'internal'],
        }),
        querystring: Query,
      },
    },
    async (request) => page('', request.query),
  );
  typed.get(
    '/v1/parts/:number',
    {
      schema: {
        ...operation({
          ...common,
          operationId: 'listRevisions',
          summary: 'Released revisions of a part',
          problems: ['not-found', 'invalid-parameter', 'overloaded', 'internal'],
        }),
        params: z.object({ number: text(100) }),
        querystring: Query,
      },
    },
    async (request) => {
      const { number } = request.params;
      const found = await page(partId(number, ''), request.query);
      if (found.parts.length === 0 && request.query.after === undefined) {
        throw new CoilproofError('not-found', `No part ${number} is registered here.`);
      }
      return found;
    },
  );
}
