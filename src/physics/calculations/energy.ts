import { type EnergyQuantities, energyQuantities } from '../energy.ts';
import { type Inductor, inductorCharacteristic } from '../inductor.ts';
import { within } from '../invalid-quantity.ts';
import { type Calculation, numbersOf } from './calculation.ts';

export interface EnergyRequest {
  readonly inductor: Inductor;
  readonly current_A: number;
  /** of the core, where the inductor has one */
  readonly temperature_degC?: number;
}

/** What an inductor stores at a current, by ∫ i dλ along its flux characteristic. */
export const energy: Calculation<EnergyRequest, EnergyQuantities> = {
  calculate({ inductor, current_A, temperature_degC }) {
    const characteristic = within('/inductor', () => inductorCharacteristic(inductor, temperature_degC));
    return within('/current_A', () => energyQuantities(characteristic, current_A));
  },
  mainOutputs: ({ method, ...numbers }) => numbersOf(numbers),
};
