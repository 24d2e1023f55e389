import { inWords } from '../../evidence/wording.ts';
import { methodAt } from '../../physics/characteristic.ts';
import type { Check } from '../check.ts';
import { COIL_LEVERS, constructionCharacteristic, coreAt, observed } from '../construction.ts';

/** Does the part store the energy that the duty needs at its peak current? By ∫ i dλ, not ½LI². */
export const storedEnergy: Check = {
  name: 'stored-energy',
  levers: [...COIL_LEVERS, '/duty/peakCurrent_A', '/duty/required/storedEnergy_J'],
  observe({ part: { construction }, duty }) {
    const lower = duty.required?.storedEnergy_J;
    if (lower === undefined || !construction) return [];
    const characteristic = constructionCharacteristic(construction, duty.coreTemperature_degC);
    return [
      {
        what: `Stored energy at ${inWords(duty.peakCurrent_A, 'A')}${coreAt(duty.coreTemperature_degC)}`,
        unit: 'J',
        limit: { lower },
        ...observed(characteristic.energy_J(duty.peakCurrent_A), methodAt(characteristic, duty.peakCurrent_A)),
      },
    ];
  },
};
