import { execFile } from 'node:child_process';
import { promisify } from 'node:util';
import { sql } from 'kysely';
import { describe, expect, it } from 'vitest';
import { STORES } from '../support/stores.ts';

const run = promisify(execFile);
const OPEN_STORE = new URL('../support/open-store.ts', import.meta.url).pathname;

describe.each(STORES)('migrations in $engine', ({ make }) => {
  it('can be applied by several processes at once, and again', async () => {
    const place = await make();
    const env = { ...process.env, ...place.environment, LOG_LEVEL: 'error' };
    await Promise.all([1, 2, 3].map(() => run(process.execPath, [OPEN_STORE], { env })));
    const database = await place.open();
    const { rows } = await sql<{ name: string }>`select name from kysely_migration order by name`.execute(database.db);
    expect(rows.map(({ name }) => name)).toContain('0001-approvals');
    expect(new Set(rows.map(({ name }) => name)).size).toBe(rows.length);
    await database.close();
    await place.remove();
  });
});
