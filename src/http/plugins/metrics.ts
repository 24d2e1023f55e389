import type { FastifyInstance } from 'fastify';
import { collectDefaultMetrics, Histogram, Registry } from 'prom-client';

/** Request durations by route pattern, method and status, and the process's own figures, as Prometheus text at /metrics. */
export function metrics(app: FastifyInstance): void {
  const registry = new Registry();
  collectDefaultMetrics({ register: registry });
  const duration = new Histogram({
    name: 'http_request_duration_seconds',
    help: 'Time from the first byte of a request to the last of its answer',
    labelNames: ['method', 'route', 'status'],
    buckets: [0.001, 0.003, 0.01, 0.03, 0.1, 0.3, 1, 3, 10],
    registers: [registry],
  });
  app.addHook('onResponse', async (request, reply) => {
    const route = request.routeOptions.url ?? 'unmatched';
    duration.observe({ method: request.method, route, status: reply.statusCode }, reply.elapsedTime / 1000);
  });
  app.get('/metrics', { schema: { hide: true } }, async (_request, reply) => {
    return reply.type(registry.contentType).send(await registry.metrics());
  });
}
