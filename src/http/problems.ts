import type { FastifyError, FastifyReply, FastifyRequest } from 'fastify';
import { hasZodFastifySchemaValidationErrors } from 'fastify-type-provider-zod';
import { z } from 'zod';
import { CoilproofError, ERROR_CATALOGUE, type ErrorCode } from '../errors.ts';
import { InvalidQuantity } from '../physics/invalid-quantity.ts';
import { fieldErrors, type SchemaIssue, summarise } from './schema-issues.ts';

/** RFC 9457 problem details, the one body of every error. */
export const Problem = z
  .object({
    type: z.string().meta({ description: 'urn:coilproof:problem:<code>, a stable code' }),
    title: z.string(),
    status: z.int(),
    detail: z.string(),
    instance: z
      .string()
      .meta({ description: 'urn:coilproof:request:<id>, the id under which the log has this request' }),
    errors: z
      .array(z.object({ pointer: z.string(), detail: z.string() }))
      .exactOptional()
      .meta({ description: 'the offending fields, each by RFC 6901 pointer into the body' }),
  })
  .meta({ id: 'Problem' });

export const STATUS: Record<ErrorCode, number> = {
  'malformed-request': 400,
  'invalid-parameter': 400,
  'invalid-body': 422,
  'unusable-quantity': 422,
  'number-range': 422,
  'unknown-reference': 422,
  'not-found': 404,
  'method-not-allowed': 405,
  conflict: 409,
  'precondition-failed': 412,
  'idempotency-conflict': 409,
  'too-large': 413,
  'unsupported-media-type': 415,
  'request-timeout': 408,
  overloaded: 503,
  'not-ready': 503,
  internal: 500,
};

/** Fastify's own errors that a client can cause, by their code. */
const FROM_FASTIFY: Record<string, ErrorCode> = {
  FST_ERR_CTP_BODY_TOO_LARGE: 'too-large',
  FST_ERR_CTP_INVALID_MEDIA_TYPE: 'unsupported-media-type',
  FST_ERR_CTP_INVALID_CONTENT_LENGTH: 'malformed-request',
  FST_ERR_CTP_EMPTY_JSON_BODY: 'malformed-request',
  FST_ERR_CTP_INVALID_JSON_BODY: 'malformed-request',
  FST_ERR_BAD_URL: 'invalid-parameter',
  FST_ERR_MAX_PARAM_LENGTH: 'invalid-parameter',
  FST_ERR_ASYNC_CONSTRAINT: 'invalid-parameter',
  FST_UNDER_PRESSURE: 'overloaded',
  FST_ERR_HANDLER_TIMEOUT: 'request-timeout',
};

/** What the error means in the catalogue's terms; anything unknown is `internal` and keeps its cause for the log. */
export function toCoilproofError(error: unknown, request: FastifyRequest): CoilproofError {
  if (error instanceof CoilproofError) return error;
  if (error instanceof InvalidQuantity) {
    return new CoilproofError('unusable-quantity', error.detail, [{ pointer: error.pointer, detail: error.detail }]);
  }
  if (hasZodFastifySchemaValidationErrors(error)) return fromValidation(error, request);
  const { code, statusCode, message } = error as Partial<FastifyError>;
  const known = code === undefined ? undefined : FROM_FASTIFY[code];
  if (known) return new CoilproofError(known, message ?? ERROR_CATALOGUE[known].meaning);
  if (statusCode !== undefined && statusCode >= 400 && statusCode < 500) {
    return new CoilproofError('malformed-request', message ?? ERROR_CATALOGUE['malformed-request'].meaning);
  }
  return new CoilproofError('internal', ERROR_CATALOGUE.internal.meaning, [], { cause: error });
}

function fromValidation(
  error: FastifyError & { validation: unknown[]; validationContext?: string },
  request: FastifyRequest,
): CoilproofError {
  const issues = (error.validation as { instancePath: string; keyword: string; message: string; params: object }[]).map(
    (entry) =>
      ({
        ...entry.params,
        code: entry.keyword,
        message: entry.message,
        path: pathOf(entry.instancePath),
      }) as SchemaIssue,
  );
  if (error.validationContext !== undefined && error.validationContext !== 'body') {
    const detail = issues
      .map((issue) => `${issue.path.join('.') || error.validationContext}: ${issue.message}`)
      .join('; ');
    return new CoilproofError('invalid-parameter', detail);
  }
  if (request.body === undefined || request.body === null) {
    return new CoilproofError('malformed-request', 'A JSON body is required.');
  }
  const fields = fieldErrors(issues, request.body);
  return new CoilproofError('invalid-body', summarise(fields), fields);
}

const pathOf = (instancePath: string): string[] => (instancePath === '/' ? [] : instancePath.slice(1).split('/'));

/** The one way an error leaves the service. */
export function sendProblem(error: unknown, request: FastifyRequest, reply: FastifyReply): FastifyReply {
  const problem = toCoilproofError(error, request);
  const status = STATUS[problem.code];
  if (status >= 500 && problem.code === 'internal')
    request.log.error({ err: problem.cause ?? problem }, 'request failed');
  else request.log.info({ code: problem.code, detail: problem.message }, 'request refused');
  if (status === 503) reply.header('retry-after', '5');
  return reply
    .code(status)
    .type('application/problem+json')
    .serializer((body: unknown) => JSON.stringify(body))
    .send(problemBody(problem, request.id));
}

/** An error as problem details. */
export const problemBody = (problem: CoilproofError, requestId: string): z.input<typeof Problem> => ({
  type: `urn:coilproof:problem:${problem.code}`,
  title: ERROR_CATALOGUE[problem.code].title,
  status: STATUS[problem.code],
  detail: problem.message,
  instance: `urn:coilproof:request:${requestId}`,
  ...(problem.fields.length > 0 && { errors: [...problem.fields] }),
});
