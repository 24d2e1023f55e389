import { setTimeout as wait } from 'node:timers/promises';
import { describe, expect, it } from 'vitest';
import { inOrder } from '../../../src/http/bulk/in-order.ts';
import { all } from './support.ts';

async function* upTo(count: number, onTaken: (item: number) => void = () => {}): AsyncGenerator<number> {
  for (let item = 0; item < count; item++) {
    onTaken(item);
    yield item;
  }
}

/** Squares, and remembers how many came together. */
function squaring() {
  const batches: number[] = [];
  const work = async (batch: readonly number[]) => {
    batches.push(batch.length);
    await wait(batch[0]! % 3);
    return batch.map((item) => item * item);
  };
  return { batches, work };
}

const LIMITS = { batchSize: 10, maxWait: 1000 };

describe('work in batches', () => {
  it('answers in the order of the items', async () => {
    const { batches, work } = squaring();
    expect(await all(inOrder(upTo(105), work, LIMITS))).toEqual(Array.from({ length: 105 }, (_, item) => item * item));
    expect(batches).toEqual([...Array.from({ length: 10 }, () => 10), 5]);
  });

  it('answers nothing for nothing', async () => {
    const { batches, work } = squaring();
    expect(await all(inOrder(upTo(0), work, LIMITS))).toEqual([]);
    expect(batches).toEqual([]);
  });

  it('does not wait for a full batch', async () => {
    const { work } = squaring();
    let send: (item: number) => void = () => {};
    const sentOneByOne = (async function* () {
      for (;;) yield await new Promise<number>((resolve) => (send = resolve));
    })();
    const answers = inOrder(sentOneByOne, work, { batchSize: 10, maxWait: 5 });
    for (const item of [3, 4, 5]) {
      const answer = answers.next();
      await wait(1);
      send(item); // the next one is sent only after the answer, as a rig does that waits for it
      expect((await answer).value).toBe(item * item);
    }
  });

  it('loses nothing that arrives while the time of a batch runs out', async () => {
    const { batches, work } = squaring();
    const slow = (async function* () {
      for (let item = 0; item < 30; item++) {
        await wait(item % 7);
        yield item;
      }
    })();
    expect(await all(inOrder(slow, work, { batchSize: 4, maxWait: 3 }))).toEqual(
      Array.from({ length: 30 }, (_, item) => item * item),
    );
    expect(batches.length).toBeGreaterThan(8);
  });

  it('reads two batches ahead of a reader who stops, and no more', async () => {
    const { work } = squaring();
    let taken = 0;
    const answers = inOrder(
      upTo(1000, () => taken++),
      work,
      LIMITS,
    );
    await answers.next();
    await wait(20);
    expect(taken).toBe(20);
    for (let answer = 1; answer < 15; answer++) await answers.next();
    await wait(20);
    expect(taken).toBe(30);
  });

  it('reads nothing before it is asked', async () => {
    let taken = 0;
    inOrder(
      upTo(1000, () => taken++),
      squaring().work,
      LIMITS,
    );
    await wait(5);
    expect(taken).toBe(0);
  });

  it('is full by weight as well', async () => {
    const { batches, work } = squaring();
    await all(inOrder(upTo(12), work, { ...LIMITS, maxWeight: 12, weightOf: (item) => item }));
    expect(batches).toEqual([6, 2, 2, 2]); // 0…5 weigh 15, 6 and 7 13, 8 and 9 17, 10 and 11 21
  });

  it('answers all that came before the source failed, and then fails', async () => {
    const { work } = squaring();
    const failing = (async function* () {
      yield* upTo(13);
      throw new Error('aborted');
    })();
    const answers: number[] = [];
    await expect(async () => {
      for await (const answer of inOrder(failing, work, LIMITS)) answers.push(answer);
    }).rejects.toThrow('aborted');
    expect(answers).toHaveLength(13);
  });

  it('closes the source when the work fails, when answers are missing and when the reader leaves', async () => {
    const closed: string[] = [];
    async function* source(name: string) {
      try {
        yield* upTo(1000);
      } finally {
        closed.push(name);
      }
    }
    const fails = () => Promise.reject(new Error('disk full'));
    await expect(all(inOrder(source('failed'), fails, LIMITS))).rejects.toThrow('disk full');
    await expect(all(inOrder(source('short'), async () => [1], LIMITS))).rejects.toThrow(
      '10 items were given to work and 1 answered',
    );
    for await (const _ of inOrder(source('left'), squaring().work, LIMITS)) break;
    await wait(5);
    expect(closed).toEqual(['failed', 'short', 'left']);
  });

  it('fails at once when the work does, also while the source is silent', async () => {
    const silent = (async function* () {
      yield 1;
      await new Promise(() => {});
    })();
    const fails = () => Promise.reject(new Error('disk full'));
    await expect(all(inOrder(silent, fails, { batchSize: 10, maxWait: 1 }))).rejects.toThrow('disk full');
  });
});
