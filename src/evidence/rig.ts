import type { Instrument } from './instrument.ts';

/** A test rig: what its instrument cannot know, and until when its calibration holds. */
export interface Rig {
  readonly description?: string;
  readonly instrument: Instrument;
  /** ISO 8601 date; readings of a later day are out of calibration */
  readonly calibrationDue: string;
}
