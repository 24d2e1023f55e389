import { z } from 'zod';
import { GATE_DRIVE_PARTS } from '../../../demo/gate-drive.ts';
import { identifier } from '../../schemas/text.ts';

export const LotParams = z.object({ lot: identifier.meta({ examples: ['example-1'] }) });

/** A unit of the demo's first part: the lot of the registry's example is of that part. */
export const EXAMPLE_UNIT = GATE_DRIVE_PARTS[0]!.evidence!.units![0]!;
