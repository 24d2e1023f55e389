export interface BatchLimits<T> {
  /** items worked together at most */
  readonly batchSize: number;
  /** ms that an item waits for others to come */
  readonly maxWait: number;
  /** A batch is full once its items weigh this much together. */
  readonly maxWeight?: number;
  readonly weightOf?: (item: T) => number;
}

/**
 * Works the items of a source in batches, so that a store can commit many of them at once, and gives the results in the order of the
 * items. A batch goes to work when it is full, when its first item has waited `maxWait` ms, or when the source has ended.
 *
 * The next batch is gathered while one is worked and while its results are taken, and no further: of the source at most two batches
 * are held, of the results one. When the source fails, what came before is worked and answered, and then its error is thrown; when
 * `work` fails, its error is thrown and the source is closed. `work` answers each item of its batch, in order.
 */
export async function* inOrder<T, R>(
  source: AsyncIterable<T>,
  work: (batch: readonly T[]) => Promise<readonly R[]>,
  limits: BatchLimits<T>,
): AsyncGenerator<R> {
  const iterator = source[Symbol.asyncIterator]();
  const gather = gatherer(iterator, limits);
  let gathering = gather();
  try {
    for (;;) {
      const { items, end } = await gathering;
      if (!end) gathering = gather();
      if (items.length > 0) yield* answered(items, await work(items));
      if (end?.error !== undefined) throw end.error;
      if (end) return;
    }
  } finally {
    // Not awaited: a generator returns only after the read that it is in, and that one may wait for a client who sends nothing.
    iterator.return?.().then(undefined, () => {});
  }
}

function answered<T, R>(items: readonly T[], results: readonly R[]): readonly R[] {
  if (results.length === items.length) return results;
  throw new Error(`${items.length} items were given to work and ${results.length} answered`);
}

interface Batch<T> {
  readonly items: readonly T[];
  /** where the source ended after these, or failed */
  readonly end?: { readonly error?: unknown };
}

/** Gathers one batch a call, one call at a time; a read that outlasts its batch gives the next one its first item. */
function gatherer<T>(iterator: AsyncIterator<T>, limits: BatchLimits<T>): () => Promise<Batch<T>> {
  const { batchSize, maxWait, maxWeight = Number.POSITIVE_INFINITY, weightOf = () => 0 } = limits;
  let reading: Promise<IteratorResult<T>> | undefined;
  return async () => {
    const items: T[] = [];
    let weight = 0;
    const timer = stopwatch(maxWait);
    try {
      while (items.length < batchSize && weight < maxWeight) {
        reading ??= iterator.next();
        const read = items.length === 0 ? await reading : await Promise.race([reading, timer.elapsed()]);
        if (read === 'elapsed') break;
        reading = undefined;
        if (read.done) return { items, end: {} };
        items.push(read.value);
        weight += weightOf(read.value);
      }
      return { items };
    } catch (error) {
      return { items, end: { error } };
    } finally {
      timer.stop();
    }
  };
}

/** Runs from the first time that it is asked. */
function stopwatch(duration: number) {
  let timeout: NodeJS.Timeout | undefined;
  let elapsed: Promise<'elapsed'> | undefined;
  return {
    elapsed: () => {
      elapsed ??= new Promise((resolve) => {
        timeout = setTimeout(() => resolve('elapsed'), duration);
      });
      return elapsed;
    },
    stop: () => clearTimeout(timeout),
  };
}
