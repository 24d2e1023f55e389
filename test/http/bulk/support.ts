import { setFlagsFromString } from 'node:v8';
import { runInNewContext } from 'node:vm';
import { type BulkLine, isProblem } from '../../../src/http/bulk/bulk-line.ts';

/** A body in chunks of so many bytes; `taken` counts those that were asked for. */
export function chunked(body: string | Uint8Array, size = Number.POSITIVE_INFINITY) {
  const bytes = Buffer.from(body as Uint8Array);
  const state = { taken: 0 };
  async function* chunks(): AsyncGenerator<Buffer> {
    for (let start = 0; start < bytes.length; start += size) {
      state.taken++;
      yield Buffer.from(bytes.subarray(start, start + size)); // a copy, so that nothing of the test keeps it alive
    }
  }
  return Object.assign(chunks(), { state });
}

export async function all<T>(source: AsyncIterable<T>): Promise<T[]> {
  const items: T[] = [];
  for await (const item of source) items.push(item);
  return items;
}

/** A line reduced to what tests compare: its number with the value, or with the code and detail of its problem. */
export const plain = (item: BulkLine) =>
  isProblem(item)
    ? { line: item.line, code: item.problem.code, detail: item.problem.message }
    : { line: item.line, value: item.value };

setFlagsFromString('--expose-gc');
const collectGarbage = runInNewContext('gc') as () => void;

/** Bytes that are alive, inside the heap and in buffers outside it. */
export function bytesAlive(): number {
  collectGarbage();
  const { heapUsed, external } = process.memoryUsage();
  return heapUsed + external;
}
