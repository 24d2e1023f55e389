import type { JudgedUnit, UnitQuantity } from '../evidence/judged-unit.ts';
import { mergeRolled, NOTHING_ROLLED_UP, type Rolled, type RollupPart } from '../evidence/rollup.ts';
import type { RecordedUnit, Recording, Rollup, UnitBatch, UnitEntry, UnitStore } from '../evidence/unit-store.ts';
import type { Database } from './database.ts';

const OUT_OF_CALIBRATION = 'out-of-calibration';

type Transaction = Database['db'];

/** Measured units in the store's `units`, `unit_counts` and `rollups` tables. */
export function unitStore(database: Database): UnitStore {
  const { db } = database;
  const select = db.selectFrom('units').select(['position', 'unit', 'judged']);
  return {
    // Exclusive by lot: rollups are read, merged and written, and two writers of one lot would lose each other's units.
    record: (batches) =>
      database.exclusive(
        batches.map(({ lot }) => `lot ${lot}`),
        async (transaction) => {
          const recordings: Recording[][] = [];
          for (const batch of batches) recordings.push(await recordBatch(transaction, batch));
          return recordings;
        },
      ),

    list: async (lot, { outcome, after = 0, limit }) => {
      let query = db
        .selectFrom('units')
        .select(['position', 'unit', 'judged'])
        .where('lot', '=', lot)
        .where('position', '>', after);
      if (outcome !== undefined) query = query.where('outcome', '=', outcome);
      return (await query.orderBy('position').limit(limit).execute()).map(recordedUnit);
    },

    last: async (lot, limit) => {
      const rows = await select.where('lot', '=', lot).orderBy('position', 'desc').limit(limit).execute();
      return rows.map(recordedUnit);
    },

    ofSerial: async (lot, serial) => {
      const row = await select
        .where('lot', '=', lot)
        .where('serial', '=', serial)
        .orderBy('position', 'desc')
        .limit(1)
        .executeTakeFirst();
      return row && recordedUnit(row);
    },

    lastPosition: async (lot) => {
      const row = await db
        .selectFrom('units')
        .select('position')
        .where('lot', '=', lot)
        .orderBy('position', 'desc')
        .limit(1)
        .executeTakeFirst();
      return row?.position ?? 0;
    },

    counts: async (lot) => {
      const rows = await db.selectFrom('unit_counts').select(['label', 'units']).where('lot', '=', lot).execute();
      const of = (label: string) => rows.find((row) => row.label === label)?.units ?? 0;
      return {
        pass: of('pass'),
        inconclusive: of('inconclusive'),
        fail: of('fail'),
        outOfCalibration: of(OUT_OF_CALIBRATION),
      };
    },

    rollups: async (lots) => {
      if (lots.length === 0) return [];
      const rows = await db
        .selectFrom('rollups')
        .selectAll()
        .where('lot', 'in', [...lots])
        .execute();
      return rows.map(
        ({ moments, bins, quantity, ...row }): Rollup => ({
          ...row,
          quantity: quantity as UnitQuantity,
          moments: JSON.parse(moments),
          bins: JSON.parse(bins),
        }),
      );
    },
  };
}

const recordedUnit = (row: { position: number; unit: string; judged: string }): RecordedUnit => ({
  position: row.position,
  unit: JSON.parse(row.unit),
  judged: JSON.parse(row.judged),
});

async function recordBatch(transaction: Transaction, { lot, entries, rollUp }: UnitBatch): Promise<Recording[]> {
  const recordings: Recording[] = [];
  const added: JudgedUnit[] = [];
  for (const entry of entries) {
    const recording = await recordOne(transaction, lot, entry);
    recordings.push(recording);
    if (recording.kind === 'recorded') added.push(entry.judged);
  }
  await count(transaction, lot, added);
  await mergeIn(transaction, lot, rollUp(added));
  return recordings;
}

async function recordOne(
  transaction: Transaction,
  lot: string,
  { unit, digest, judged }: UnitEntry,
): Promise<Recording> {
  const inserted = await transaction
    .insertInto('units')
    .values({
      lot,
      serial: unit.serial,
      measured_at: unit.measuredAt,
      outcome: judged.outcome,
      digest,
      unit: JSON.stringify(unit),
      judged: JSON.stringify(judged),
    })
    .onConflict((conflict) => conflict.columns(['lot', 'serial', 'measured_at']).doNothing())
    .returning('position')
    .executeTakeFirst();
  if (inserted) return { kind: 'recorded', judged };
  const first = await transaction
    .selectFrom('units')
    .select(['digest', 'judged'])
    .where('lot', '=', lot)
    .where('serial', '=', unit.serial)
    .where('measured_at', '=', unit.measuredAt)
    .executeTakeFirstOrThrow();
  return first.digest === digest ? { kind: 'repeated', judged: JSON.parse(first.judged) } : { kind: 'conflict' };
}

async function count(transaction: Transaction, lot: string, added: readonly JudgedUnit[]): Promise<void> {
  const labels = added.flatMap(({ outcome, outOfCalibration }) => [
    outcome,
    ...(outOfCalibration ? [OUT_OF_CALIBRATION] : []),
  ]);
  for (const [label, { length }] of Map.groupBy(labels, (name) => name)) {
    await transaction
      .insertInto('unit_counts')
      .values({ lot, label, units: length })
      .onConflict((conflict) =>
        conflict.columns(['lot', 'label']).doUpdateSet((row) => ({ units: row('unit_counts.units', '+', length) })),
      )
      .execute();
  }
}

async function mergeIn(transaction: Transaction, lot: string, parts: readonly RollupPart[]): Promise<void> {
  for (const { rig, day, quantity, ...part } of parts) {
    const key = { lot, rig, day, quantity };
    const row = await transaction
      .selectFrom('rollups')
      .select(['moments', 'bins'])
      .where((where) => where.and(key))
      .executeTakeFirst();
    const before: Rolled = row ? { moments: JSON.parse(row.moments), bins: JSON.parse(row.bins) } : NOTHING_ROLLED_UP;
    const merged = mergeRolled(before, part);
    const values = { moments: JSON.stringify(merged.moments), bins: JSON.stringify(merged.bins) };
    await transaction
      .insertInto('rollups')
      .values({ ...key, ...values })
      .onConflict((conflict) => conflict.columns(['lot', 'rig', 'day', 'quantity']).doUpdateSet(values))
      .execute();
  }
}
