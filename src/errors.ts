/**
 * Everything that can go wrong, once: a stable code, a title and what it means. http gives each a status (http/problems.ts);
 * the published OpenAPI and the tests are compared with this list.
 */
export const ERROR_CATALOGUE = {
  'malformed-request': {
    title: 'The request cannot be parsed',
    meaning: 'The body is not the JSON (or other declared media type) that it says it is, or is missing.',
  },
  'invalid-parameter': {
    title: 'A path, query or header parameter is not usable',
    meaning: 'A parameter outside the body is misspelt, out of range or malformed; detail names it.',
  },
  'invalid-body': {
    title: 'The body does not fit the schema',
    meaning: 'A field is missing, unknown, of the wrong type or out of range. errors names each by pointer.',
  },
  'unusable-quantity': {
    title: 'A quantity cannot exist or cannot be computed with',
    meaning:
      'The body fits the schema but its numbers contradict each other or lie outside a model. errors names the field.',
  },
  'number-range': {
    title: 'The answer is outside the range of numbers',
    meaning: 'The inputs are so extreme that a result over- or underflows what a 64-bit float can hold.',
  },
  'unknown-reference': {
    title: 'Something that the body refers to is not stored here',
    meaning: 'An id of a material, part, rig or lot in the body leads nowhere. errors names the field.',
  },
  'not-found': { title: 'There is nothing here', meaning: 'No such path, or no stored object with this id.' },
  'method-not-allowed': {
    title: 'The path exists but not with this method',
    meaning: 'The Allow header lists the methods that it answers.',
  },
  conflict: {
    title: 'This contradicts what is stored',
    meaning: 'What the request would store is there already with a different content.',
  },
  'precondition-failed': {
    title: 'The precondition of the request does not hold',
    meaning: 'If-Match or If-None-Match does not fit what is stored; read it again and decide anew.',
  },
  'idempotency-conflict': {
    title: 'This Idempotency-Key was used for a different request',
    meaning: 'A key names one request body; send a new key for a new body.',
  },
  'too-large': { title: 'The body is too large', meaning: 'The body exceeds the configured limit in bytes.' },
  'unsupported-media-type': {
    title: 'The media type is not one that this path reads',
    meaning: 'Send application/json, or what the OpenAPI lists for the operation.',
  },
  'request-timeout': {
    title: 'The request took too long to arrive or to answer',
    meaning: 'Send it again; if it repeats, split it.',
  },
  overloaded: { title: 'The service is overloaded', meaning: 'Wait as long as Retry-After says and send it again.' },
  'not-ready': {
    title: 'The service is not ready',
    meaning: 'The store does not answer, or the service is shutting down. Retry-After says when to try again.',
  },
  internal: {
    title: 'The service failed',
    meaning: 'A fault of the service, not of the request. The log holds the cause under the request id in instance.',
  },
} as const;

export type ErrorCode = keyof typeof ERROR_CATALOGUE;

/** One offending place in the body: an RFC 6901 pointer and what is wrong there. */
export interface FieldError {
  readonly pointer: string;
  readonly detail: string;
}

/** An error of the catalogue, with what is particular to this occurrence. */
export class CoilproofError extends Error {
  readonly code: ErrorCode;
  readonly fields: readonly FieldError[];

  constructor(code: ErrorCode, detail: string, fields: readonly FieldError[] = [], options?: ErrorOptions) {
    super(detail, options);
    this.name = 'CoilproofError';
    this.code = code;
    this.fields = fields;
  }
}
