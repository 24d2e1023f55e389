import { inWords } from '../../evidence/wording.ts';
import type { Check } from '../check.ts';
import { observed, WINDING_LEVERS, windingResistanceAt } from '../construction.ts';

/** Does the winding as constructed stay below the drawing's resistance at the drawing's temperature? */
export const windingResistance: Check = {
  name: 'winding-resistance',
  levers: [...WINDING_LEVERS, '/part/drawing/resistance/upper_ohm'],
  observe({ part: { drawing, construction } }) {
    const winding = construction?.winding;
    if (!drawing?.resistance || !winding) return [];
    const { upper_ohm, temperature_degC } = drawing.resistance;
    const { resistance_ohm, method } = windingResistanceAt(
      winding,
      temperature_degC,
      '/part/drawing/resistance/temperature_degC',
    );
    return [
      {
        what: `Winding resistance at ${inWords(temperature_degC, '°C')}`,
        unit: 'Ω',
        limit: { upper: upper_ohm },
        ...observed(resistance_ohm, method),
      },
    ];
  },
};
