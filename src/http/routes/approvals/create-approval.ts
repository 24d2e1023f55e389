import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import { type ApprovalDesk, approve } from '../../../approval/approval.ts';
import { BODY_PROBLEMS, operation } from '../../operation.ts';
import { ApprovalSchema } from '../../schemas/approval.ts';
import { ApprovalRequestSchema } from '../../schemas/approval-request.ts';
import { EXAMPLES } from './examples.ts';

const Headers = z.object({
  'idempotency-key': z.string().min(1).max(200).exactOptional().meta({
    description: 'names this request: a repeat with the same key and body answers with what the first recorded',
  }),
});

/** POST /v1/approvals */
export function createApproval(app: FastifyInstance, desk: ApprovalDesk): void {
  app.withTypeProvider<ZodTypeProvider>().post(
    '/v1/approvals',
    {
      schema: {
        ...operation({
          operationId: 'createApproval',
          summary: 'Decide whether a part may go into a place of use, and record the decision',
          tag: 'approval',
          scope: 'approve',
          success: { 201: ApprovalSchema },
          problems: [...BODY_PROBLEMS, 'invalid-parameter', 'unknown-reference', 'idempotency-conflict'],
        }),
        headers: Headers,
        body: ApprovalRequestSchema.meta({ examples: EXAMPLES }),
      },
    },
    async (request, reply) => {
      const { approval } = await approve(desk, request.body, request.headers['idempotency-key']);
      return reply.code(201).header('location', `/v1/approvals/${approval.id}`).send(approval);
    },
  );
}
