import type { z } from 'zod';
import { ERROR_CATALOGUE, type ErrorCode } from '../errors.ts';
import { Problem, STATUS } from './problems.ts';

export type Scope = 'calculate' | 'read' | 'measure' | 'approve' | 'administer' | 'public';

interface OperationDescription<Success extends Record<number, z.ZodType>> {
  readonly operationId: string;
  readonly summary: string;
  readonly description?: string;
  readonly tag: string;
  readonly scope: Scope;
  readonly success: Success;
  readonly problems: readonly ErrorCode[];
}

/** Problems that any operation that reads a body can answer with. */
export const BODY_PROBLEMS = [
  'malformed-request',
  'invalid-body',
  'unusable-quantity',
  'number-range',
  'too-large',
  'unsupported-media-type',
  'request-timeout',
  'overloaded',
  'internal',
] as const satisfies readonly ErrorCode[];

/** What every operation publishes: id, summary, scope, its answers and each problem it can answer with, by status. */
export function operation<const Success extends Record<number, z.ZodType>>(o: OperationDescription<Success>) {
  const byStatus = new Map<number, ErrorCode[]>();
  for (const code of o.problems) byStatus.set(STATUS[code], [...(byStatus.get(STATUS[code]) ?? []), code]);
  const problems = Object.fromEntries(
    [...byStatus].map(([status, codes]) => [
      status,
      {
        description: codes.map((code) => `\`${code}\`: ${ERROR_CATALOGUE[code].meaning}`).join(' '),
        content: { 'application/problem+json': { schema: Problem } },
      },
    ]),
  );
  return {
    operationId: o.operationId,
    summary: o.summary,
    ...(o.description !== undefined && { description: o.description }),
    tags: [o.tag],
    'x-scope': o.scope,
    response: { ...problems, ...o.success } as Success,
  };
}
