import { randomUUID } from 'node:crypto';
import Fastify, { type FastifyInstance, type FastifyServerOptions } from 'fastify';
import { serializerCompiler, validatorCompiler } from 'fastify-type-provider-zod';
import type { ApprovalDesk } from '../approval/approval.ts';
import { CoilproofError } from '../errors.ts';
import { assertFinite } from './finite.ts';
import { metrics } from './plugins/metrics.ts';
import { openapi } from './plugins/openapi.ts';
import { sendProblem } from './problems.ts';
import { approvals } from './routes/approvals/index.ts';
import { calculations } from './routes/calculations/index.ts';
import { health } from './routes/service/health.ts';

export interface AppOptions {
  readonly version: string;
  readonly logger: NonNullable<FastifyServerOptions['loggerInstance']>;
  readonly limits: { readonly bodyBytes: number; readonly requestTimeout_ms: number };
  readonly desk: ApprovalDesk;
}

const REQUEST_ID = /^[\w.-]{1,64}$/;

/** The service as an unstarted server: plugins in order, then the routes. Listening and signals are the caller's. */
export async function createApp(options: AppOptions): Promise<FastifyInstance> {
  const app = Fastify({
    loggerInstance: options.logger,
    bodyLimit: options.limits.bodyBytes,
    requestTimeout: options.limits.requestTimeout_ms,
    handlerTimeout: options.limits.requestTimeout_ms,
    return503OnClosing: true,
    genReqId: (request) => {
      const given = request.headers['x-request-id'];
      return typeof given === 'string' && REQUEST_ID.test(given) ? given : randomUUID();
    },
  }) as unknown as FastifyInstance;

  app.setValidatorCompiler(validatorCompiler);
  app.setSerializerCompiler(serializerCompiler);
  app.setErrorHandler(sendProblem);
  app.setNotFoundHandler((request, reply) => sendProblem(noRoute(app, request.method, request.url, reply), request, reply));
  app.addHook('onRequest', async (request, reply) => {
    reply.header('x-request-id', request.id).header('x-content-type-options', 'nosniff').header('cache-control', 'no-store');
  });
  app.addHook('preSerialization', async (_request, _reply, payload) => {
    assertFinite(payload);
    return payload;
  });

  await openapi(app, options.version);
  metrics(app);
  health(app, () => options.desk.store.ping());
  calculations(app);
  approvals(app, options.desk);
  app.get('/openapi.json', { schema: { hide: true } }, async () => app.swagger());
  return app;
}

const METHODS = ['GET', 'PUT', 'POST', 'DELETE'] as const;

function noRoute(
  app: FastifyInstance,
  method: string,
  url: string,
  reply: { header(name: string, value: string): unknown },
): CoilproofError {
  const path = url.split('?', 1)[0] ?? url;
  const allowed = METHODS.filter((candidate) => candidate !== method && app.findRoute({ method: candidate, url: path }));
  if (allowed.length === 0) return new CoilproofError('not-found', `There is nothing at ${path}.`);
  reply.header('allow', allowed.join(', '));
  return new CoilproofError('method-not-allowed', `${path} answers ${allowed.join(', ')}.`);
}
