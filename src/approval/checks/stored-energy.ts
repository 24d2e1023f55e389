import type { Check } from '../check.ts';
import { atTemperature, constructionCharacteristic, modelUncertainty } from '../construction.ts';
import { inWords } from '../wording.ts';

/** Does the part store the energy that the duty needs at its peak current? By ∫ i dλ, not ½LI². */
export const storedEnergy: Check = {
  name: 'stored-energy',
  observe({ part: { construction }, duty }) {
    const lower = duty.required?.storedEnergy_J;
    if (lower === undefined || !construction) return [];
    const characteristic = constructionCharacteristic(construction, duty.coreTemperature_degC);
    const value = characteristic.energy_J(duty.peakCurrent_A);
    return [
      {
        what: `Stored energy at ${inWords(duty.peakCurrent_A, 'A')}${atTemperature(duty.coreTemperature_degC)}`,
        unit: 'J',
        limit: { lower },
        value,
        standardUncertainty: modelUncertainty(value, characteristic.method),
        method: characteristic.method,
      },
    ];
  },
};
