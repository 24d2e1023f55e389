import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { DatabaseSync, type SQLInputValue, type StatementSync } from 'node:sqlite';
import { Kysely, SqliteDialect, sql } from 'kysely';
import type { Database } from './database.ts';
import { migrate } from './migrations/index.ts';
import type { Tables } from './tables.ts';

/**
 * The embedded store: one file under `dataDir` (':memory:' for none), write-ahead log, synchronous FULL, so that a committed
 * transaction survives the sudden end of the process and of the machine.
 */
export async function openSqlite(dataDir: string): Promise<Database> {
  const inMemory = dataDir === ':memory:';
  if (!inMemory) mkdirSync(dataDir, { recursive: true });
  const file = new DatabaseSync(inMemory ? ':memory:' : join(dataDir, 'coilproof.sqlite'));
  file.exec(
    'PRAGMA busy_timeout = 5000; PRAGMA journal_mode = WAL; PRAGMA synchronous = FULL; PRAGMA foreign_keys = ON;',
  );
  const statements = new Map<string, StatementSync>();
  const db = new Kysely<Tables>({
    dialect: new SqliteDialect({
      database: { close: () => file.close(), prepare: (text) => prepare(file, statements, text) },
    }),
  });
  const oneAtATime = createLock();

  const write: Database['write'] = (work) =>
    oneAtATime(async () => {
      // IMMEDIATE: another process on the same file waits here, rather than fail when it comes to write.
      await sql`begin immediate`.execute(db);
      try {
        const result = await work(db);
        await sql`commit`.execute(db);
        return result;
      } catch (error) {
        await sql`rollback`.execute(db);
        throw error;
      }
    });
  // Kysely's own migration lock does nothing in SQLite; inside a write, a second process waits and finds the work done.
  await write(() => migrate(db, 'sqlite'));
  return {
    engine: 'sqlite',
    db,
    write,
    // The file has one writer at a time: every write is exclusive.
    exclusive: (_names, work) => write(work),
    close: () => oneAtATime(() => db.destroy()),
  };
}

/** Statements kept, since preparing one costs more than running it; bounded, since a list's filters make several texts. */
const KEPT_STATEMENTS = 500;

/** node:sqlite in the shape that Kysely's SQLite dialect asks for. */
function prepare(file: DatabaseSync, kept: Map<string, StatementSync>, text: string) {
  const statement = kept.get(text) ?? file.prepare(text);
  if (kept.size < KEPT_STATEMENTS) kept.set(text, statement);
  const values = (parameters: readonly unknown[]) => parameters as SQLInputValue[];
  return {
    reader: statement.columns().length > 0,
    all: (parameters: readonly unknown[]) => statement.all(...values(parameters)),
    run: (parameters: readonly unknown[]) => statement.run(...values(parameters)),
    iterate: (parameters: readonly unknown[]) => statement.iterate(...values(parameters)),
  };
}

/** One at a time, in the order asked: the file has a single connection, so two transactions would otherwise interleave. */
function createLock() {
  let last: Promise<unknown> = Promise.resolve();
  return <T>(work: () => Promise<T>): Promise<T> => {
    const run = last.then(work);
    last = run.catch(() => undefined);
    return run;
  };
}
