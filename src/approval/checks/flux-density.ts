import { inWords } from '../../evidence/wording.ts';
import { methodAt } from '../../physics/characteristic.ts';
import { within } from '../../physics/invalid-quantity.ts';
import { fluxDensityInSmallestSection_T, saturationFluxDensity_T } from '../../physics/saturation.ts';
import type { Check } from '../check.ts';
import { COIL_LEVERS, COIL_POINTER, constructionCharacteristic, coreAt, observed } from '../construction.ts';

/** Does the smallest core section stay below its saturation flux density, by the duty's margin, at peak current and hot? */
export const fluxDensity: Check = {
  name: 'flux-density',
  levers: [...COIL_LEVERS, '/duty/peakCurrent_A', '/duty/required/fluxMargin'],
  observe({ part: { construction }, duty }) {
    const coil = construction?.coil;
    if (!construction || coil?.shape !== 'cored') return [];
    const temperature = duty.coreTemperature_degC;
    const saturation_T = within(COIL_POINTER, () => saturationFluxDensity_T(coil, temperature));
    if (saturation_T === null) return [];
    const characteristic = constructionCharacteristic(construction, temperature);
    const value = within(COIL_POINTER, () => fluxDensityInSmallestSection_T(coil, duty.peakCurrent_A, temperature));
    return [
      {
        what: `Flux density in the smallest core section at ${inWords(duty.peakCurrent_A, 'A')}${coreAt(temperature)}`,
        unit: 'T',
        limit: { upper: saturation_T * (1 - (duty.required?.fluxMargin ?? 0)) },
        ...observed(value, methodAt(characteristic, duty.peakCurrent_A)),
      },
    ];
  },
};
