import type { FastifyInstance } from 'fastify';
import { z } from 'zod';
import { CoilproofError } from '../../../errors.ts';
import { operation } from '../../operation.ts';

const Status = z.object({ status: z.literal('ok') }).meta({ id: 'ServiceStatus' });

/** GET /livez: the process runs. GET /readyz: the store answers and the service is not shutting down. */
export function health(app: FastifyInstance, ready: () => Promise<void>): void {
  let closing = false;
  app.addHook('preClose', async () => {
    closing = true;
  });
  app.get(
    '/livez',
    {
      schema: operation({
        operationId: 'getLiveness',
        summary: 'Whether the process runs',
        tag: 'service',
        scope: 'public',
        success: { 200: Status },
        problems: [],
      }),
    },
    async () => ({ status: 'ok' }) as const,
  );
  app.get(
    '/readyz',
    {
      schema: operation({
        operationId: 'getReadiness',
        summary: 'Whether requests can be served: the store answers and no shutdown is under way',
        tag: 'service',
        scope: 'public',
        success: { 200: Status },
        problems: ['not-ready'],
      }),
    },
    async () => {
      if (closing) throw new CoilproofError('not-ready', 'The service is shutting down.');
      await ready().catch((cause) => {
        throw new CoilproofError('not-ready', 'The store does not answer.', [], { cause });
      });
      return { status: 'ok' } as const;
    },
  );
}
