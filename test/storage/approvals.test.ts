import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { Approval } from '../../src/approval/approval.ts';
import { digestOf, isIntact, seal } from '../../src/approval/record.ts';
import { approvalStore } from '../../src/storage/approvals.ts';
import type { Database } from '../../src/storage/database.ts';
import { STORES, type StorePlace } from '../support/stores.ts';

let count = 0;
const make =
  (over: Partial<Approval> = {}) =>
  (previous: string | null): Approval => {
    count += 1;
    return seal(
      { n: count },
      {
        id: `a${count}`,
        verdict: 'approve',
        reasons: [],
        part: { number: 'LG-1', revision: 'A' },
        duty: { peakCurrent_A: 1 },
        checks: [],
        cautions: [],
        engine: { version: '0' },
        recordedAt: '2026-01-01T00:00:00.000Z',
        ...over,
      } as Omit<Approval, 'digests'>,
      previous,
    );
  };

describe.each(STORES)('the approval store in $engine', ({ make: makePlace }) => {
  let place: StorePlace;
  let database: Database;
  beforeEach(async () => {
    place = await makePlace();
    database = await place.open();
  });
  afterEach(async () => {
    await database.close();
    await place.remove();
  });

  it('chains records: each names the digest of the one before, and all are intact', async () => {
    const store = approvalStore(database);
    const appended = await Promise.all(Array.from({ length: 20 }, () => store.append(make())));
    const listed = await store.list({ limit: 100 });
    expect(listed).toEqual(appended.sort((a, b) => a.position - b.position));
    listed.forEach(({ approval }, index) => {
      expect(approval.digests.previous).toBe(listed[index - 1]?.approval.digests.record ?? null);
      expect(isIntact(approval)).toBe(true);
    });
    expect(isIntact({ ...listed[3]!.approval, verdict: 'reject' })).toBe(false);
  });

  it('answers a repeated idempotency key with the first record, and refuses it for another body', async () => {
    const store = approvalStore(database);
    const inputDigest = digestOf({ n: count + 1 });
    const first = await store.append(make(), { key: 'k', inputDigest });
    expect(first.approval.digests.input).toBe(inputDigest);
    expect(await store.append(make(), { key: 'k', inputDigest })).toEqual(first);
    await expect(store.append(make(), { key: 'k', inputDigest: 'other' })).rejects.toMatchObject({
      code: 'idempotency-conflict',
    });
    expect(await store.list({ limit: 10 })).toHaveLength(1);
  });

  it('keeps nothing of an append whose making fails', async () => {
    const store = approvalStore(database);
    await expect(
      store.append(() => {
        throw new Error('no');
      }),
    ).rejects.toThrow('no');
    const { approval } = await store.append(make());
    expect(approval.digests.previous).toBeNull();
    expect(await store.list({ limit: 10 })).toHaveLength(1);
  });

  it('filters by part and verdict and pages by position', async () => {
    const store = approvalStore(database);
    for (const number of ['LG-1', 'LG-2', 'LG-1']) await store.append(make({ part: { number, revision: 'A' } }));
    const rejected = await store.append(make({ verdict: 'reject' }));
    expect((await store.list({ part: 'LG-1', limit: 10 })).map(({ position }) => position)).toEqual([1, 3, 4]);
    expect(await store.list({ verdict: 'reject', limit: 10 })).toEqual([rejected]);
    expect((await store.list({ after: 1, limit: 2 })).map(({ position }) => position)).toEqual([2, 3]);
  });

  it('has every record after it is opened again, by another handle on the same file too', async () => {
    const first = await approvalStore(database).append(make());
    const beside = await place.open();
    const second = await approvalStore(beside).append(make());
    expect(second.approval.digests.previous).toBe(first.approval.digests.record);
    expect(await approvalStore(database).get(second.approval.id)).toEqual(second.approval);
    await beside.close();
  });

  it('knows nothing of an id that it was not given', async () => {
    expect(await approvalStore(database).get('nobody')).toBeUndefined();
    await expect(approvalStore(database).ping()).resolves.toBeUndefined();
  });
});
