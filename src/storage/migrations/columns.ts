import type { ColumnDefinitionBuilder } from 'kysely';
import type { Engine } from '../database.ts';

/** A primary key that the store counts up by itself; SQLite never gives a number twice. */
export const counted = (engine: Engine) => (column: ColumnDefinitionBuilder) =>
  engine === 'sqlite' ? column.primaryKey().autoIncrement() : column.primaryKey().generatedAlwaysAsIdentity();
