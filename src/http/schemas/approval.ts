import { z } from 'zod';
import type { Approval } from '../../approval/approval.ts';
import { CHECK_NAMES } from '../../approval/check.ts';
import { DutySchema, PartSchema, UnitSchema } from './approval-request.ts';
import { CautionSchema, MethodSchema } from './method.ts';
import { UncertaintyMap } from './uncertainty.ts';

export const VerdictSchema = z.enum(['approve', 'reject', 'refer']);

const judgement = {
  outcome: z.enum(['pass', 'fail', 'inconclusive']),
  observed: z
    .object({ value: z.number(), unit: z.string(), standardUncertainty: z.number() })
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
    units: z
      .array(z.object({ serial: z.string().exactOptional(), ...judgement }))
      .exactOptional()
      .meta({ description: 'each measured unit; the check itself answers with the most adverse' }),
  })
  .meta({ id: 'Check' });

export const ApprovalSchema = z
  .object({
    id: z.string(),
    verdict: VerdictSchema,
    reasons: z.array(z.string()),
    part: PartSchema,
    duty: DutySchema,
    evidence: z.object({ units: z.array(UnitSchema).exactOptional() }).exactOptional(),
    uncertainty: UncertaintyMap.exactOptional(),
    checks: z.array(CheckSchema),
    cautions: z.array(CautionSchema),
    engine: z.object({ version: z.string() }),
    digests: z
      .object({ input: z.string(), record: z.string(), previous: z.string().nullable() })
      .meta({ description: 'SHA-256 over canonical JSON (RFC 8785); previous is the record digest of the approval before' }),
    recordedAt: z.string(),
  })
  .meta({ id: 'Approval', description: 'a recorded decision' }) satisfies z.ZodType<unknown, Approval>;
