import { CoilproofError } from '../errors.ts';
import { summariseLot } from '../evidence/lot-summary.ts';
import { onRig, type Unit } from '../evidence/unit.ts';
import type { Material } from '../physics/core/material.ts';
import { lotUnderTest, sweptUnit, type UnitDesk, withinAsync } from './measuring.ts';
import type { Part } from './part.ts';
import { partId, type Registry } from './registry.ts';
import type { ApprovalRequest, Evidence, SentRequest } from './request.ts';

/** A place in a request where an id stood for something registered, and what tag it had when it was read. */
export interface Reference {
  readonly pointer: string;
  readonly kind: 'material' | 'part' | 'rig';
  readonly id: string;
  readonly tag: string;
}

/**
 * `body` with the id of a registered material, wherever `material` holds one, replaced by that material. Types see a material
 * there in any case: nothing beyond this point meets an id.
 * Throws `CoilproofError` `unknown-reference` naming every id that leads nowhere.
 */
export async function resolveMaterials<T>(body: T, registry: Registry): Promise<{ body: T; references: Reference[] }> {
  const places = [...materialIds(body, '')];
  const found = await Promise.all(
    places.map(async ({ pointer, id }) => ({ pointer, id, material: await registry.get('material', id) })),
  );
  const unknown = found.filter(({ material }) => !material);
  if (unknown.length > 0) {
    const fields = unknown.map(({ pointer, id }) => ({ pointer, detail: `no material ${id} is registered` }));
    throw new CoilproofError('unknown-reference', fields.map(({ detail }) => detail).join('; '), fields);
  }
  const byId = new Map(found.map(({ id, material }) => [id, material!.value]));
  return {
    body: places.length === 0 ? body : (withMaterials(body, byId) as T),
    references: found.map(({ pointer, id, material }) => ({ pointer, kind: 'material', id, tag: material!.tag })),
  };
}

function* materialIds(node: unknown, pointer: string): Generator<{ pointer: string; id: string }> {
  if (node === null || typeof node !== 'object') return;
  for (const [key, value] of Object.entries(node)) {
    const here = `${pointer}/${key.replaceAll('~', '~0').replaceAll('/', '~1')}`;
    if (key === 'material' && typeof value === 'string') yield { pointer: here, id: value };
    else yield* materialIds(value, here);
  }
}

function withMaterials(node: unknown, byId: ReadonlyMap<string, Material>): unknown {
  if (node === null || typeof node !== 'object') return node;
  if (Array.isArray(node)) return node.map((item) => withMaterials(item, byId));
  return Object.fromEntries(
    Object.entries(node).map(([key, value]) => [
      key,
      key === 'material' && typeof value === 'string' ? byId.get(value) : withMaterials(value, byId),
    ]),
  );
}

/**
 * An approval's request with everything that it refers to put in its place: the registered part where only number and revision are
 * given, materials, and each rig's instrument.
 * Throws `CoilproofError` `unknown-reference` naming the field of what is not registered.
 */
export async function resolveRequest(
  { evidence: sent, ...request }: SentRequest,
  desk: UnitDesk,
): Promise<{ request: ApprovalRequest; references: readonly Reference[] }> {
  const { registry } = desk;
  const part = await resolvePart(request.part, registry);
  const swept = await resolvePulses(sent, desk);
  const evidence = await resolveRigs(await resolveLots(swept, part.part, desk), registry);
  const { body, references } = await resolveMaterials(
    { ...request, part: part.part, ...(evidence.evidence && { evidence: evidence.evidence }) },
    registry,
  );
  return { request: body, references: [...part.references, ...evidence.references, ...references] };
}

async function resolvePart(part: Part, registry: Registry): Promise<{ part: Part; references: Reference[] }> {
  if (part.drawing || part.construction) return { part, references: [] };
  const id = partId(part.number, part.revision);
  const stored = await registry.get('part', id);
  if (!stored)
    throw missing(
      '/part',
      `no part ${part.number} revision ${part.revision} is registered: register it, or send drawing and construction`,
    );
  return { part: stored.value, references: [{ pointer: '/part', kind: 'part', id, tag: stored.tag }] };
}

async function resolvePulses(evidence: SentRequest['evidence'], desk: UnitDesk): Promise<Evidence | undefined> {
  if (!evidence) return undefined;
  const { units, ...rest } = evidence;
  if (!units) return rest;
  return {
    ...rest,
    units: await Promise.all(
      units.map((unit, index) => withinAsync(`/evidence/units/${index}`, sweptUnit(desk, unit))),
    ),
  };
}

async function resolveLots(
  evidence: Evidence | undefined,
  part: Part,
  { registry, units }: UnitDesk,
): Promise<Evidence | undefined> {
  if (!evidence?.lots) return evidence;
  const lotSummaries = await Promise.all(
    evidence.lots.map(async (id, index) => {
      const pointer = `/evidence/lots/${index}`;
      const stored = await registry.get('lot', id);
      if (!stored) throw missing(pointer, `no lot ${id} is registered`);
      const of = stored.value.part;
      if (of.number !== part.number || of.revision !== part.revision) {
        throw missing(
          pointer,
          `lot ${id} is one of ${of.number} revision ${of.revision}, not of ${part.number} revision ${part.revision}`,
        );
      }
      const { yardstick } = await lotUnderTest(registry, id);
      return summariseLot(id, await units.counts(id), await units.rollups([id]), yardstick);
    }),
  );
  return { ...evidence, lotSummaries };
}

async function resolveRigs(evidence: Evidence | undefined, registry: Registry) {
  const references: Reference[] = [];
  if (!evidence?.units) return { evidence, references };
  const units: Unit[] = [];
  for (const [index, unit] of evidence.units.entries()) {
    if (unit.rig === undefined) {
      units.push(unit);
      continue;
    }
    const pointer = `/evidence/units/${index}/rig`;
    const stored = await registry.get('rig', unit.rig);
    if (!stored) throw missing(pointer, `no rig ${unit.rig} is registered`);
    references.push({ pointer, kind: 'rig', id: unit.rig, tag: stored.tag });
    units.push(onRig(unit, stored.value));
  }
  return { evidence: { ...evidence, units }, references };
}

const missing = (pointer: string, detail: string) =>
  new CoilproofError('unknown-reference', detail, [{ pointer, detail }]);
