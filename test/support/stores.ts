import { randomUUID } from 'node:crypto';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Client } from 'pg';
import { inject } from 'vitest';
import type { Database } from '../../src/storage/database.ts';
import { openPostgres } from '../../src/storage/postgres.ts';
import { openSqlite } from '../../src/storage/sqlite.ts';

/** A place where a store can be opened, several times over: a folder, or a database of the test server. */
export interface StorePlace {
  /** What configures a service to use it. */
  readonly environment: Record<string, string>;
  open(): Promise<Database>;
  remove(): Promise<void>;
}

/** Both stores; the suites run on each. */
export const STORES: readonly { readonly engine: string; readonly make: () => Promise<StorePlace> }[] = [
  { engine: 'SQLite', make: sqlitePlace },
  { engine: 'PostgreSQL', make: postgresPlace },
];

async function sqlitePlace(): Promise<StorePlace> {
  const folder = mkdtempSync(join(tmpdir(), 'coilproof-'));
  return {
    environment: { DATA_DIR: folder },
    open: () => openSqlite(folder),
    remove: async () => rmSync(folder, { recursive: true }),
  };
}

async function postgresPlace(): Promise<StorePlace> {
  const server = inject('postgresServer');
  const name = `test_${randomUUID().replaceAll('-', '')}`;
  await onServer(server, `create database ${name}`);
  const url = `${server}/${name}`;
  return {
    environment: { DATABASE_URL: url },
    open: () => openPostgres(url),
    remove: () => onServer(server, `drop database ${name} with (force)`),
  };
}

async function onServer(server: string, statement: string): Promise<void> {
  const client = new Client({ connectionString: `${server}/postgres` });
  await client.connect();
  await client.query(statement);
  await client.end();
}
