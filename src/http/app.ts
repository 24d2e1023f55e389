import { randomUUID } from 'node:crypto';
import Fastify, { type FastifyInstance, type FastifyServerOptions } from 'fastify';
import { serializerCompiler, validatorCompiler } from 'fastify-type-provider-zod';
import type { ApprovalDesk } from '../approval/approval.ts';
import { assertFinite } from './finite.ts';
import { metrics } from './plugins/metrics.ts';
import { openapi } from './plugins/openapi.ts';
import { overload } from './plugins/overload.ts';
import { unmatched } from './plugins/unmatched.ts';
import { sendProblem } from './problems.ts';
import { approvals } from './routes/approvals/index.ts';
import { calculations } from './routes/calculations/index.ts';
import { lots } from './routes/lots/index.ts';
import { registry } from './routes/registry/index.ts';
import { health } from './routes/service/health.ts';

export interface AppOptions {
  readonly version: string;
  readonly logger: NonNullable<FastifyServerOptions['loggerInstance']>;
  readonly limits: Limits;
  readonly desk: ApprovalDesk;
}

export interface Limits {
  readonly bodyBytes: number;
  readonly requestTimeout_ms: number;
  readonly requestsInFlight: number;
}

const REQUEST_ID = /^[\w.-]{1,64}$/;

/** The service as an unstarted server: plugins in order, then the routes. Listening and signals are the caller's. */
export async function createApp(options: AppOptions): Promise<FastifyInstance> {
  const app = Fastify({
    loggerInstance: options.logger,
    bodyLimit: options.limits.bodyBytes,
    // An idle connection ends; a long one that still sends, such as a rig's shift in one stream, goes on.
    connectionTimeout: options.limits.requestTimeout_ms,
    handlerTimeout: options.limits.requestTimeout_ms,
    return503OnClosing: true,
    frameworkErrors: sendProblem,
    genReqId: (request) => {
      const given = request.headers['x-request-id'];
      return typeof given === 'string' && REQUEST_ID.test(given) ? given : randomUUID();
    },
  }) as unknown as FastifyInstance;

  app.setValidatorCompiler(validatorCompiler);
  app.setSerializerCompiler(serializerCompiler);
  app.setErrorHandler(sendProblem);
  unmatched(app);
  app.addHook('onRequest', async (request, reply) => {
    reply
      .header('x-request-id', request.id)
      .header('x-content-type-options', 'nosniff')
      .header('cache-control', 'no-store');
  });
  app.addHook('preSerialization', async (_request, _reply, payload) => {
    assertFinite(payload);
    return payload;
  });

  overload(app, options.limits.requestsInFlight);
  await openapi(app, options.version);
  metrics(app);
  health(app, () => options.desk.store.ping());
  calculations(app, options.desk);
  approvals(app, options.desk);
  registry(app, options.desk.registry);
  lots(app, options.desk);
  app.get('/openapi.json', { schema: { hide: true } }, async () => app.swagger());
  return app;
}
