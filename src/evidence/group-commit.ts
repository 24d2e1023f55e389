import type { Recording, UnitBatch, UnitStore } from './unit-store.ts';

/** Batches that share one transaction at most: bounds what a failure makes wait again. */
const MOST_BATCHES = 200;

interface Waiting {
  readonly batch: UnitBatch;
  readonly resolve: (recordings: Recording[]) => void;
  readonly reject: (error: unknown) => void;
}

/**
 * A unit store whose writers share transactions: what arrives while one is being committed goes into the next, so that many rigs
 * posting single units wait for the same flush to disk. Nobody waits for company: an idle store commits at once.
 */
export function groupCommit(store: UnitStore): UnitStore {
  const waiting: Waiting[] = [];
  let draining = false;

  const drain = async () => {
    draining = true;
    while (waiting.length > 0) await commit(waiting.splice(0, MOST_BATCHES));
    draining = false;
  };

  const commit = async (group: readonly Waiting[]): Promise<void> => {
    try {
      const recordings = await store.record(group.map(({ batch }) => batch));
      for (const [index, { resolve }] of group.entries()) resolve(recordings[index] ?? []);
    } catch (error) {
      if (group.length === 1) return group[0]?.reject(error);
      // One batch's fault is not the others': each alone, then.
      for (const one of group) await commit([one]);
    }
  };

  const one = (batch: UnitBatch) =>
    new Promise<Recording[]>((resolve, reject) => {
      waiting.push({ batch, resolve, reject });
      if (!draining) void drain();
    });

  return { ...store, record: (batches) => Promise.all(batches.map(one)) };
}
