import { energyDensity as densityOf, type EnergyDensity, type EnergyDensityQuestion } from '../energy-density.ts';
import { type Calculation, numbersOf } from './calculation.ts';

/** Energy density and pressure of a magnetic field. */
export const energyDensity: Calculation<EnergyDensityQuestion, EnergyDensity> = {
  calculate: densityOf,
  mainOutputs: ({ method, ...numbers }) => numbersOf(numbers),
};
