import { inWords } from '../../evidence/wording.ts';
import type { Check } from '../check.ts';
import { COIL_LEVERS, constructionCharacteristic, coreAt, observedInductance } from '../construction.ts';

/** Does the part still hold its inductance at the duty's peak current, hot? The differential one: that is what ripple meets. */
export const inductanceAtPeak: Check = {
  name: 'inductance-at-peak',
  levers: [...COIL_LEVERS, '/duty/peakCurrent_A', '/duty/required/inductanceAtPeak_H'],
  observe({ part: { construction }, duty }) {
    const lower = duty.required?.inductanceAtPeak_H;
    if (lower === undefined || !construction) return [];
    const characteristic = constructionCharacteristic(construction, duty.coreTemperature_degC);
    return [
      {
        what: `Differential inductance at ${inWords(duty.peakCurrent_A, 'A')}${coreAt(duty.coreTemperature_degC)}`,
        unit: 'H',
        limit: { lower },
        ...observedInductance(characteristic, duty.peakCurrent_A),
      },
    ];
  },
};
