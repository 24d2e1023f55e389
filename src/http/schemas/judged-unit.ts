import { z } from 'zod';
import { type JudgedUnit, UNIT_QUANTITIES } from '../../evidence/judged-unit.ts';
import { judgement } from './approval.ts';
import { list } from './list.ts';

const { outcome, ...undecided } = judgement;

export const OutcomeSchema = outcome;

export const JudgedUnitSchema = z
  .object({
    serial: z.string(),
    measuredAt: z.string(),
    rig: z.string().exactOptional(),
    outcome,
    outOfCalibration: z.literal(true).exactOptional(),
    quantities: list(
      z.object({
        quantity: z.enum(UNIT_QUANTITIES),
        outcome: outcome.exactOptional().meta({ description: 'absent where the drawing has no limit' }),
        ...undecided,
      }),
    ),
  })
  .meta({ id: 'JudgedUnit', description: 'a unit as its drawing judges it' }) satisfies z.ZodType<unknown, JudgedUnit>;
