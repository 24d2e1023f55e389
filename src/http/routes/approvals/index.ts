import type { FastifyInstance } from 'fastify';
import type { ApprovalDesk } from '../../../approval/approval.ts';
import { createApproval } from './create-approval.ts';
import { getApproval } from './get-approval.ts';
import { listApprovals } from './list-approvals.ts';

/** /v1/approvals */
export function approvals(app: FastifyInstance, desk: ApprovalDesk): void {
  createApproval(app, desk);
  getApproval(app, desk);
  listApprovals(app, desk);
}
