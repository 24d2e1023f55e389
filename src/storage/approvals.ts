import { sql } from 'kysely';
import type { Approval } from '../approval/approval.ts';
import type { ApprovalStore, Recorded } from '../approval/store.ts';
import { CoilproofError } from '../errors.ts';
import type { Database } from './database.ts';

/** Approvals in the store's `approvals` table. */
export function approvalStore(database: Database): ApprovalStore {
  const { db } = database;
  return {
    append: (make, idempotency) =>
      database.exclusive(['approvals'], async (transaction) => {
        if (idempotency) {
          const repeat = await transaction
            .selectFrom('approvals')
            .select(['position', 'record', 'input_digest'])
            .where('idempotency_key', '=', idempotency.key)
            .executeTakeFirst();
          if (repeat && repeat.input_digest !== idempotency.inputDigest) {
            throw new CoilproofError('idempotency-conflict', `The key ${idempotency.key} was sent with another body.`);
          }
          if (repeat) return recorded(repeat);
        }
        const last = await transaction
          .selectFrom('approvals')
          .select('record_digest')
          .orderBy('position', 'desc')
          .limit(1)
          .executeTakeFirst();
        const approval = make(last?.record_digest ?? null);
        const { position } = await transaction
          .insertInto('approvals')
          .values({
            id: approval.id,
            part_number: approval.part.number,
            part_revision: approval.part.revision,
            verdict: approval.verdict,
            recorded_at: approval.recordedAt,
            input_digest: approval.digests.input,
            record_digest: approval.digests.record,
            previous_digest: approval.digests.previous,
            idempotency_key: idempotency?.key ?? null,
            record: JSON.stringify(approval),
          })
          .returning('position')
          .executeTakeFirstOrThrow();
        return { position, approval };
      }),

    get: async (id) => {
      const row = await db.selectFrom('approvals').select('record').where('id', '=', id).executeTakeFirst();
      return row && (JSON.parse(row.record) as Approval);
    },

    list: async ({ part, verdict, after = 0, limit }) => {
      let query = db.selectFrom('approvals').select(['position', 'record']).where('position', '>', after);
      if (part !== undefined) query = query.where('part_number', '=', part);
      if (verdict !== undefined) query = query.where('verdict', '=', verdict);
      return (await query.orderBy('position').limit(limit).execute()).map(recorded);
    },

    ping: async () => {
      await sql`select 1`.execute(db);
    },
  };
}

const recorded = (row: { position: number; record: string }): Recorded => ({
  position: row.position,
  approval: JSON.parse(row.record) as Approval,
});
