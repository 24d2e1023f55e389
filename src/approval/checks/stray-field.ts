import { inWords } from '../../evidence/wording.ts';
import { fieldMethod, isFieldCoil, worstFieldAtDistance } from '../../physics/fields/field.ts';
import { within } from '../../physics/invalid-quantity.ts';
import type { Check } from '../check.ts';
import { COIL_POINTER, observed } from '../construction.ts';

/** Does the field stay below the limit at the duty's distance, in the worst direction, at peak current? */
export const strayField: Check = {
  name: 'stray-field',
  levers: [
    '/part/construction/coil/turns',
    '/duty/peakCurrent_A',
    '/duty/strayField/distance_m',
    '/duty/strayField/limit_T',
  ],
  observe({ part: { construction }, duty: { strayField: place, peakCurrent_A } }) {
    if (!place || !construction) return [];
    const { coil } = construction;
    const common = {
      what: `Largest flux density ${inWords(place.distance_m, 'm')} from the coil's centre at ${inWords(peakCurrent_A, 'A')}`,
      unit: 'T',
      limit: { upper: place.limit_T },
    };
    if (!isFieldCoil(coil)) {
      const method = {
        name: 'none',
        references: [],
        relativeError: 1,
        validity: 'round loops, solenoids and multilayer coils in free space',
      };
      return [
        {
          ...common,
          method,
          undecided: `the stray field of a ${construction.coil.shape} winding is not calculated here`,
        },
      ];
    }
    const method = within(COIL_POINTER, () => fieldMethod(coil));
    const { magnitude_T } = within('/duty/strayField', () =>
      worstFieldAtDistance(coil, peakCurrent_A, place.distance_m),
    );
    return [{ ...common, ...observed(magnitude_T, method) }];
  },
};
