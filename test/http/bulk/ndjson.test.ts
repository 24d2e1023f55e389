import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ndjsonLines } from '../../../src/http/bulk/ndjson.ts';
import { all, chunked, plain } from './support.ts';

const read = async (body: string | Uint8Array, size?: number, lineBytes = 1000) =>
  (await all(ndjsonLines(chunked(body, size), { lineBytes }))).map(plain);

const MIXED = Buffer.concat([
  Buffer.from('\uFEFF{"serial":"Spule µ 𝛺 1"}\r\n\r\n  \n[1,2]\n{"broken":\n'),
  Buffer.from([0x22, 0xce, 0x22, 0x0a]), // half of an omega
  Buffer.from(`"${'x'.repeat(40)}"\n`),
  Buffer.from('null\n7'),
]);
const OF_MIXED = [
  { line: 1, value: { serial: 'Spule µ 𝛺 1' } },
  { line: 4, value: [1, 2] },
  { line: 5, code: 'malformed-request', detail: expect.stringMatching(/^Line 5 is not JSON: /) },
  { line: 6, code: 'malformed-request', detail: 'Line 6 is not valid UTF-8.' },
  { line: 7, code: 'too-large', detail: 'Line 7 is longer than 40 bytes.' },
  { line: 8, value: null },
  { line: 9, value: 7 },
];

describe('lines of JSON', () => {
  it.each(Array.from({ length: MIXED.length }, (_, size) => size + 1))(
    'are the same however the body is cut: chunks of %i bytes',
    async (size) => {
      expect(await read(MIXED, size, 40)).toEqual(OF_MIXED);
    },
  );

  it('are the same for a body in two chunks, cut at any byte', async () => {
    for (let cut = 0; cut <= MIXED.length; cut++) {
      const halves = (async function* () {
        yield MIXED.subarray(0, cut);
        yield MIXED.subarray(cut);
      })();
      expect((await all(ndjsonLines(halves, { lineBytes: 40 }))).map(plain)).toEqual(OF_MIXED);
    }
  });

  it('come back as they were written, whatever they hold', async () => {
    const values = fc.array(fc.jsonValue(), { maxLength: 20 });
    await fc.assert(
      fc.asyncProperty(
        values,
        fc.integer({ min: 1, max: 50 }),
        fc.constantFrom('\n', '\r\n'),
        async (written, size, end) => {
          const lines = await read(written.map((value) => JSON.stringify(value) + end).join(''), size, 1e6);
          expect(JSON.stringify(lines)).toBe(
            JSON.stringify(written.map((value, index) => ({ line: index + 1, value }))),
          );
        },
      ),
      { seed: 1, numRuns: 200 },
    );
  });

  it('may be as long as the limit and no longer, line ends and byte order mark apart', async () => {
    const value = 'ä'.repeat(19); // 40 bytes with its quotes
    for (const size of [1, 7, 1000]) {
      expect(await read(`\uFEFF"${value}"\r\n"${value}"\r\n"${value}"`, size, 40)).toEqual(
        [1, 2, 3].map((line) => ({ line, value })),
      );
      expect(await read(`\uFEFF"${value}"\r\n"${value}"\r\n1`, size, 39)).toMatchObject([
        { line: 1, code: 'too-large' },
        { line: 2, code: 'too-large' },
        { line: 3, value: 1 },
      ]);
    }
  });

  it.each(['', '\n', '\r\n\r\n', '\uFEFF', '\uFEFF\r\n  '])('are none in %j', async (body) => {
    expect(await read(body)).toEqual([]);
  });

  it('in UTF-16 are refused by that name', async () => {
    const [first] = await read(Buffer.from('\uFEFF{"serial":"1"}\n', 'utf16le'));
    expect(first).toEqual({ line: 1, code: 'malformed-request', detail: expect.stringContaining('UTF-16') });
  });

  it('hold up to nesting that a recursive reader would not', async () => {
    const depth = 100_000;
    const lines = await read(`${'['.repeat(depth)}${']'.repeat(depth)}\n1\n`, 65_536, 1e6);
    expect(lines.at(-1)).toEqual({ line: 2, value: 1 });
  });

  it('are read only as they are taken', async () => {
    const source = chunked('1\n'.repeat(1000), 100);
    const lines = ndjsonLines(source);
    for (let line = 0; line < 60; line++) await lines.next();
    expect(source.state.taken).toBe(2);
  });

  it('pass on what reading the body throws', async () => {
    const cut = (async function* () {
      yield Buffer.from('1\n2');
      throw new Error('aborted');
    })();
    const lines = ndjsonLines(cut);
    expect((await lines.next()).value).toMatchObject({ line: 1, value: 1 });
    await expect(lines.next()).rejects.toThrow('aborted');
  });
});
