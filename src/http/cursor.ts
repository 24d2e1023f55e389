import { CoilproofError } from '../errors.ts';

/** A list's position as an opaque text, so that callers cannot come to depend on what it holds. */
export const packCursor = (position: number): string => Buffer.from(`p${position}`).toString('base64url');

/** The position that `packCursor` packed; anything else is refused. */
export function unpackCursor(cursor: string): number {
  const match = /^p(\d{1,15})$/.exec(Buffer.from(cursor, 'base64url').toString('latin1'));
  if (!match || packCursor(Number(match[1])) !== cursor) {
    throw new CoilproofError('invalid-parameter', 'after: not a cursor that this service gave out');
  }
  return Number(match[1]);
}
