import type { FluxCharacteristic } from '../characteristic.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';

/** An inductance that was given as a number: the caller's own, so its model error is not ours to state. */
const GIVEN_INDUCTANCE: Method = {
  name: 'constant inductance, as given',
  references: [],
  relativeError: 0,
  validity: 'the inductance does not depend on current',
};

/**
 * The flux characteristic λ = L·i of an inductor that does not saturate: an air coil, or an inductance given as a number in H.
 * `method` says how the inductance was obtained and is carried as it is.
 *
 * Energy and co-energy are both ½·L·i², formed as ½·i·(L·i) so that they overflow or underflow only where the result does.
 * Throws `InvalidQuantity('/inductance_H')` where the inductance is not positive and finite.
 *
 * | quantity | domain | worst relative error | against |
 * |---|---|---|---|
 * | all | 1e-30 to 1e30 H and A | 4e-16 | exact products |
 */
export function linearCharacteristic(inductance_H: number, method: Method = GIVEN_INDUCTANCE): FluxCharacteristic {
  if (!(inductance_H > 0 && Number.isFinite(inductance_H))) {
    throw new InvalidQuantity('/inductance_H', `an inductance is positive and finite, not ${inductance_H} H`);
  }
  const energy_J = (current_A: number) => (current_A / 2) * (inductance_H * current_A);
  return {
    kind: 'linear',
    maximumCurrent_A: Number.POSITIVE_INFINITY,
    method,
    fluxLinkage_Wb: (current_A) => inductance_H * current_A,
    differentialInductance_H: () => inductance_H,
    apparentInductance_H: () => inductance_H,
    energy_J,
    coenergy_J: energy_J,
    current_A: (fluxLinkage_Wb) => fluxLinkage_Wb / inductance_H,
  };
}
