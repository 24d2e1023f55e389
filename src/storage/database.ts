import type { Kysely } from 'kysely';
import type { Tables } from './tables.ts';

export type Engine = 'sqlite' | 'postgres';

/** An open store, whatever the engine. Reads go to `db`; writes through `write` or `exclusive`. */
export interface Database {
  readonly engine: Engine;
  readonly db: Kysely<Tables>;
  /** Runs `work` in one transaction; it is durable when the promise resolves, and nothing of it is left when it rejects. */
  write<T>(work: (transaction: Kysely<Tables>) => Promise<T>): Promise<T>;
  /** The same, while no other process or request is in `exclusive` of any of the names: for what must not fork, such as a chain. */
  exclusive<T>(names: readonly string[], work: (transaction: Kysely<Tables>) => Promise<T>): Promise<T>;
  close(): Promise<void>;
}
