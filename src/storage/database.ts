import type { Kysely } from 'kysely';
import type { Tables } from './tables.ts';

/** An open store. Reads go to `db`; every write goes through `write`, whatever the engine. */
export interface Database {
  readonly db: Kysely<Tables>;
  /** Runs `work` in one transaction that nothing else writes beside; committed, durably, when the promise resolves. */
  write<T>(work: (transaction: Kysely<Tables>) => Promise<T>): Promise<T>;
  close(): Promise<void>;
}
