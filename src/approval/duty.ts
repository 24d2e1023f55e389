import type { Path } from '../physics/transients/path.ts';

/** What a place of use asks of a part. */
export interface Duty {
  readonly peakCurrent_A: number;
  readonly rmsCurrent_A?: number;
  readonly rippleCurrent_A?: number;
  readonly frequency_Hz?: number;
  readonly ambient_degC?: number;
  readonly coreTemperature_degC?: number;
  readonly required?: {
    readonly inductanceAtPeak_H?: number;
    readonly storedEnergy_J?: number;
    /** how far below saturation the flux density must stay, as a fraction of the saturation flux density */
    readonly fluxMargin?: number;
  };
  readonly interruption?: {
    readonly path: Path;
    readonly source_V?: number;
    readonly voltageLimit_V?: number;
    readonly timeLimit_s?: number;
    readonly safeCurrent_A?: number;
    readonly pathEnergyLimit_J?: number;
  };
  readonly strayField?: { readonly distance_m: number; readonly limit_T: number };
  readonly hotspotLimit_degC?: number;
  readonly evidence?: { readonly minimumUnits?: number; readonly minimumCpk?: number };
  /** accepted probability of a wrong decision; absent: 0.05 */
  readonly risk?: number;
}
