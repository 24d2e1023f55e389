import { within } from '../../physics/invalid-quantity.ts';
import { coredSaturation } from '../../physics/saturation.ts';
import type { Check } from '../check.ts';
import { COIL_LEVERS, coreAt, observed } from '../construction.ts';

/** Could the core hold the duty's energy before its smallest section reaches saturation, whatever the current? */
export const coreEnergyCapacity: Check = {
  name: 'core-energy-capacity',
  levers: [...COIL_LEVERS, '/duty/required/storedEnergy_J'],
  observe({ part: { construction }, duty }) {
    const coil = construction?.coil;
    const lower = duty.required?.storedEnergy_J;
    if (!construction || coil?.shape !== 'cored' || lower === undefined) return [];
    const temperature = duty.coreTemperature_degC;
    const { energyAtFluxLimit, method } = within('/part/construction', () =>
      coredSaturation(coil, { ...(temperature !== undefined && { temperature_degC: temperature }) }),
    );
    if (energyAtFluxLimit === null) return [];
    return [
      {
        what: `Energy that core and gap hold at the flux limit${coreAt(temperature)}`,
        unit: 'J',
        limit: { lower },
        ...observed(energyAtFluxLimit.total_J, method),
      },
    ];
  },
};
