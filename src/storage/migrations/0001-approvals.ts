import { type Kysely, sql } from 'kysely';
import type { Migration } from 'kysely/migration';
import type { Engine } from '../database.ts';
import { counted } from './columns.ts';

/** Recorded approvals, chained by their digests. */
export const approvals = (engine: Engine): Migration => ({
  async up(db: Kysely<unknown>) {
    await db.schema
      .createTable('approvals')
      .addColumn('position', 'integer', counted(engine))
      .addColumn('id', 'text', (column) => column.notNull().unique())
      .addColumn('part_number', 'text', (column) => column.notNull())
      .addColumn('part_revision', 'text', (column) => column.notNull())
      .addColumn('verdict', 'text', (column) => column.notNull())
      .addColumn('recorded_at', 'text', (column) => column.notNull())
      .addColumn('input_digest', 'text', (column) => column.notNull())
      .addColumn('record_digest', 'text', (column) => column.notNull().unique())
      .addColumn('previous_digest', 'text', (column) => column.unique())
      .addColumn('idempotency_key', 'text', (column) => column.unique())
      .addColumn('record', 'text', (column) => column.notNull())
      .execute();
    await db.schema.createIndex('approvals_by_part').on('approvals').columns(['part_number', 'position']).execute();
    await db.schema.createIndex('approvals_by_verdict').on('approvals').columns(['verdict', 'position']).execute();
    // Only one record can be the first: a fork at the root would otherwise pass the unique previous digest.
    await sql`create unique index approvals_root on approvals ((1)) where previous_digest is null`.execute(db);
  },
});
