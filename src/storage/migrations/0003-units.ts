import type { Kysely } from 'kysely';
import type { Migration } from 'kysely/migration';
import type { Engine } from '../database.ts';
import { counted } from './columns.ts';

/** Measured units, the outcomes of each lot counted, and the statistics of each quantity rolled up by lot, rig and day. */
export const units = (engine: Engine): Migration => ({
  async up(db: Kysely<unknown>) {
    await db.schema
      .createTable('units')
      .addColumn('position', 'integer', counted(engine))
      .addColumn('lot', 'text', (column) => column.notNull())
      .addColumn('serial', 'text', (column) => column.notNull())
      .addColumn('measured_at', 'text', (column) => column.notNull())
      .addColumn('outcome', 'text', (column) => column.notNull())
      .addColumn('digest', 'text', (column) => column.notNull())
      .addColumn('unit', 'text', (column) => column.notNull())
      .addColumn('judged', 'text', (column) => column.notNull())
      .addUniqueConstraint('units_key', ['lot', 'serial', 'measured_at'])
      .execute();
    await db.schema.createIndex('units_by_lot').on('units').columns(['lot', 'position']).execute();
    await db.schema
      .createTable('unit_counts')
      .addColumn('lot', 'text', (column) => column.notNull())
      .addColumn('label', 'text', (column) => column.notNull())
      .addColumn('units', 'integer', (column) => column.notNull())
      .addPrimaryKeyConstraint('unit_counts_key', ['lot', 'label'])
      .execute();
    await db.schema
      .createTable('rollups')
      .addColumn('lot', 'text', (column) => column.notNull())
      .addColumn('rig', 'text', (column) => column.notNull())
      .addColumn('day', 'text', (column) => column.notNull())
      .addColumn('quantity', 'text', (column) => column.notNull())
      .addColumn('moments', 'text', (column) => column.notNull())
      .addColumn('bins', 'text', (column) => column.notNull())
      .addPrimaryKeyConstraint('rollups_key', ['lot', 'rig', 'day', 'quantity'])
      .execute();
  },
});
