import { createHash } from 'node:crypto';
import canonicalize from 'canonicalize';

/** SHA-256 digests, in hexadecimal, over the canonical JSON (RFC 8785) of what they name. */
export interface Digests {
  /** of the request: part, duty and evidence as they were sent */
  readonly input: string;
  /** of the whole record but this field itself */
  readonly record: string;
  /** the record digest of the approval recorded before this one; null for the first */
  readonly previous: string | null;
}

/** SHA-256 of the canonical JSON (RFC 8785) of `value`, in hexadecimal. The same value digests the same whatever its key order. */
export function digestOf(value: unknown): string {
  const text = canonicalize(value);
  if (text === undefined) throw new TypeError('only JSON values have a digest');
  return createHash('sha256').update(text, 'utf8').digest('hex');
}

/**
 * Seals a record: chains it to the one before and adds its own digest, so that a change of any recorded approval, or its
 * removal, shows in every later one.
 */
export function seal<Content extends object>(
  request: unknown,
  content: Content,
  previous: string | null,
): Content & { readonly digests: Digests } {
  const input = digestOf(request);
  const record = digestOf({ ...content, digests: { input, previous } });
  return { ...content, digests: { input, record, previous } };
}

/** Whether a sealed record still is what was sealed. */
export function isIntact<Sealed extends { readonly digests: Digests }>({ digests, ...content }: Sealed): boolean {
  return digestOf({ ...content, digests: { input: digests.input, previous: digests.previous } }) === digests.record;
}
