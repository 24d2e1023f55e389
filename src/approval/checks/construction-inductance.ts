import type { Check } from '../check.ts';
import { constructionCharacteristic, modelUncertainty } from '../construction.ts';
import { inWords } from '../wording.ts';

/** Does the construction give the inductance on the drawing? Small-signal, hence the differential inductance at the test current. */
export const constructionInductance: Check = {
  name: 'construction-inductance',
  observe({ part: { drawing, construction } }) {
    if (!drawing || !construction) return [];
    const { lower_H, upper_H, testCurrent_A = 0 } = drawing.inductance;
    const characteristic = constructionCharacteristic(construction);
    const value = characteristic.differentialInductance_H(testCurrent_A);
    return [
      {
        what: `Inductance of the construction at ${inWords(testCurrent_A, 'A')}`,
        unit: 'H',
        limit: { lower: lower_H, upper: upper_H },
        value,
        standardUncertainty: modelUncertainty(value, characteristic.method),
        method: characteristic.method,
      },
    ];
  },
};
