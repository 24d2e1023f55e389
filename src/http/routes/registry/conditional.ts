import type { FastifyReply } from 'fastify';
import { z } from 'zod';
import type { Precondition, Registered } from '../../../approval/registry.ts';
import { CoilproofError } from '../../../errors.ts';

/** Conditional request headers (RFC 9110, 13.1). */
export const ConditionHeaders = z.object({
  'if-match': z
    .string()
    .max(2000)
    .exactOptional()
    .meta({ description: 'write only where what is stored has one of these tags, or * for any' }),
  'if-none-match': z
    .string()
    .max(2000)
    .exactOptional()
    .meta({ description: 'PUT: * to write only where nothing is stored; GET: tags already held' }),
});

type Conditions = z.output<typeof ConditionHeaders>;

const TAGS = /^\s*(W\/)?"[^"]*"(\s*,\s*(W\/)?"[^"]*")*\s*$/;
const tagsIn = (header: string): string[] => [...header.matchAll(/"([^"]*)"/g)].map(([, tag]) => tag!);

/** The precondition of a write. */
export function preconditionOf({ 'if-match': ifMatch, 'if-none-match': ifNoneMatch }: Conditions): Precondition {
  if (ifNoneMatch !== undefined && ifNoneMatch.trim() !== '*') {
    throw new CoilproofError('invalid-parameter', 'if-none-match: a write takes * alone');
  }
  if (ifMatch !== undefined && ifMatch.trim() !== '*' && !TAGS.test(ifMatch)) {
    throw new CoilproofError('invalid-parameter', 'if-match: a list of quoted tags, or *');
  }
  return {
    ...(ifMatch !== undefined && { ifMatch: ifMatch.trim() === '*' ? ('*' as const) : tagsIn(ifMatch) }),
    ...(ifNoneMatch !== undefined && { ifNoneMatch: '*' as const }),
  };
}

/** Answers with the tag, and with 304 where the caller holds this content already. */
export function sendTagged<T>(reply: FastifyReply, { tag }: Registered<unknown>, body: T, conditions: Conditions = {}) {
  reply.header('etag', `"${tag}"`);
  const held = conditions['if-none-match'];
  if (held !== undefined && (held.trim() === '*' || tagsIn(held).includes(tag))) return reply.code(304).send();
  return reply.send(body);
}
