import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import type { ApprovalDesk } from '../../../approval/approval.ts';
import { packCursor, unpackPosition } from '../../cursor.ts';
import { operation } from '../../operation.ts';
import { ApprovalSchema, VerdictSchema } from '../../schemas/approval.ts';
import { list } from '../../schemas/list.ts';

const Summary = ApprovalSchema.pick({
  id: true,
  verdict: true,
  reasons: true,
  engine: true,
  digests: true,
  recordedAt: true,
})
  .extend({ part: z.object({ number: z.string(), revision: z.string() }) })
  .meta({ id: 'ApprovalSummary' });

const Page = z
  .object({
    approvals: list(Summary).meta({ description: 'oldest first' }),
    after: z.string().nullable().meta({ description: 'send as after for the next page; null on the last' }),
  })
  .meta({ id: 'ApprovalPage' });

const Query = z.strictObject({
  part: z.string().min(1).max(100).exactOptional().meta({ description: 'part number' }),
  verdict: VerdictSchema.exactOptional(),
  after: z.string().min(1).max(100).exactOptional().meta({ description: 'cursor from the page before' }),
  limit: z.coerce.number().int().min(1).max(200).default(50),
});

/** GET /v1/approvals */
export function listApprovals(app: FastifyInstance, { store }: ApprovalDesk): void {
  app.withTypeProvider<ZodTypeProvider>().get(
    '/v1/approvals',
    {
      schema: {
        ...operation({
          operationId: 'listApprovals',
          summary: 'Recorded approvals, oldest first, by part and verdict, a page at a time',
          tag: 'approval',
          scope: 'read',
          success: { 200: Page },
          problems: ['invalid-parameter', 'overloaded', 'internal'],
        }),
        querystring: Query,
      },
    },
    async (request) => {
      const { after, limit, ...filter } = request.query;
      const found = await store.list({
        ...filter,
        ...(after !== undefined && { after: unpackPosition(after) }),
        limit: limit + 1,
      });
      const page = found.slice(0, limit);
      const last = page.at(-1);
      return {
        approvals: page.map(({ approval }) => approval),
        after: found.length > limit && last ? packCursor(String(last.position)) : null,
      };
    },
  );
}
