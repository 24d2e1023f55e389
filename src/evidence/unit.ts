import type { Sweep } from '../physics/characteristics/measured.ts';
import type { Instrument } from './instrument.ts';

/** One measured unit as a rig sends it. */
export interface Unit {
  readonly serial: string;
  /** ISO 8601 with an offset. */
  readonly measuredAt: string;
  readonly instrument: Instrument;
  /** of the part while it was measured; absent: at the temperature that the drawing names */
  readonly temperature_degC?: number;
  readonly resistance_ohm?: number;
  readonly sweep: Sweep;
}
