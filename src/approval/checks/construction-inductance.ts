import { inWords } from '../../evidence/wording.ts';
import type { Check } from '../check.ts';
import { COIL_LEVERS, constructionCharacteristic, observedInductance, temperatureInReach } from '../construction.ts';

/** Does the construction give the inductance on the drawing? Small-signal, hence the differential inductance at the test current. */
export const constructionInductance: Check = {
  name: 'construction-inductance',
  levers: [...COIL_LEVERS, '/part/drawing/inductance/lower_H', '/part/drawing/inductance/upper_H'],
  observe({ part: { drawing, construction } }) {
    if (!drawing || !construction) return [];
    const { lower_H, upper_H, testCurrent_A = 0 } = drawing.inductance;
    const characteristic = constructionCharacteristic(construction, temperatureInReach(construction));
    return [
      {
        what: `Inductance of the construction at ${inWords(testCurrent_A, 'A')}`,
        unit: 'H',
        limit: { lower: lower_H, upper: upper_H },
        ...observedInductance(characteristic, testCurrent_A),
      },
    ];
  },
};
