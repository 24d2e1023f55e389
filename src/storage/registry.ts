import { digestOf } from '../approval/record.ts';
import type { Precondition, Registered, Registry, RegistryKind, RegistryKinds } from '../approval/registry.ts';
import { CoilproofError } from '../errors.ts';
import type { Database } from './database.ts';

/** What is registered, in the store's `registry` table. */
export function registryStore(database: Database): Registry {
  const { db } = database;
  const find = (source: Database['db'], kind: RegistryKind, id: string) =>
    source
      .selectFrom('registry')
      .select(['id', 'tag', 'value'])
      .where('kind', '=', kind)
      .where('id', '=', id)
      .executeTakeFirst();
  return {
    get: async (kind, id) => {
      const row = await find(db, kind, id);
      return row && registered(row);
    },

    put: (kind, id, value, { precondition, mayReplace }) =>
      database.exclusive([`registry ${kind} ${id}`], async (transaction) => {
        const row = await find(transaction, kind, id);
        const tag = digestOf(value);
        requirePrecondition(precondition, row?.tag);
        if (row?.tag === tag) return { registered: registered(row), created: false };
        if (row) {
          mayReplace(JSON.parse(row.value));
          await transaction
            .updateTable('registry')
            .set({ tag, value: JSON.stringify(value) })
            .where('kind', '=', kind)
            .where('id', '=', id)
            .execute();
        } else {
          await transaction
            .insertInto('registry')
            .values({ kind, id, tag, value: JSON.stringify(value) })
            .execute();
        }
        return { registered: { id, value, tag }, created: row === undefined };
      }),

    list: async (kind, { prefix = '', after, limit }) => {
      let query = db.selectFrom('registry').select(['id', 'tag', 'value']).where('kind', '=', kind);
      // A range, not LIKE: it uses the key, and the prefix needs no escaping. U+FFFF sorts after every character of an id.
      if (prefix) query = query.where('id', '>=', prefix).where('id', '<', `${prefix}\uffff`);
      if (after !== undefined) query = query.where('id', '>', after);
      return (await query.orderBy('id').limit(limit).execute()).map((row) => registered(row));
    },
  };
}

const registered = <K extends RegistryKind>(row: {
  id: string;
  tag: string;
  value: string;
}): Registered<RegistryKinds[K]> => ({
  id: row.id,
  tag: row.tag,
  value: JSON.parse(row.value),
});

function requirePrecondition({ ifMatch, ifNoneMatch }: Precondition, stored: string | undefined): void {
  if (ifNoneMatch === '*' && stored !== undefined) {
    throw new CoilproofError('precondition-failed', 'If-None-Match: * asks that nothing is stored, but something is.');
  }
  if (ifMatch === undefined) return;
  const matches = stored !== undefined && (ifMatch === '*' || ifMatch.includes(stored));
  if (!matches) {
    throw new CoilproofError(
      'precondition-failed',
      `If-Match does not hold: ${stored === undefined ? 'nothing is stored' : `the stored one is "${stored}"`}.`,
    );
  }
}
