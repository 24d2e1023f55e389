import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import type { Registry, RegistryKind, RegistryKinds } from '../../../approval/registry.ts';
import { CoilproofError } from '../../../errors.ts';
import { BODY_PROBLEMS, operation } from '../../operation.ts';
import { ConditionHeaders, preconditionOf, sendTagged } from './conditional.ts';

/** One kind of registered document: where it is, what it holds, and what a write has to satisfy. */
interface Document<K extends RegistryKind, Params extends Record<string, string>, Body> {
  readonly kind: K;
  readonly path: string;
  /** "Material": in operation ids and sentences. */
  readonly name: string;
  readonly params: z.ZodType<Params>;
  readonly idOf: (params: Params) => string;
  readonly body: z.ZodObject & z.ZodType<Body>;
  readonly answer: z.ZodType<unknown, RegistryKinds[K]>;
  readonly toValue: (params: Params, body: Body) => RegistryKinds[K];
  readonly examples: readonly Body[];
  /** Throws where something else that must hold before a write does not. */
  readonly beforePut?: (value: RegistryKinds[K]) => Promise<void>;
  /** Throws where a stored value must not give way to another. */
  readonly mayReplace?: (stored: RegistryKinds[K], value: RegistryKinds[K]) => void;
}

/** PUT and GET of a registered document, with entity tags. */
export function documentRoutes<K extends RegistryKind, Params extends Record<string, string>, Body>(
  app: FastifyInstance,
  registry: Registry,
  d: Document<K, Params, Body>,
): void {
  putDocument(app, registry, d);
  getDocument(app, registry, d);
}

/** PUT of a registered document. */
export function putDocument<K extends RegistryKind, Params extends Record<string, string>, Body>(
  app: FastifyInstance,
  registry: Registry,
  d: Document<K, Params, Body>,
): void {
  const noun = d.name.toLowerCase();
  app.withTypeProvider<ZodTypeProvider>().put(
    d.path,
    {
      schema: {
        ...operation({
          operationId: `put${d.name}`,
          summary: `Register a ${noun}; the same content again changes nothing`,
          tag: 'registry',
          scope: 'administer',
          success: { 200: d.answer, 201: d.answer },
          problems: [...BODY_PROBLEMS, 'invalid-parameter', 'unknown-reference', 'precondition-failed', 'conflict'],
        }),
        params: d.params,
        headers: ConditionHeaders,
        // A schema of its own: of one that is published by name the examples would be lost beside the reference to it.
        body: d.body.extend({}).meta({ examples: d.examples as unknown[] }),
      },
    },
    async (request, reply) => {
      const params = request.params as Params;
      const value = d.toValue(params, request.body as Body);
      await d.beforePut?.(value);
      const { registered, created } = await registry.put(d.kind, d.idOf(params), value, {
        precondition: preconditionOf(request.headers as z.output<typeof ConditionHeaders>),
        mayReplace: (stored) => d.mayReplace?.(stored, value),
      });
      if (created) reply.code(201).header('location', request.url.split('?', 1)[0] ?? request.url);
      return sendTagged(reply, registered, registered.value as never);
    },
  );
}

function getDocument<K extends RegistryKind, Params extends Record<string, string>, Body>(
  app: FastifyInstance,
  registry: Registry,
  d: Document<K, Params, Body>,
): void {
  const noun = d.name.toLowerCase();
  app.withTypeProvider<ZodTypeProvider>().get(
    d.path,
    {
      schema: {
        ...operation({
          operationId: `get${d.name}`,
          summary: `A registered ${noun}`,
          tag: 'registry',
          scope: 'read',
          success: { 200: d.answer, 304: z.undefined().meta({ description: 'the caller holds this content already' }) },
          problems: ['not-found', 'invalid-parameter', 'overloaded', 'internal'],
        }),
        params: d.params,
        headers: ConditionHeaders,
      },
    },
    async (request, reply) => {
      const params = request.params as Params;
      const registered = await registry.get(d.kind, d.idOf(params));
      if (!registered)
        throw new CoilproofError('not-found', `No ${noun} ${Object.values(params).join(' ')} is registered here.`);
      return sendTagged(
        reply,
        registered,
        registered.value as never,
        request.headers as z.output<typeof ConditionHeaders>,
      );
    },
  );
}
