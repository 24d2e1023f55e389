import { inWords, percent } from '../../evidence/wording.ts';
import { methodAt } from '../../physics/characteristic.ts';
import { dropCurrent_A } from '../../physics/saturation.ts';
import type { Check } from '../check.ts';
import { COIL_LEVERS, constructionCharacteristic, observed } from '../construction.ts';

/** Does the construction carry the drawing's current before its differential inductance has dropped by the drawing's share? */
export const saturationCurrent: Check = {
  name: 'saturation-current',
  levers: [...COIL_LEVERS, '/part/drawing/saturation/current_A', '/part/drawing/saturation/inductanceDrop'],
  observe({ part: { drawing, construction } }) {
    if (!drawing?.saturation || !construction) return [];
    const { current_A, inductanceDrop, temperature_degC } = drawing.saturation;
    const characteristic = constructionCharacteristic(construction, temperature_degC);
    const value = dropCurrent_A(characteristic, inductanceDrop);
    const common = {
      what: `Current for an inductance drop of ${percent(inductanceDrop)} at ${inWords(temperature_degC, '°C')}`,
      unit: 'A',
      limit: { lower: current_A },
      method: characteristic.method,
    };
    if (value === null) return [{ ...common, metBecause: `the inductance never drops by ${percent(inductanceDrop)}` }];
    return [{ ...common, ...observed(value, methodAt(characteristic, value)) }];
  },
};
