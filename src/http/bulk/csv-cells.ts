import { CsvError, parse } from 'csv-parse/sync';

const PLAIN_OR_QUOTED = /^(?:[^"]*|"[^"]*")$/;

/**
 * The cells of one row, spaces around them dropped. Throws csv-parse's `CsvError` where quotes are not as they must be (RFC 4180).
 *
 * Rows in which each piece between separators is free of quotes, or wrapped in one pair of them, are cut here: there the quoting
 * rules say the same, and such rows are nearly all there are. The library takes the others.
 */
export function csvCells(row: string, separator: string): string[] {
  const pieces = row.split(separator);
  if (!row.includes('"')) return pieces.map((piece) => piece.trim());
  if (pieces.every((piece) => PLAIN_OR_QUOTED.test(piece))) return pieces.map((piece) => unwrapped(piece).trim());
  const [cells = []] = parse(row, {
    delimiter: separator,
    // one row is one record: a line feed in it can only stand in a quoted cell, a carriage return is text
    record_delimiter: '\n',
    relax_column_count: true,
    trim: true,
  });
  return cells.map((cell) => cell.trim());
}

const unwrapped = (piece: string): string => (piece.startsWith('"') ? piece.slice(1, -1) : piece);

export const isUnclosedQuote = (error: unknown): boolean =>
  error instanceof CsvError && error.code === 'CSV_QUOTE_NOT_CLOSED';

/** What is wrong with the quotes of a row, without the library's own line number, which is that within the row. */
export function quoteMistake(error: unknown): string {
  if (!(error instanceof CsvError)) throw error;
  if (error.code === 'CSV_QUOTE_NOT_CLOSED') return 'a quoted cell is not closed on its line';
  if (error.code === 'INVALID_OPENING_QUOTE') return 'a quote inside a cell that is not quoted';
  return 'text between a closing quote and the separator';
}
