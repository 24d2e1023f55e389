import type { Kysely } from 'kysely';
import { type Migration, Migrator } from 'kysely/migration';
import type { Engine } from '../database.ts';
import { approvals } from './0001-approvals.ts';
import { registry } from './0002-registry.ts';
import { units } from './0003-units.ts';

/** Every migration there ever was, in order. A released one never changes; what changes the tables is a new number. */
const MIGRATIONS: Record<string, (engine: Engine) => Migration> = {
  '0001-approvals': approvals,
  '0002-registry': registry,
  '0003-units': units,
};

/** Brings the store's tables up to date; safe to run again and from several processes at once. */
export async function migrate<Tables>(db: Kysely<Tables>, engine: Engine): Promise<void> {
  const migrations = Object.fromEntries(Object.entries(MIGRATIONS).map(([name, make]) => [name, make(engine)]));
  const migrator = new Migrator({ db, provider: { getMigrations: async () => migrations } });
  const { error } = await migrator.migrateToLatest();
  if (error) throw error;
}
