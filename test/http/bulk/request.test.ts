import { once } from 'node:events';
import { createServer, request, type Server } from 'node:http';
import { type AddressInfo, connect, type Socket } from 'node:net';
import { Readable } from 'node:stream';
import fastify from 'fastify';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { CoilproofError } from '../../../src/errors.ts';
import { ndjsonAnswers, started } from '../../../src/http/bulk/answers.ts';
import { type BulkLine, isProblem } from '../../../src/http/bulk/bulk-line.ts';
import { csvUnits } from '../../../src/http/bulk/csv.ts';
import { inOrder } from '../../../src/http/bulk/in-order.ts';
import { ndjsonLines } from '../../../src/http/bulk/ndjson.ts';

const worked: number[] = [];
const answer = async (batch: readonly BulkLine[]) => {
  worked.push(...batch.map((item) => item.line));
  return batch.map((item) => ({ line: item.line, ...(isProblem(item) && { code: item.problem.code }) }));
};

/** A service with nothing but the stream in it. */
const app = fastify();
app.removeAllContentTypeParsers();
app.addContentTypeParser(['text/csv', 'application/x-ndjson'], (_request, payload, done) => done(null, payload));
app.post('/', async (incoming, reply) => {
  const read = incoming.headers['content-type'] === 'text/csv' ? csvUnits : ndjsonLines;
  const answers = await started(inOrder(read(incoming.body as Readable), answer, { batchSize: 50, maxWait: 2 }));
  return reply.type('application/x-ndjson').send(ndjsonAnswers(answers));
});
app.setErrorHandler((error, _request, reply) =>
  reply.code(error instanceof CoilproofError ? 422 : 500).send({ detail: (error as Error).message }),
);

let server: Server = createServer();
beforeAll(async () => {
  await app.listen({ port: 0, host: '127.0.0.1' });
  server = app.server;
});
afterAll(async () => {
  await app.close();
});

function post(type: string, body: Iterable<string> | AsyncIterable<string>): Promise<{ status: number; text: string }> {
  return new Promise((resolve, reject) => {
    const { port } = server.address() as AddressInfo;
    const sent = request({ port, host: '127.0.0.1', method: 'POST', headers: { 'content-type': type } });
    sent.on('error', reject);
    sent.on('response', (response) => {
      let text = '';
      response.setEncoding('utf8').on('data', (chunk) => (text += chunk));
      response.on('end', () => resolve({ status: response.statusCode!, text }));
      response.on('error', reject);
    });
    Readable.from(body, { objectMode: false }).pipe(sent);
  });
}

/** What a socket has received so far. */
function textOf(socket: Socket) {
  let text = '';
  socket.setEncoding('utf8').on('data', (data) => (text += data));
  return {
    text: () => text,
    async until(part: string): Promise<void> {
      while (!text.includes(part)) await once(socket, 'data');
    },
  };
}

function* repeated(head: string, line: string, count: number) {
  yield head;
  for (let index = 0; index < count; index++) yield line;
}

describe('over a connection', () => {
  it('answers each line', async () => {
    const { status, text } = await post('application/x-ndjson', repeated('', '{"a":1}\nnot JSON\n', 500));
    expect(status).toBe(200);
    const lines = text
      .trim()
      .split('\n')
      .map((line) => JSON.parse(line) as object);
    expect(lines).toEqual(
      Array.from({ length: 1000 }, (_, index) => ({
        line: index + 1,
        ...(index % 2 === 1 && { code: 'malformed-request' }),
      })),
    );
  });

  it('refuses a body by its header with a status, reads the rest of it and goes on serving the connection', async () => {
    const { port } = server.address() as AddressInfo;
    const socket = connect(port, '127.0.0.1');
    const received = textOf(socket);
    const body = `serial,colour\n${`${'x'.repeat(1000)}\n`.repeat(5000)}`;
    const head = (type: string, length: number) =>
      `POST / HTTP/1.1\r\nhost: coilproof\r\ncontent-type: ${type}\r\ncontent-length: ${length}\r\n\r\n`;
    socket.write(head('text/csv', body.length));
    await new Promise((resolve) => socket.write(body, resolve)); // all of it was taken, though it had been refused
    await received.until('colour');
    expect(received.text()).toMatch(/^HTTP\/1.1 422 /);
    socket.write(`${head('application/x-ndjson', 2)}1\n`);
    await received.until('{"line":1}');
    expect(received.text()).toContain('HTTP/1.1 200 ');
    socket.destroy();
  });

  it('answers a line before the next one is sent', async () => {
    const { port } = server.address() as AddressInfo;
    const sent = request({
      port,
      host: '127.0.0.1',
      method: 'POST',
      headers: { 'content-type': 'application/x-ndjson' },
    });
    sent.write('1\n');
    const response = await new Promise<AsyncIterable<Buffer>>((resolve, reject) =>
      sent.on('response', resolve).on('error', reject),
    );
    const answers = response[Symbol.asyncIterator]();
    expect(String((await answers.next()).value)).toBe('{"line":1}\n');
    sent.write('2\n');
    expect(String((await answers.next()).value)).toBe('{"line":2}\n');
    sent.end();
    expect((await answers.next()).done).toBe(true);
  });

  it('works what arrived whole before the connection was cut, and nothing of the line that was cut', async () => {
    const { port } = server.address() as AddressInfo;
    const socket = connect(port, '127.0.0.1');
    const received = textOf(socket);
    worked.length = 0;
    socket.write(
      'POST / HTTP/1.1\r\nhost: coilproof\r\ncontent-type: application/x-ndjson\r\ncontent-length: 99\r\n\r\n',
    );
    socket.write('1\n2\n');
    await received.until('{"line":2}');
    socket.write('3\n{"cu');
    socket.destroySoon();
    while (worked.length < 3) await new Promise((resolve) => setTimeout(resolve, 5));
    await new Promise((resolve) => setTimeout(resolve, 20));
    expect(worked).toEqual([1, 2, 3]);
    expect((await post('application/x-ndjson', ['1\n'])).status).toBe(200);
  });
});
