import { type FluxCharacteristic, methodAt } from './characteristic.ts';
import type { Method } from './method.ts';

/** What an inductor holds at a current, and what the linear estimate would have made of it. */
export interface EnergyQuantities {
  /** ∫ i dλ */
  readonly energy_J: number;
  /** ∫ λ di; energy + co-energy = i·λ */
  readonly coenergy_J: number;
  readonly fluxLinkage_Wb: number;
  readonly apparentInductance_H: number;
  readonly differentialInductance_H: number;
  /** ½·L₀·i² with L₀ the inductance at zero current */
  readonly linearEstimate_J: number;
  /** (linear estimate − energy)/energy; 0 at zero current, its limit */
  readonly linearEstimateError: number;
  readonly method: Method;
}

/**
 * The energy of any flux characteristic at `current_A`, with its companions.
 * Throws `InvalidQuantity` (pointer '') beyond the characteristic's largest current.
 */
export function energyQuantities(characteristic: FluxCharacteristic, current_A: number): EnergyQuantities {
  const energy_J = characteristic.energy_J(current_A);
  const linearEstimate_J = (current_A / 2) * (characteristic.differentialInductance_H(0) * current_A);
  return {
    energy_J,
    coenergy_J: characteristic.coenergy_J(current_A),
    fluxLinkage_Wb: characteristic.fluxLinkage_Wb(current_A),
    apparentInductance_H: characteristic.apparentInductance_H(current_A),
    differentialInductance_H: characteristic.differentialInductance_H(current_A),
    linearEstimate_J,
    linearEstimateError: energy_J > 0 ? (linearEstimate_J - energy_J) / energy_J : 0,
    method: methodAt(characteristic, current_A),
  };
}
