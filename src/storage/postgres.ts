import { Kysely, PostgresDialect, sql } from 'kysely';
import { Pool } from 'pg';
import type { Database } from './database.ts';
import { migrate } from './migrations/index.ts';
import type { Tables } from './tables.ts';

/** Connections that one process holds at most: enough for its requests on a few cores, few enough for several processes. */
const MAXIMUM_CONNECTIONS = 10;

/** The store in PostgreSQL, shared by every process that is given the same URL. */
export async function openPostgres(url: string): Promise<Database> {
  const pool = new Pool({ connectionString: url, max: MAXIMUM_CONNECTIONS });
  // A connection that dies while idle is replaced on its next use; unheard, its error event would end the process.
  pool.on('error', () => undefined);
  const db = new Kysely<Tables>({ dialect: new PostgresDialect({ pool }) });
  await migrate(db, 'postgres');
  const write: Database['write'] = (work) => db.transaction().execute(work);
  return {
    engine: 'postgres',
    db,
    write,
    exclusive: (names, work) =>
      write(async (transaction) => {
        // In one order everywhere, so that two who want the same locks cannot wait for each other.
        for (const name of [...new Set(names)].sort()) {
          await sql`select pg_advisory_xact_lock(hashtextextended(${name}, 0))`.execute(transaction);
        }
        return work(transaction);
      }),
    close: () => db.destroy(),
  };
}
