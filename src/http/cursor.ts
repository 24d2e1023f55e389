import { CoilproofError } from '../errors.ts';

/** A list's position (a key of what was last shown) as an opaque text, so that callers cannot come to depend on what it holds. */
export const packCursor = (key: string): string => Buffer.from(`k${key}`).toString('base64url');

/** The key that `packCursor` packed; anything else is refused. */
export function unpackCursor(cursor: string): string {
  const text = Buffer.from(cursor, 'base64url').toString('utf8');
  if (!text.startsWith('k') || packCursor(text.slice(1)) !== cursor) {
    throw new CoilproofError('invalid-parameter', 'after: not a cursor that this service gave out');
  }
  return text.slice(1);
}

/** The same, of a list that is kept in the order of a number. */
export function unpackPosition(cursor: string): number {
  const key = unpackCursor(cursor);
  if (!/^\d{1,15}$/.test(key)) throw new CoilproofError('invalid-parameter', 'after: not a cursor of this list');
  return Number(key);
}
