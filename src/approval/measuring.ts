import { CoilproofError } from '../errors.ts';
import { type JudgedUnit, judgeUnit, type Yardstick } from '../evidence/judged-unit.ts';
import type { Lot } from '../evidence/lot.ts';
import type { Rig } from '../evidence/rig.ts';
import { rollUp } from '../evidence/rollup.ts';
import { onRig, type SentUnit, type Unit, withSweep } from '../evidence/unit.ts';
import type { UnitEntry, UnitStore } from '../evidence/unit-store.ts';
import { InvalidQuantity, within } from '../physics/invalid-quantity.ts';
import type { Compute } from './compute.ts';
import type { Part } from './part.ts';
import { digestOf } from './record.ts';
import { partId, type Registered, type Registry } from './registry.ts';

/** What judging and recording units needs from outside. */
export interface UnitDesk {
  readonly registry: Registry;
  readonly units: UnitStore;
  readonly compute: Pick<Compute, 'analysePulse'>;
}

/** A lot, and the drawing and conductor that its units are judged by. */
export interface LotUnderTest {
  readonly id: string;
  readonly lot: Lot;
  readonly yardstick: Yardstick;
}

/** One unit's answer: judged and recorded, now or before, or refused. */
export type MeasuredAnswer =
  | { readonly status: 'recorded' | 'repeated'; readonly judged: JudgedUnit }
  | { readonly problem: CoilproofError };

/** A lot with what its units are judged by. Throws `CoilproofError` `not-found`, or `unknown-reference` where its part has no drawing. */
export async function lotUnderTest(registry: Registry, id: string): Promise<LotUnderTest> {
  const lot = await registry.get('lot', id);
  if (!lot) throw new CoilproofError('not-found', `No lot ${id} is registered here.`);
  const { number, revision } = lot.value.part;
  const part = await registry.get('part', partId(number, revision));
  return { id, lot: lot.value, yardstick: yardstickOf(part?.value, `${number} revision ${revision}`) };
}

/** A part's lots, and what their units are judged by. Throws as `lotUnderTest`. */
export async function partUnderTest(registry: Registry, number: string, revision: string) {
  const id = partId(number, revision);
  const part = await registry.get('part', id);
  if (!part) throw new CoilproofError('not-found', `No part ${number} revision ${revision} is registered here.`);
  const lots: string[] = [];
  let after: string | undefined;
  for (;;) {
    const page = await registry.list('lot', { limit: LOTS_A_PAGE, ...(after !== undefined && { after }) });
    const own = page.filter(({ value }) => partId(value.part.number, value.part.revision) === id);
    lots.push(...own.map((lot) => lot.id));
    after = page.at(-1)?.id;
    if (page.length < LOTS_A_PAGE)
      return { lots, yardstick: yardstickOf(part.value, `${number} revision ${revision}`) };
  }
}

const LOTS_A_PAGE = 1000;

function yardstickOf(part: Part | undefined, name: string): Yardstick {
  if (!part?.drawing) throw new CoilproofError('unknown-reference', `Part ${name} has no drawing to judge units by.`);
  const conductor = part.construction?.winding?.conductor;
  return { drawing: part.drawing, ...(conductor && { conductor }) };
}

/**
 * Judges units of a lot and records them in one transaction; answers in their order once that is durable. A unit that cannot be
 * judged, or that contradicts one recorded under the same serial and time, is answered as a problem, and the rest go on.
 */
export async function measure(
  desk: UnitDesk,
  { id, yardstick }: LotUnderTest,
  units: readonly SentUnit[],
): Promise<MeasuredAnswer[]> {
  const rigs = new Map<string, Registered<Rig> | undefined>();
  const entries: (UnitEntry | { readonly problem: CoilproofError })[] = [];
  for (const unit of units) {
    if (unit.rig !== undefined && !rigs.has(unit.rig)) rigs.set(unit.rig, await desk.registry.get('rig', unit.rig));
    const rig = unit.rig === undefined ? undefined : rigs.get(unit.rig)?.value;
    entries.push(await refusable(async () => judgedEntry(unit, await sweptUnit(desk, unit), rig, yardstick)));
  }
  const usable = entries.filter((entry): entry is UnitEntry => 'judged' in entry);
  const batch = { lot: id, entries: usable, rollUp: (added: readonly JudgedUnit[]) => rollUp(added, yardstick) };
  const [recordings = []] = usable.length > 0 ? await desk.units.record([batch]) : [];
  const remaining = recordings.values();
  return entries.map((entry): MeasuredAnswer => {
    if ('problem' in entry) return entry;
    const recording = remaining.next().value;
    if (!recording || recording.kind === 'conflict') return { problem: contradicts(entry.unit, id) };
    return { status: recording.kind, judged: recording.judged };
  });
}

/** The unit with its pulse, where it has one, analysed beside the event loop. */
export const sweptUnit = async ({ compute }: Pick<UnitDesk, 'compute'>, unit: SentUnit): Promise<Unit> =>
  withSweep(unit, 'pulse' in unit ? await withinAsync('/pulse', compute.analysePulse(unit.pulse)) : undefined);

/** The digest is of the unit as it was sent; what is stored of a pulse is the sweep that it was analysed to. */
function judgedEntry(sent: SentUnit, unit: Unit, rig: Rig | undefined, yardstick: Yardstick): UnitEntry {
  if (unit.rig !== undefined && !rig) {
    const detail = `no rig ${unit.rig} is registered`;
    throw new CoilproofError('unknown-reference', detail, [{ pointer: '/rig', detail }]);
  }
  return { unit, digest: digestOf(sent), judged: judgeUnit(rig ? onRig(unit, rig) : unit, yardstick) };
}

/** What `work` makes, or the problem that one unit is refused for; faults of the service pass through. */
async function refusable<T>(work: () => Promise<T>): Promise<T | { readonly problem: CoilproofError }> {
  try {
    return await work();
  } catch (error) {
    if (error instanceof CoilproofError) return { problem: error };
    if (!(error instanceof InvalidQuantity)) throw error;
    const { pointer, detail } = error;
    return { problem: new CoilproofError('unusable-quantity', detail, [{ pointer, detail }]) };
  }
}

/** `within` of work that is awaited. */
export async function withinAsync<T>(prefix: string, work: Promise<T>): Promise<T> {
  const settled = await work.then(
    (value) => () => value,
    (error: unknown) => () => {
      throw error;
    },
  );
  return within(prefix, settled);
}

const contradicts = ({ serial, measuredAt }: Unit, lot: string) =>
  new CoilproofError(
    'conflict',
    `Unit ${serial}, measured at ${measuredAt}, is recorded in lot ${lot} with another content.`,
  );
