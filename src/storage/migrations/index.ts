import type { Kysely } from 'kysely';
import { type Migration, Migrator } from 'kysely/migration';
import { approvals } from './0001-approvals.ts';

/** Every migration there ever was, in order. A released one never changes; what changes the tables is a new number. */
const MIGRATIONS: Record<string, Migration> = {
  '0001-approvals': approvals,
};

/** Brings the store's tables up to date; safe to run again and from several processes at once. */
export async function migrate(db: Kysely<unknown>): Promise<void> {
  const migrator = new Migrator({ db, provider: { getMigrations: async () => MIGRATIONS } });
  const { error } = await migrator.migrateToLatest();
  if (error) throw error;
}
