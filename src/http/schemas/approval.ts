import { z } from 'zod';
import type { Approval } from '../../approval/approval.ts';
import { CHECK_NAMES } from '../../approval/check.ts';
import { UNIT_QUANTITIES } from '../../evidence/judged-unit.ts';
import { DutySchema, PartSchema, RecordedUnitSchema } from './approval-request.ts';
import { list } from './list.ts';
import { CautionSchema, MethodSchema } from './method.ts';
import { UncertaintyMap } from './uncertainty.ts';

export const VerdictSchema = z.enum(['approve', 'reject', 'refer']);

/** What every judgement answers with. */
export const judgement = {
  outcome: z.enum(['pass', 'fail', 'inconclusive']),
  observed: z
    .object({
      value: z.number(),
      unit: z.string(),
      standardUncertainty: z.number(),
      atLeast: z.boolean().exactOptional(),
    })
    .exactOptional()
    .meta({ description: 'absent where the quantity could not be had; detail says why' }),
  limit: z.object({ lower: z.number().exactOptional(), upper: z.number().exactOptional() }),
  margin: z
    .number()
    .exactOptional()
    .meta({ description: 'distance from the observed value to the nearest limit, in its unit; positive inside' }),
  conformanceProbability: z.number().exactOptional(),
  method: MethodSchema,
  detail: z.string(),
};

export const CheckSchema = z
  .object({
    check: z.enum(CHECK_NAMES),
    ...judgement,
    relief: list(
      z.object({
        pointer: z.string(),
        from: z.number(),
        to: z.number().nullable(),
        reason: z.string().exactOptional(),
      }),
    )
      .exactOptional()
      .meta({
        description:
          'on what did not pass: for each input, the smallest change of it alone that makes the check pass; to is null, with a reason, where no value does',
      }),
    units: list(
      z.object({
        serial: z.string().exactOptional().meta({ description: 'of the unit; of a lot, its id and the quantity' }),
        ...judgement,
      }),
    )
      .exactOptional()
      .meta({ description: 'each measured unit; the check itself answers with the most adverse' }),
  })
  .meta({ id: 'Check' });

const LotSummarySchema = z.object({
  lot: z.string(),
  counts: z.object({ pass: z.int(), inconclusive: z.int(), fail: z.int(), outOfCalibration: z.int() }),
  quantities: list(
    z.object({
      quantity: z.enum(UNIT_QUANTITIES),
      limit: judgement.limit,
      n: z.int(),
      mean: z.number().exactOptional(),
      standardDeviation: z.number().exactOptional(),
    }),
  ),
});

export const ApprovalSchema = z
  .object({
    id: z.string(),
    verdict: VerdictSchema,
    reasons: list(z.string()),
    part: PartSchema,
    duty: DutySchema,
    evidence: z
      .object({
        lots: list(z.string()).exactOptional(),
        lotSummaries: list(LotSummarySchema)
          .exactOptional()
          .meta({ description: 'what the lots came to when they were looked up' }),
        units: list(RecordedUnitSchema).exactOptional(),
      })
      .exactOptional(),
    uncertainty: UncertaintyMap.exactOptional(),
    checks: list(CheckSchema),
    cautions: list(CautionSchema),
    references: list(
      z.object({ pointer: z.string(), kind: z.enum(['material', 'part', 'rig']), id: z.string(), tag: z.string() }),
    ).meta({
      description:
        'what of the request stood for something registered, and its entity tag then; the record holds what it stood for',
    }),
    engine: z.object({ version: z.string() }),
    digests: z.object({ input: z.string(), record: z.string(), previous: z.string().nullable() }).meta({
      description: 'SHA-256 over canonical JSON (RFC 8785); previous is the record digest of the approval before',
    }),
    recordedAt: z.string(),
  })
  .meta({ id: 'Approval', description: 'a recorded decision' }) satisfies z.ZodType<unknown, Approval>;
