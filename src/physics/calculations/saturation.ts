import type { Cored } from '../characteristics/cored.ts';
import { coredSaturation, type Saturation, type SaturationQuestion } from '../saturation.ts';
import { type Calculation, numbersOf } from './calculation.ts';

export interface SaturationRequest extends SaturationQuestion {
  readonly coil: Cored;
}

/** Where a cored coil saturates. */
export const saturation: Calculation<SaturationRequest, Saturation> = {
  calculate: ({ coil, ...question }) => coredSaturation(coil, question),
  mainOutputs: ({ dropCurrent_A, fluxLimitCurrent_A, energyAtFluxLimit, fluxDensity_T, currentMargin }) =>
    numbersOf({ dropCurrent_A, fluxLimitCurrent_A, ...energyAtFluxLimit, fluxDensity_T, currentMargin }),
};
