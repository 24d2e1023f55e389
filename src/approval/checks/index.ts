import type { Check } from '../check.ts';
import { constructionInductance } from './construction-inductance.ts';
import { coreEnergyCapacity } from './core-energy-capacity.ts';
import { fluxDensity } from './flux-density.ts';
import { inductanceAtPeak } from './inductance-at-peak.ts';
import { calibration, lotCapability } from './lots.ts';
import { measuredEnergy, measuredInductance, measuredResistance, measuredSaturation } from './measured.ts';
import { saturationCurrent } from './saturation-current.ts';
import { storedEnergy } from './stored-energy.ts';
import { strayField } from './stray-field.ts';
import { temperatureRise } from './temperature-rise.ts';
import { pathEnergy, turnOffTime, turnOffVoltage } from './turn-off.ts';
import { windingResistance } from './winding-resistance.ts';

/** Every check, in the order in which an approval lists them. */
export const CHECKS: readonly Check[] = [
  constructionInductance,
  inductanceAtPeak,
  saturationCurrent,
  fluxDensity,
  storedEnergy,
  coreEnergyCapacity,
  windingResistance,
  temperatureRise,
  turnOffVoltage,
  turnOffTime,
  pathEnergy,
  strayField,
  measuredInductance,
  measuredSaturation,
  measuredEnergy,
  measuredResistance,
  lotCapability,
  calibration,
];
