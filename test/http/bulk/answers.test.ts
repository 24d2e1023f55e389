import { setTimeout as wait } from 'node:timers/promises';
import { describe, expect, it } from 'vitest';
import { ndjsonAnswers, started } from '../../../src/http/bulk/answers.ts';
import { all } from './support.ts';

async function* answersUpTo(count: number, onTaken: () => void = () => {}) {
  for (let index = 0; index < count; index++) {
    onTaken();
    yield { index, text: 'line\nbreak µ' };
  }
}

describe('answers', () => {
  it('are one JSON a line, in order', async () => {
    const text = Buffer.concat(await all<Buffer>(ndjsonAnswers(answersUpTo(3)))).toString();
    expect(text).toMatch(/^[^\n]*\n[^\n]*\n[^\n]*\n$/);
    expect(
      text
        .trim()
        .split('\n')
        .map((line) => JSON.parse(line)),
    ).toEqual(await all(answersUpTo(3)));
  });

  it('are none for none, and come from anything that can be gone through', async () => {
    expect(await all(ndjsonAnswers([]))).toEqual([]);
    expect(String(await all(ndjsonAnswers([{ a: 1 }])))).toBe('{"a":1}\n');
  });

  it('are taken from the source only as they are read', async () => {
    let taken = 0;
    const stream = ndjsonAnswers(answersUpTo(100_000, () => taken++));
    await wait(5);
    expect(taken).toBe(0);
    const reader = stream[Symbol.asyncIterator]();
    await reader.next();
    await wait(20);
    expect(taken).toBeLessThan(1000); // 16 KiB of lines of 38 bytes is 432
    stream.destroy();
  });

  it('stop the source when the reader leaves', async () => {
    let closed = false;
    const source = (async function* () {
      try {
        yield* answersUpTo(100_000);
      } finally {
        closed = true;
      }
    })();
    for await (const _ of ndjsonAnswers(source)) break;
    await wait(5);
    expect(closed).toBe(true);
  });

  it('break off where the source fails', async () => {
    const failing = (async function* () {
      yield* answersUpTo(2);
      throw new Error('disk full');
    })();
    await expect(all(ndjsonAnswers(failing))).rejects.toThrow('disk full');
  });
});

describe('items that have started', () => {
  it('are the same items', async () => {
    expect(await all(await started(answersUpTo(3)))).toEqual(await all(answersUpTo(3)));
    expect(await all(await started(answersUpTo(0)))).toEqual([]);
  });

  it('fail before they are handed over where the first does', async () => {
    const failing = (async function* (): AsyncGenerator<object> {
      yield* [];
      throw new Error('no header');
    })();
    await expect(started(failing)).rejects.toThrow('no header');
  });

  it('close their source, also when none was taken', async () => {
    let closed = false;
    const source = (async function* () {
      try {
        yield* answersUpTo(10);
      } finally {
        closed = true;
      }
    })();
    const items = await started(source);
    await items.return!();
    expect(closed).toBe(true);
    expect(await items.next()).toEqual({ done: true, value: undefined });
  });
});
