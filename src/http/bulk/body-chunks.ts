import { Readable } from 'node:stream';

/**
 * The chunks of a request's body. Leaving a loop over a request early destroys it, and with it the connection that the answer would
 * have gone out on; here what is left of the body is read and dropped instead.
 */
export async function* bodyChunks(source: AsyncIterable<Uint8Array>): AsyncGenerator<Buffer> {
  if (!(source instanceof Readable)) {
    for await (const chunk of source) yield asBuffer(chunk);
    return;
  }
  try {
    for await (const chunk of source.iterator({ destroyOnReturn: false })) yield asBuffer(chunk);
  } finally {
    source.resume();
  }
}

const asBuffer = (chunk: Uint8Array): Buffer =>
  Buffer.isBuffer(chunk) ? chunk : Buffer.from(chunk.buffer, chunk.byteOffset, chunk.byteLength);
