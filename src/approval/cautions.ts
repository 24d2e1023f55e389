import { inWords } from '../evidence/wording.ts';

export const CAUTION_CODES = [
  'stored-energy',
  'hazardous-energy',
  'turn-off-voltage',
  'static-field',
  'hot-surface',
] as const;

/** Something that can hurt, in words; stable `code`. */
export interface Caution {
  readonly code: (typeof CAUTION_CODES)[number];
  readonly text: string;
}

/** What an answer concerns that can hurt; magnitudes. */
export interface Hazards {
  readonly storedEnergy_J?: number;
  readonly turnOffVoltage_V?: number;
  readonly fluxDensity_T?: number;
  /** Distances from the coil's centre beyond which the flux density stays below `IMPLANT_FLUX_DENSITY_T`. */
  readonly implantDistance_m?: number;
  readonly surface_degC?: number;
}

/** Hazardous energy level: IEC 60950-1, 2.1.1.5 (20 J; worded for capacitors at 2 V and more, applied to an inductor by analogy). */
export const HAZARDOUS_ENERGY_J = 20;

/** Level for implanted devices, static field: ICNIRP 2009, Health Phys. 96(4):504-514; Directive 2013/35/EU, from memory. */
export const IMPLANT_FLUX_DENSITY_T = 0.5e-3;

/** Ripple-free DC that may be touched in dry places: IEC 61140 / IEC 60364-4-41, 60 V for extra-low voltage with basic protection omitted; from memory. */
export const TOUCH_VOLTAGE_V = 60;

/** Burn threshold of smooth bare metal touched for about a second: ISO 13732-1, about 65 °C; from memory. */
export const BURN_TEMPERATURE_DEGC = 65;

const DEFER = 'Follow local codes and have the arrangement judged by a licensed practitioner.';

/** The cautions that belong beside an answer; none where nothing that it concerns can hurt. */
export function cautionsOf(hazards: Hazards): Caution[] {
  const { storedEnergy_J = 0, turnOffVoltage_V = 0, fluxDensity_T = 0, implantDistance_m, surface_degC } = hazards;
  const cautions: Caution[] = [];
  if (storedEnergy_J > 0) {
    cautions.push({
      code: 'stored-energy',
      text: `The part holds ${inWords(storedEnergy_J, 'J')}. Interrupting its current without a path raises whatever voltage it takes to drive the current on: provide a path, and let the current decay before working on it. ${DEFER}`,
    });
  }
  if (storedEnergy_J >= HAZARDOUS_ENERGY_J) {
    cautions.push({
      code: 'hazardous-energy',
      text: `${inWords(storedEnergy_J, 'J')} reaches the hazardous energy level of ${HAZARDOUS_ENERGY_J} J (IEC 60950-1, worded for capacitors, by analogy): burns and arcs are possible at any voltage. ${DEFER}`,
    });
  }
  if (turnOffVoltage_V > TOUCH_VOLTAGE_V) {
    cautions.push({
      code: 'turn-off-voltage',
      text: `Turn-off raises ${inWords(turnOffVoltage_V, 'V')}, above ${TOUCH_VOLTAGE_V} V DC (extra-low voltage, IEC 61140): insulate and guard the terminals. ${DEFER}`,
    });
  }
  if (fluxDensity_T > IMPLANT_FLUX_DENSITY_T || implantDistance_m !== undefined) {
    const where =
      implantDistance_m === undefined
        ? `The flux density of ${inWords(fluxDensity_T, 'T')} exceeds`
        : `Within ${inWords(implantDistance_m, 'm')} of the coil's centre the flux density exceeds`;
    cautions.push({
      code: 'static-field',
      text: `${where} ${inWords(IMPLANT_FLUX_DENSITY_T, 'T')}, the static level at which pacemakers and other implants may be disturbed (ICNIRP 2009); loose ferrous objects are attracted as well. ${DEFER}`,
    });
  }
  if (surface_degC !== undefined && surface_degC > BURN_TEMPERATURE_DEGC) {
    cautions.push({
      code: 'hot-surface',
      text: `The part reaches ${inWords(surface_degC, '°C')}; bare metal above about ${BURN_TEMPERATURE_DEGC} °C burns on touch (ISO 13732-1): guard it and let it cool. ${DEFER}`,
    });
  }
  return cautions;
}
