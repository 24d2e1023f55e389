import type { FastifyInstance } from 'fastify';
import { CoilproofError } from '../../errors.ts';
import { sendProblem } from '../problems.ts';

/** Answers what no route matches: 405 with Allow where the path is known under another method, else 404. Before the routes. */
export function unmatched(app: FastifyInstance): void {
  const methodsByPattern = new Map<string, Set<string>>();
  app.addHook('onRoute', ({ url, method }) => {
    const methods = methodsByPattern.get(url) ?? new Set();
    for (const one of [method].flat()) methods.add(one);
    methodsByPattern.set(url, methods);
  });
  app.setNotFoundHandler((request, reply) => {
    const path = request.url.split('?', 1)[0] ?? request.url;
    const allowed = [...methodsByPattern]
      .filter(([pattern]) => matches(pattern, path))
      .flatMap(([, methods]) => [...methods]);
    if (allowed.length === 0)
      return sendProblem(new CoilproofError('not-found', `There is nothing at ${path}.`), request, reply);
    const listed = [...new Set(allowed)]
      .filter((method) => method !== 'HEAD')
      .sort()
      .join(', ');
    reply.header('allow', listed);
    return sendProblem(new CoilproofError('method-not-allowed', `${path} answers ${listed}.`), request, reply);
  });
}

/** Whether a path is one of a route pattern's: segment by segment, `:name` matching any one segment. */
function matches(pattern: string, path: string): boolean {
  const parts = pattern.split('/');
  const segments = path.split('/');
  return (
    parts.length === segments.length && parts.every((part, index) => part.startsWith(':') || part === segments[index])
  );
}
