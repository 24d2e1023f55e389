import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import type { ApprovalDesk } from '../../../approval/approval.ts';
import { CoilproofError } from '../../../errors.ts';
import { operation } from '../../operation.ts';
import { ApprovalSchema } from '../../schemas/approval.ts';

/** GET /v1/approvals/{id} */
export function getApproval(app: FastifyInstance, { store }: ApprovalDesk): void {
  app.withTypeProvider<ZodTypeProvider>().get(
    '/v1/approvals/:id',
    {
      schema: {
        ...operation({
          operationId: 'getApproval',
          summary: 'A recorded approval, as it was answered',
          tag: 'approval',
          scope: 'read',
          success: { 200: ApprovalSchema },
          problems: ['not-found', 'invalid-parameter', 'overloaded', 'internal'],
        }),
        params: z.object({ id: z.string().min(1).max(100) }),
      },
    },
    async (request) => {
      const approval = await store.get(request.params.id);
      if (!approval) throw new CoilproofError('not-found', `No approval ${request.params.id} is recorded here.`);
      return approval;
    },
  );
}
