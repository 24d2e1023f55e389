import { type FluxCharacteristic, methodAt } from './characteristic.ts';
import {
  type Cored,
  type CoredCharacteristic,
  coredCharacteristic,
  type StoredEnergy,
} from './characteristics/cored.ts';
import { saturationFluxDensity_T as materialSaturation_T } from './core/material.ts';
import { InvalidQuantity, within } from './invalid-quantity.ts';
import type { Method } from './method.ts';
import { findRoot } from './numerics/roots.ts';

/** A current, or why there is none. */
export type CurrentOrReason =
  | { readonly current_A: number; readonly reason?: undefined }
  | { readonly current_A: null; readonly reason: string };

/** Powers of two above a curve's own scale up to which a drop is looked for: 2^200 is beyond every saturation. */
const DOUBLINGS = 200;

/**
 * The first current at which dλ/di has fallen by `inductanceDrop` (0 to 1) from its value at zero current, or null with the reason
 * where it never does, or not within what was measured.
 *
 * dλ/di may rise first, as of a table that starts at initial permeability, or dip and recover: it is monotone between the
 * characteristic's `slopeTurns_A`, so that the first of those at or below the level brackets the first crossing.
 *
 * Throws `InvalidQuantity('/inductanceDrop')` outside 0 to 1, both excluded.
 *
 * | characteristic | domain | worst relative error | against |
 * |---|---|---|---|
 * | cored, closed forms | µ 2 to 1e6, gap 0 to half the core, drop 0.01 to 0.9 | 3e-14 (at 0.01), else 3e-15 | mpmath, 130 digits |
 */
export function dropCurrent(characteristic: FluxCharacteristic, inductanceDrop: number): CurrentOrReason {
  if (!(inductanceDrop > 0 && inductanceDrop < 1)) {
    throw new InvalidQuantity('/inductanceDrop', `a drop lies between 0 and 1, not at ${inductanceDrop}`);
  }
  if (characteristic.kind === 'linear') {
    return { current_A: null, reason: 'the inductance does not depend on current' };
  }
  const initial_H = characteristic.differentialInductance_H(0);
  const excess = (current_A: number) =>
    characteristic.differentialInductance_H(current_A) - (1 - inductanceDrop) * initial_H;
  let before = 0;
  for (const current of currentsToVisit(characteristic)) {
    if (excess(current) <= 0) return { current_A: findRoot(excess, before, current) };
    before = current;
  }
  const reached = 1 - characteristic.differentialInductance_H(before) / initial_H;
  const where = Number.isFinite(characteristic.maximumCurrent_A)
    ? `at the last reading, ${before} A, it has fallen`
    : 'even fully saturated the inductance has fallen';
  return {
    current_A: null,
    reason: `${where} by ${(100 * reached).toPrecision(3)} %, less than ${100 * inductanceDrop} %`,
  };
}

/** `dropCurrent` where the reason for there being none does not matter. */
export function dropCurrent_A(characteristic: FluxCharacteristic, inductanceDrop: number): number | null {
  return dropCurrent(characteristic, inductanceDrop).current_A;
}

/** Currents between which dλ/di is monotone, from the lowest up to the last that the characteristic knows. */
function* currentsToVisit({ slopeTurns_A = [], maximumCurrent_A }: FluxCharacteristic): Generator<number> {
  yield* slopeTurns_A;
  if (Number.isFinite(maximumCurrent_A)) {
    yield maximumCurrent_A;
    return;
  }
  let current = slopeTurns_A.at(-1) ?? 1;
  for (let doubling = 0; doubling < DOUBLINGS && Number.isFinite(current * 2); doubling++) {
    current *= 2;
    yield current;
  }
}

/** What `coredSaturation` answers. */
export interface Saturation {
  /** null: never, for `dropReason` */
  readonly dropCurrent_A: number | null;
  readonly dropReason?: string;
  /** null: the material has no saturation flux density, `fluxLimitReason` */
  readonly fluxLimitCurrent_A: number | null;
  readonly fluxLimitReason?: string;
  readonly energyAtFluxLimit: StoredEnergy | null;
  /** in the smallest section, where a current was asked for */
  readonly fluxDensity_T?: number;
  /** fluxLimitCurrent_A / |current_A| − 1, where both are there and the current is not zero */
  readonly currentMargin?: number;
  readonly method: Method;
}

export interface SaturationQuestion {
  /** of the core; default 25 °C where the saturation is a list over temperature */
  readonly temperature_degC?: number;
  /** default 0.3 */
  readonly inductanceDrop?: number;
  readonly current_A?: number;
}

/**
 * Where a cored coil saturates: drop current, flux limit (the smallest section at the saturation flux density), the energy there and its
 * split between core and gap, and how far a current is from it. `method.relativeError` is the one at the flux limit,
 * where there is one, else the one at `current_A`.
 * Throws `InvalidQuantity` at `/coil/…`, `/inductanceDrop`.
 */
export function coredSaturation(coil: Cored, question: SaturationQuestion = {}): Saturation {
  const { temperature_degC, inductanceDrop = 0.3, current_A } = question;
  const characteristic = within('/coil', () => coredCharacteristic(coil, temperature_degC));
  const limit_A = within('/coil', () => fluxLimit_A(coil, characteristic, temperature_degC));
  const drop = dropCurrent(characteristic, inductanceDrop);
  return {
    dropCurrent_A: drop.current_A,
    ...(drop.current_A === null ? { dropReason: drop.reason } : {}),
    fluxLimitCurrent_A: limit_A,
    ...(limit_A === null ? { fluxLimitReason: NO_SATURATION } : {}),
    energyAtFluxLimit: limit_A === null ? null : characteristic.storedEnergy(limit_A),
    ...(current_A === undefined ? {} : { fluxDensity_T: characteristic.fluxDensity_T(current_A) }),
    ...(current_A && limit_A !== null ? { currentMargin: limit_A / Math.abs(current_A) - 1 } : {}),
    method: methodAt(characteristic, limit_A ?? current_A ?? 0),
  };
}

const NO_SATURATION = 'the material has no saturation flux density';

/** Saturation flux density of a coil's core in T; null where its material has none. Throws at `/core/material/saturation…`. */
export function saturationFluxDensity_T(coil: Cored, temperature_degC?: number): number | null {
  return within('/core/material', () => materialSaturation_T(coil.core.material, temperature_degC));
}

/** Flux density in T in the smallest section of a coil's core. */
export function fluxDensityInSmallestSection_T(coil: Cored, current_A: number, temperature_degC?: number): number {
  return coredCharacteristic(coil, temperature_degC).fluxDensity_T(current_A);
}

/** The current in A that takes the smallest section to its saturation flux density; null where the material has none. */
export function fluxLimitCurrent_A(coil: Cored, temperature_degC?: number): number | null {
  return fluxLimit_A(coil, coredCharacteristic(coil, temperature_degC), temperature_degC);
}

/** Energy that core and gap hold at the flux limit; null where the material has no saturation flux density. */
export function energyAtFluxLimit(coil: Cored, temperature_degC?: number): StoredEnergy | null {
  const characteristic = coredCharacteristic(coil, temperature_degC);
  const limit_A = fluxLimit_A(coil, characteristic, temperature_degC);
  return limit_A === null ? null : characteristic.storedEnergy(limit_A);
}

function fluxLimit_A(coil: Cored, characteristic: CoredCharacteristic, temperature_degC?: number): number | null {
  const saturation_T = saturationFluxDensity_T(coil, temperature_degC);
  return saturation_T === null ? null : characteristic.currentAtFluxDensity_A(saturation_T);
}
