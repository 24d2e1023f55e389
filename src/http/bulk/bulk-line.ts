import { CoilproofError, type FieldError } from '../../errors.ts';

/** What a body that is read as a stream holds at a line: a value that no schema has seen yet, or why there is none. */
export type BulkLine = BulkValue | BulkProblem;

export interface BulkValue {
  /** counted from 1, as an editor shows it; of several rows the first */
  readonly line: number;
  readonly value: unknown;
  /** what it took of the body, line ends apart */
  readonly bytes: number;
  /** Where in the body the field at an RFC 6901 pointer into `value` stands, if that is not plain from the pointer. */
  readonly place?: (pointer: string) => string | undefined;
}

export interface BulkProblem {
  readonly line: number;
  readonly problem: CoilproofError;
  readonly bytes: number;
  /** of the unit, where that could be read */
  readonly serial?: string;
}

export interface BulkLimits {
  /** of one line, its end apart */
  readonly lineBytes: number;
  /** of one unit */
  readonly readings: number;
}

export const BULK_LIMITS: BulkLimits = { lineBytes: 1024 * 1024, readings: 10_000 };

export const isProblem = (item: BulkLine): item is BulkProblem => 'problem' in item;

/** The same error, each of its fields with the place in the body where its value stands. */
export function inPlace({ place }: BulkValue, error: CoilproofError): CoilproofError {
  if (!place || error.fields.length === 0) return error;
  const fields = error.fields.map(({ pointer, detail }) => {
    const where = place(pointer);
    return { pointer, detail: where === undefined ? detail : `${where}: ${detail}` };
  });
  return new CoilproofError(error.code, summary(fields), fields, { cause: error });
}

/** The details of the first few fields in one sentence. */
export const summary = (fields: readonly FieldError[], count = fields.length): string =>
  fields
    .slice(0, 3)
    .map(({ detail }) => detail)
    .join('; ') + (count > 3 ? `; and ${count - 3} more` : '');
