import { type CoupledInductors, coupledInductorsEnergy } from '../coupled-inductors.ts';
import { type EnergyQuantities, energyQuantities } from '../energy.ts';
import { type Inductor, inductorCharacteristic } from '../inductor.ts';
import { within } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { type Calculation, numbersOf } from './calculation.ts';

interface OneInductor {
  readonly inductor: Inductor;
  readonly current_A: number;
  /** of the core, where the inductor has one */
  readonly temperature_degC?: number;
}

export type EnergyRequest = OneInductor | CoupledInductors;

interface CoupledEnergy {
  readonly energy_J: number;
  /** of each inductor */
  readonly fluxLinkages_Wb: readonly number[];
  readonly method: Method;
}

export type EnergyAnswer = EnergyQuantities | CoupledEnergy;

const COUPLED: Method = {
  name: 'energy of coupled linear inductors, ½ iᵀ L i',
  references: ['J. C. Maxwell, A Treatise on Electricity and Magnetism (1873), art. 578 (from memory)'],
  relativeError: 0,
  validity: 'linear inductors; the matrix as it is stated',
};

/** What an inductor stores at a current, by ∫ i dλ along its flux characteristic; or several that share flux, by their matrix. */
export const energy: Calculation<EnergyRequest, EnergyAnswer> = {
  calculate(request) {
    if ('inductanceMatrix_H' in request) {
      const { energy_J, fluxLinkage_Wb } = coupledInductorsEnergy(request);
      return { energy_J, fluxLinkages_Wb: fluxLinkage_Wb, method: COUPLED };
    }
    const { inductor, current_A, temperature_degC } = request;
    const characteristic = within('/inductor', () => inductorCharacteristic(inductor, temperature_degC));
    return within('/current_A', () => energyQuantities(characteristic, current_A));
  },
  mainOutputs(answer) {
    if ('fluxLinkages_Wb' in answer) return { energy_J: answer.energy_J };
    const { method, ...numbers } = answer;
    return numbersOf(numbers);
  },
};
