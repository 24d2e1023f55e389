import type { FastifyInstance } from 'fastify';
import { z } from 'zod';
import { resolveMaterials } from '../../../approval/references.ts';
import { partId, type Registry } from '../../../approval/registry.ts';
import { CoilproofError } from '../../../errors.ts';
import { PartSchema } from '../../schemas/approval-request.ts';
import { InlineMaterialSchema } from '../../schemas/core.ts';
import { LotSchema, RigSchema } from '../../schemas/registry.ts';
import { identifier, text } from '../../schemas/text.ts';
import { LotParams } from '../lots/parameters.ts';
import { documentRoutes, putDocument } from './document.ts';
import { EXAMPLE_LOT, EXAMPLE_MATERIAL, EXAMPLE_PART, EXAMPLE_RIG } from './examples.ts';
import { listParts } from './list-parts.ts';

const ById = z.object({ id: identifier.meta({ examples: ['example-1'] }) });

/** Materials, rigs, parts and lots under /v1. */
export function registry(app: FastifyInstance, store: Registry): void {
  documentRoutes(app, store, {
    kind: 'material',
    path: '/v1/materials/:id',
    name: 'Material',
    params: ById,
    idOf: ({ id }) => id,
    body: InlineMaterialSchema,
    answer: InlineMaterialSchema,
    toValue: (_params, body) => body,
    examples: [EXAMPLE_MATERIAL],
  });
  documentRoutes(app, store, {
    kind: 'rig',
    path: '/v1/rigs/:id',
    name: 'Rig',
    params: ById,
    idOf: ({ id }) => id,
    body: RigSchema,
    answer: RigSchema,
    toValue: (_params, body) => body,
    examples: [EXAMPLE_RIG],
  });
  documentRoutes(app, store, {
    kind: 'part',
    path: '/v1/parts/:number/revisions/:revision',
    name: 'Part',
    params: z.object({
      number: text(100).meta({ examples: ['LG-DC-104'] }),
      revision: text(40).meta({ examples: ['C'] }),
    }),
    idOf: ({ number, revision }) => partId(number, revision),
    body: PartSchema.omit({ number: true, revision: true }),
    answer: PartSchema,
    toValue: ({ number, revision }, body) => ({ number, revision, ...body }),
    examples: [EXAMPLE_PART],
    beforePut: async (part) => {
      await resolveMaterials(part, store);
    },
    mayReplace: ({ number, revision }) => {
      throw new CoilproofError(
        'conflict',
        `Revision ${revision} of part ${number} is released and does not change; release another revision.`,
      );
    },
  });
  putDocument(app, store, {
    kind: 'lot',
    path: '/v1/lots/:lot',
    name: 'Lot',
    params: LotParams,
    idOf: ({ lot }) => lot,
    body: LotSchema,
    answer: LotSchema,
    toValue: (_params, body) => body,
    examples: [EXAMPLE_LOT],
    beforePut: async ({ part }) => {
      if (await store.get('part', partId(part.number, part.revision))) return;
      const detail = `no part ${part.number} revision ${part.revision} is registered`;
      throw new CoilproofError('unknown-reference', detail, [{ pointer: '/part', detail }]);
    },
    mayReplace: (stored, value) => {
      if (partId(stored.part.number, stored.part.revision) === partId(value.part.number, value.part.revision)) return;
      throw new CoilproofError(
        'conflict',
        `The lot is one of ${stored.part.number} revision ${stored.part.revision}, and its units are judged by that drawing.`,
      );
    },
  });
  listParts(app, store);
}
