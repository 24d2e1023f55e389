import { Readable } from 'node:stream';

/** Bytes that are written ahead of a reader who does not take them. */
const READ_AHEAD = 16 * 1024;

/**
 * One JSON answer a line, in order. `answers` is read only as the lines are taken: a slow reader holds up the source and not the memory.
 * An error that `answers` throws destroys the stream, so that the reader sees the body cut short.
 */
export const ndjsonAnswers = (answers: AsyncIterable<object> | Iterable<object>): Readable =>
  Readable.from(jsonLines(answers), { objectMode: false, highWaterMark: READ_AHEAD });

async function* jsonLines(answers: AsyncIterable<object> | Iterable<object>): AsyncGenerator<string> {
  for await (const answer of answers) yield `${JSON.stringify(answer)}\n`;
}

/**
 * The same items once the first is there: what fails before it (a header that does not fit, a store that does not answer) fails here,
 * while the reply has not begun and can still be a problem with a status of its own.
 */
export async function started<T>(items: AsyncIterable<T>): Promise<AsyncIterableIterator<T>> {
  const iterator = items[Symbol.asyncIterator]();
  let first: IteratorResult<T> | undefined = await iterator.next();
  const remaining: AsyncIterableIterator<T> = {
    async next() {
      const next = first ?? (await iterator.next());
      first = undefined;
      return next;
    },
    async return() {
      first = undefined;
      await iterator.return?.();
      return { done: true, value: undefined };
    },
    [Symbol.asyncIterator]() {
      return remaining;
    },
  };
  return remaining;
}
