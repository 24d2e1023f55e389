import type { Kysely } from 'kysely';
import type { Migration } from 'kysely/migration';

/** Materials, rigs, released parts and lots: small documents by kind and id. */
export const registry = (): Migration => ({
  async up(db: Kysely<unknown>) {
    await db.schema
      .createTable('registry')
      .addColumn('kind', 'text', (column) => column.notNull())
      .addColumn('id', 'text', (column) => column.notNull())
      .addColumn('tag', 'text', (column) => column.notNull())
      .addColumn('value', 'text', (column) => column.notNull())
      .addPrimaryKeyConstraint('registry_key', ['kind', 'id'])
      .execute();
  },
});
