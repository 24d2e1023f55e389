import type { FastifyInstance } from 'fastify';
import { CoilproofError } from '../../errors.ts';

/** Turns requests away with 503 and Retry-After while `limit` are under way, so that those end in good time; health stays open. */
export function overload(app: FastifyInstance, limit: number): void {
  const counted = new WeakSet<object>();
  let inFlight = 0;
  app.addHook('onRequest', async (request) => {
    if (request.url === '/livez' || request.url === '/readyz') return;
    if (inFlight >= limit) throw new CoilproofError('overloaded', `More than ${limit} requests are under way.`);
    inFlight += 1;
    counted.add(request);
  });
  const done = (request: object) => {
    if (counted.delete(request)) inFlight -= 1;
  };
  app.addHook('onResponse', async (request) => done(request));
  app.addHook('onRequestAbort', async (request) => done(request));
}
