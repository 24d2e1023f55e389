import { within } from '../../physics/invalid-quantity.ts';
import { energyAtFluxLimit } from '../../physics/saturation.ts';
import type { Check } from '../check.ts';
import { COIL_POINTER, atTemperature, constructionCharacteristic, modelUncertainty } from '../construction.ts';

/** Could the core hold the duty's energy before its smallest section reaches saturation, whatever the current? */
export const coreEnergyCapacity: Check = {
  name: 'core-energy-capacity',
  observe({ part: { construction }, duty }) {
    const coil = construction?.coil;
    const lower = duty.required?.storedEnergy_J;
    if (!construction || coil?.shape !== 'cored' || lower === undefined) return [];
    const temperature = duty.coreTemperature_degC;
    const capacity = within(COIL_POINTER, () => energyAtFluxLimit(coil, temperature));
    if (capacity === null) return [];
    const { method } = constructionCharacteristic(construction, temperature);
    return [
      {
        what: `Energy that core and gap hold at the flux limit${atTemperature(temperature).replace(' and', ' at')}`,
        unit: 'J',
        limit: { lower },
        value: capacity.total_J,
        standardUncertainty: modelUncertainty(capacity.total_J, method),
        method,
      },
    ];
  },
};
