import type { Readable } from 'node:stream';
import type { FastifyInstance } from 'fastify';
import { validatorCompiler, type ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import {
  type LotUnderTest,
  lotUnderTest,
  type MeasuredAnswer,
  measure,
  type UnitDesk,
} from '../../../approval/measuring.ts';
import { CoilproofError } from '../../../errors.ts';
import type { SentUnit } from '../../../evidence/unit.ts';
import { ndjsonAnswers, started } from '../../bulk/answers.ts';
import { type BulkLine, inPlace, isProblem } from '../../bulk/bulk-line.ts';
import { csvUnits } from '../../bulk/csv.ts';
import { inOrder } from '../../bulk/in-order.ts';
import { ndjsonLines } from '../../bulk/ndjson.ts';
import { BODY_PROBLEMS, operation } from '../../operation.ts';
import { problemBody } from '../../problems.ts';
import { fieldErrors, type SchemaIssue, summarise } from '../../schema-issues.ts';
import { UnitSchema } from '../../schemas/approval-request.ts';
import { JudgedUnitSchema } from '../../schemas/judged-unit.ts';
import { PULSE_BODY_BYTES } from '../../schemas/pulse.ts';
import { A_DAY_MS } from '../../streams.ts';
import { EXAMPLE_UNIT, LotParams } from './parameters.ts';

const NDJSON = 'application/x-ndjson';
const CSV = 'text/csv';

/** Units that share a transaction in bulk; a rig that sends slowly waits for its answers no longer than this, in ms. */
const BATCH = { batchSize: 500, maxWait: 50, maxWeight: 4 * 1024 * 1024, weightOf: ({ bytes }: BulkLine) => bytes };

const Answer = JudgedUnitSchema.extend({ status: z.enum(['recorded', 'repeated']) }).meta({ id: 'MeasuredUnit' });

/** POST /v1/lots/{lot}/units: one unit as JSON, or any number as NDJSON or CSV, streamed both ways. */
export function postUnits(app: FastifyInstance, desk: UnitDesk): void {
  app.addContentTypeParser([NDJSON, CSV], (_request, body, done) => done(null, body));
  app.withTypeProvider<ZodTypeProvider>().post(
    '/v1/lots/:lot/units',
    {
      // The handler may take as long as the rig sends.
      validatorCompiler: validateUnlessStream as never,
      handlerTimeout: A_DAY_MS,
      bodyLimit: PULSE_BODY_BYTES,
      schema: {
        ...operation({
          operationId: 'postUnits',
          summary: 'Judge and record measured units of a lot',
          description:
            'One unit as application/json; many as application/x-ndjson (a unit a line) or text/csv (a row a reading, header names with units, such as `serial, measured at, rig, current [A], inductance [µH]`). Bulk is answered as NDJSON, a line a unit in order, streamed: `{line, status: recorded | repeated | refused, …}`; a refused unit carries its problem and the rest go on. Safe to repeat: (lot, serial, measuredAt) is the key; the same content answers as before, another content is a conflict.',
          tag: 'evidence',
          scope: 'measure',
          success: { 200: Answer, 201: Answer },
          problems: [...BODY_PROBLEMS, 'not-found', 'invalid-parameter', 'unknown-reference', 'conflict'],
        }),
        consumes: ['application/json', NDJSON, CSV],
        params: LotParams,
        body: UnitSchema.meta({ examples: [EXAMPLE_UNIT] }),
      },
    },
    async (request, reply) => {
      const lot = await lotUnderTest(desk.registry, request.params.lot);
      const mediaType = request.headers['content-type']?.split(';', 1)[0]?.trim().toLowerCase();
      if (mediaType === NDJSON || mediaType === CSV) {
        const source = request.body as unknown as Readable;
        const lines = mediaType === NDJSON ? ndjsonLines(source, { lineBytes: PULSE_BODY_BYTES }) : csvUnits(source);
        const answers = await started(inOrder(lines, (batch) => answerBatch(desk, lot, batch, request.id), BATCH));
        return reply.type(NDJSON).send(ndjsonAnswers(answers) as never);
      }
      const [answer] = await measure(desk, lot, [request.body]);
      if (!answer || 'problem' in answer) throw answer?.problem ?? new CoilproofError('internal', 'no answer');
      return reply.code(answer.status === 'recorded' ? 201 : 200).send({ status: answer.status, ...answer.judged });
    },
  );
}

/** A streamed body is read line by line, long after validation. */
function validateUnlessStream(route: Parameters<typeof validatorCompiler>[0]) {
  const validate = validatorCompiler(route);
  return (data: unknown) =>
    typeof (data as { pipe?: unknown } | null)?.pipe === 'function' ? { value: data } : validate(data);
}

/** Answers a batch of lines in their order: what could not be read or does not fit the schema, and what became of the rest. */
async function answerBatch(
  desk: UnitDesk,
  lot: LotUnderTest,
  batch: readonly BulkLine[],
  requestId: string,
): Promise<object[]> {
  const parsed = batch.map((item) => (isProblem(item) ? item : parseUnit(item)));
  const units = parsed.flatMap((item) => ('unit' in item ? [item.unit] : []));
  const measured = (await measure(desk, lot, units)).values();
  return batch.map((item, index) => {
    const read = parsed[index]!;
    const answer: MeasuredAnswer = 'unit' in read ? measured.next().value! : { problem: read.problem };
    if (!('problem' in answer)) return { line: item.line, status: answer.status, ...answer.judged };
    const serial = 'unit' in read ? read.unit.serial : 'serial' in read ? read.serial : undefined;
    const problem = isProblem(item) ? answer.problem : inPlace(item, answer.problem);
    return {
      line: item.line,
      status: 'refused',
      ...(serial !== undefined && { serial }),
      problem: problemBody(problem, requestId),
    };
  });
}

function parseUnit({
  value,
}: {
  readonly value: unknown;
}): { readonly unit: SentUnit } | { readonly problem: CoilproofError } {
  const parsed = UnitSchema.safeParse(value);
  if (parsed.success) return { unit: parsed.data };
  const fields = fieldErrors(parsed.error.issues as unknown as SchemaIssue[], value);
  return { problem: new CoilproofError('invalid-body', summarise(fields), fields) };
}
