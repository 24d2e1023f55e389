import { Readable } from 'node:stream';
import { setTimeout as delay } from 'node:timers/promises';
import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import { lotUnderTest, type UnitDesk } from '../../../approval/measuring.ts';
import { CoilproofError } from '../../../errors.ts';
import { operation } from '../../operation.ts';
import { A_DAY_MS } from '../../streams.ts';
import { LotParams } from './parameters.ts';

/** How often the store is asked for new units, in ms: any process's, which no notification inside this one would tell of. */
const POLL_MS = 250;
/** A comment goes out after this long without a unit, in ms, so that proxies keep the connection and a gone client is noticed. */
const KEEP_ALIVE_MS = 15_000;
const PAGE = 200;

const Headers = z.object({
  'last-event-id': z
    .string()
    .regex(/^\d{1,15}$/, 'an id that this stream gave out')
    .exactOptional()
    .meta({ description: 'the last event that the caller has; absent: only units recorded from now on' }),
});

/** GET /v1/lots/{lot}/events: server-sent events, one a unit, in the order of recording; event ids are positions in that order. */
export function lotEvents(app: FastifyInstance, desk: UnitDesk): void {
  const closing = new AbortController();
  app.addHook('preClose', async () => closing.abort());
  app.withTypeProvider<ZodTypeProvider>().get(
    '/v1/lots/:lot/events',
    {
      handlerTimeout: A_DAY_MS,
      schema: {
        ...operation({
          operationId: 'streamLotEvents',
          summary: 'Outcomes of units as they are recorded, as server-sent events',
          description:
            'text/event-stream. event: unit; id: for Last-Event-ID; data: {serial, measuredAt, rig, outcome}.',
          tag: 'evidence',
          scope: 'read',
          success: { 200: z.string() },
          problems: ['not-found', 'invalid-parameter', 'unknown-reference', 'overloaded', 'internal'],
        }),
        params: LotParams,
        headers: Headers,
      },
    },
    async (request, reply) => {
      const { id } = await lotUnderTest(desk.registry, request.params.lot);
      const lastEventId = request.headers['last-event-id'];
      const from = lastEventId === undefined ? await desk.units.lastPosition(id) : Number(lastEventId);
      if (closing.signal.aborted) throw new CoilproofError('not-ready', 'The service is shutting down.');
      const gone = new AbortController();
      reply.raw.on('close', () => gone.abort());
      const stream = Readable.from(events(desk, id, from, AbortSignal.any([closing.signal, gone.signal])), {
        objectMode: false,
      });
      return reply
        .type('text/event-stream')
        .header('cache-control', 'no-store')
        .send(stream as never);
    },
  );
}

async function* events({ units }: UnitDesk, lot: string, from: number, signal: AbortSignal): AsyncGenerator<string> {
  yield 'retry: 2000\n\n';
  let after = from;
  let quietSince = Date.now();
  while (!signal.aborted) {
    const page = await units.list(lot, { after, limit: PAGE });
    for (const { position, judged } of page) {
      const { serial, measuredAt, rig, outcome } = judged;
      yield `id: ${position}\nevent: unit\ndata: ${JSON.stringify({ serial, measuredAt, rig, outcome })}\n\n`;
      after = position;
      quietSince = Date.now();
    }
    if (page.length === PAGE) continue;
    if (Date.now() - quietSince > KEEP_ALIVE_MS) {
      yield ': still here\n\n';
      quietSince = Date.now();
    }
    await delay(POLL_MS, undefined, { signal }).catch(() => undefined);
  }
}
