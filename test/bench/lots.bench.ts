/**
 * What lots cost, as ratios within one run:
 * - statistics of a lot of 20,000 units over those of 200: rollups make it near 1;
 * - 40 rigs posting single units through group commit over the same posts, each in a transaction of its own;
 * - a unit in bulk (NDJSON) over the raw insertion of the same row into the same store.
 *
 *     node test/bench/lots.bench.ts
 */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { digestOf } from '../../src/approval/record.ts';
import { groupCommit } from '../../src/evidence/group-commit.ts';
import { judgeUnit, type Yardstick } from '../../src/evidence/judged-unit.ts';
import { lotStatistics } from '../../src/evidence/lot-statistics.ts';
import { rollUp } from '../../src/evidence/rollup.ts';
import type { Unit } from '../../src/evidence/unit.ts';
import type { UnitStore } from '../../src/evidence/unit-store.ts';
import { openSqlite } from '../../src/storage/sqlite.ts';
import { unitStore } from '../../src/storage/units.ts';

const yardstick: Yardstick = {
  drawing: {
    inductance: { nominal_H: 1e-3, lower_H: 9e-4, upper_H: 1.1e-3 },
    saturation: { current_A: 4, inductanceDrop: 0.3, temperature_degC: 25 },
  },
};
const CURRENTS = [0, 2, 4, 6, 8];
const unitOf = (k: number): Unit => ({
  serial: `B-${k}`,
  measuredAt: new Date(Date.UTC(2026, 0, 1) + k * 1000).toISOString(),
  instrument: { inductance: { relative: 0.003 } },
  sweep: {
    kind: 'differential',
    current_A: CURRENTS,
    inductance_H: CURRENTS.map((i) => 1e-3 * (1 + 0.02 * Math.sin(k)) * (1 - i / (20 + Math.cos(k)))),
  },
});
const entryOf = (k: number) => {
  const unit = unitOf(k);
  return { unit, digest: digestOf(unit), judged: judgeUnit(unit, yardstick) };
};
const batchOf = (lot: string, ks: readonly number[]) => ({
  lot,
  entries: ks.map(entryOf),
  rollUp: (added: Parameters<typeof rollUp>[0]) => rollUp(added, yardstick),
});
const range = (n: number) => Array.from({ length: n }, (_, k) => k);

async function timed(work: () => Promise<unknown>): Promise<number> {
  const start = performance.now();
  await work();
  return performance.now() - start;
}

async function fill(store: UnitStore, lot: string, units: number): Promise<void> {
  for (let k = 0; k < units; k += 500)
    await store.record([
      batchOf(
        lot,
        range(Math.min(500, units - k)).map((j) => k + j),
      ),
    ]);
}

async function statisticsTime(store: UnitStore, lot: string): Promise<number> {
  const times: number[] = [];
  for (let k = 0; k < 30; k++)
    times.push(await timed(async () => lotStatistics(await store.rollups([lot]), yardstick)));
  return times.sort((a, b) => a - b)[15]!;
}

const folder = mkdtempSync(join(tmpdir(), 'coilproof-bench-'));
const database = await openSqlite(folder);
const store = unitStore(database);

await fill(store, 'small', 200);
await fill(store, 'large', 20_000);
const [small, large] = [await statisticsTime(store, 'small'), await statisticsTime(store, 'large')];
console.log(
  `statistics of 20,000 units over those of 200: ${(large / small).toFixed(2)} (${large.toFixed(1)} ms, ${small.toFixed(1)} ms)`,
);

const posts = range(2000);
const grouped = groupCommit(store);
const rigs = (target: UnitStore, lot: string) =>
  Promise.all(
    range(40).map(async (rig) => {
      for (let k = rig; k < posts.length; k += 40) await target.record([batchOf(lot, [k])]);
    }),
  );
const together = await timed(() => rigs(grouped, 'grouped'));
const apart = await timed(() => rigs(store, 'apart'));
console.log(
  `group commit over a transaction a unit: ${(together / apart).toFixed(2)} of the time (${posts.length} units, 40 rigs)`,
);

const entries = posts.map(entryOf);
const bulk = await timed(async () => {
  for (let k = 0; k < entries.length; k += 500) {
    const lines = entries
      .slice(k, k + 500)
      .map(({ unit }) => JSON.stringify(unit))
      .map((line) => JSON.parse(line) as Unit);
    const judged = lines.map((unit) => ({ unit, digest: digestOf(unit), judged: judgeUnit(unit, yardstick) }));
    await store.record([{ lot: 'bulk', entries: judged, rollUp: (added) => rollUp(added, yardstick) }]);
  }
});
const raw = await timed(async () => {
  for (let k = 0; k < entries.length; k += 500) {
    await database.write(async (transaction) => {
      for (const { unit, digest, judged } of entries.slice(k, k + 500)) {
        await transaction
          .insertInto('units')
          .values({
            lot: 'raw',
            serial: unit.serial,
            measured_at: unit.measuredAt,
            outcome: judged.outcome,
            digest,
            unit: JSON.stringify(unit),
            judged: JSON.stringify(judged),
          })
          .execute();
      }
    });
  }
});
console.log(
  `a unit judged and recorded in bulk over the raw insertion of its row: ${(bulk / raw).toFixed(1)} (${((bulk / entries.length) * 1000).toFixed(0)} µs a unit)`,
);

await database.close();
rmSync(folder, { recursive: true });
