import { CoilproofError } from '../../errors.ts';
import { bodyChunks } from './body-chunks.ts';
import { BULK_LIMITS, type BulkLimits, type BulkLine } from './bulk-line.ts';
import { LineSplitter, type TextLine } from './line-splitter.ts';

/**
 * One JSON value a line, in order, each parsed when it is asked for. A line that is not UTF-8, not JSON or longer than
 * `limits.lineBytes` is a problem on that line; blank lines are left out. Keeps one line and one chunk of the body, no more.
 * Throws what reading the body throws.
 */
export async function* ndjsonLines(
  source: AsyncIterable<Uint8Array>,
  limits: Pick<BulkLimits, 'lineBytes'> = BULK_LIMITS,
): AsyncGenerator<BulkLine> {
  const lines = new LineSplitter(limits.lineBytes);
  for await (const chunk of bodyChunks(source)) {
    for (const line of lines.split(chunk)) yield parsed(line);
  }
  for (const line of lines.end()) yield parsed(line);
}

function parsed(item: TextLine): BulkLine {
  if ('problem' in item) return item;
  const { line, text, bytes } = item;
  try {
    return { line, value: JSON.parse(text), bytes };
  } catch (error) {
    const detail = `Line ${line} is not JSON: ${(error as Error).message}.`;
    return { line, problem: new CoilproofError('malformed-request', detail), bytes };
  }
}
