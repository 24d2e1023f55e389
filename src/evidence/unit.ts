import type { Sweep } from '../physics/characteristics/measured.ts';
import type { Instrument } from './instrument.ts';
import { type Pulse, type PulseAnalysis, toSweep } from './pulse.ts';
import type { Rig } from './rig.ts';

/** One measured unit: by the id of a registered rig, or with its instrument inline. */
export interface Unit {
  readonly serial: string;
  /** ISO 8601 with an offset. */
  readonly measuredAt: string;
  readonly rig?: string;
  /** Absent until the rig's is put in its place. */
  readonly instrument?: Instrument;
  /** of the instrument; known of a registered rig */
  readonly calibrationDue?: string;
  /** of the part while it was measured; absent: at the temperature that the drawing names */
  readonly temperature_degC?: number;
  readonly resistance_ohm?: number;
  readonly sweep: Sweep;
  /** the sweep was analysed from a pulse */
  readonly fromPulse?: true;
}

/** A unit as a rig sends it: a sweep, or the raw pulse that one is analysed from. */
export type SentUnit = Omit<Unit, 'sweep' | 'fromPulse' | 'calibrationDue'> &
  ({ readonly sweep: Sweep } | { readonly pulse: Pulse });

/**
 * The unit with its pulse analysed to a sweep. The inductance that a pulse tells is as sure as the rig's voltage: λ = ∫(v − R·i) dt,
 * so a gain error of the voltage is one of the inductance.
 */
export function withSweep(unit: SentUnit, analysed: PulseAnalysis | undefined): Unit {
  if (!('pulse' in unit)) return unit;
  if (!analysed) throw new TypeError('a pulse has to be analysed first');
  const { pulse, ...rest } = unit;
  return { ...rest, sweep: toSweep(analysed), fromPulse: true };
}

/** A unit with what its registered rig says of the instrument. */
export const onRig = (unit: Unit, { instrument, calibrationDue }: Rig): Unit => ({
  ...unit,
  instrument,
  calibrationDue,
});

/** Whether the rig's calibration had run out on the day of the measurement, by the date that the rig itself wrote. */
export const isOutOfCalibration = ({ measuredAt, calibrationDue }: Unit): boolean =>
  calibrationDue !== undefined && measuredAt.slice(0, 10) > calibrationDue;
