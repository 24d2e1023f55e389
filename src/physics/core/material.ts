import { InvalidQuantity } from '../invalid-quantity.ts';

/** B(H) read from points with H and B positive and increasing; the origin is added where it is not the first point. */
export interface MagnetisationTable {
  readonly field_A_per_m: readonly number[];
  readonly fluxDensity_T: readonly number[];
}

/** The closed forms J(H), or a table; see `magnetisation.ts`. */
export type Magnetisation = 'hyperbolic-tangent' | 'arctangent' | 'froehlich' | MagnetisationTable;

export interface SaturationAtTemperature {
  readonly temperature_degC: number;
  readonly fluxDensity_T: number;
}

/** Core loss P = k f^α B^β in W/m³, f in Hz, B in T. */
export interface SteinmetzLoss {
  readonly k: number;
  readonly alpha: number;
  readonly beta: number;
}

/** A soft magnetic material as its data sheet gives it. */
export interface Material {
  readonly initialPermeability: number;
  /** Saturation flux density, one or a list over temperature. Without it the material is linear and has no flux limit. */
  readonly saturation?: { readonly fluxDensity_T: number } | readonly SaturationAtTemperature[];
  /** Default `hyperbolic-tangent`. */
  readonly magnetisation?: Magnetisation;
  readonly loss?: SteinmetzLoss;
}

/** Temperature at which a list over temperature is read where none is given: the one that data sheets state first. */
export const REFERENCE_TEMPERATURE_DEGC = 25;

/** The temperatures in °C over which the material's saturation is known; null where it does not depend on temperature. */
export function saturationTemperatureRange(material: Material): { lower_degC: number; upper_degC: number } | null {
  const list = material.saturation;
  if (!isList(list) || list.length === 0) return null;
  return { lower_degC: list[0]!.temperature_degC, upper_degC: list.at(-1)!.temperature_degC };
}

/**
 * Saturation flux density in T at `temperature_degC` (default 25 °C): the single value as it is, a list by linear interpolation and
 * never beyond its ends. Null where the material has none, which makes it linear.
 *
 * Throws `InvalidQuantity` at `/saturation…` where the list is empty, its temperatures do not increase, a flux density is not positive,
 * or the temperature lies outside it.
 */
export function saturationFluxDensity_T(
  material: Material,
  temperature_degC = REFERENCE_TEMPERATURE_DEGC,
): number | null {
  const { saturation } = material;
  if (saturation === undefined) return null;
  if (!isList(saturation)) return positive(saturation.fluxDensity_T, '/saturation/fluxDensity_T');
  return interpolated(saturation, temperature_degC);
}

function interpolated(list: readonly SaturationAtTemperature[], temperature_degC: number): number {
  if (list.length === 0) throw new InvalidQuantity('/saturation', 'an empty list of saturation flux densities');
  list.forEach((entry, k) => {
    positive(entry.fluxDensity_T, `/saturation/${k}/fluxDensity_T`);
    const previous = list[k - 1];
    if (previous && !(entry.temperature_degC > previous.temperature_degC)) {
      throw new InvalidQuantity(
        `/saturation/${k}/temperature_degC`,
        `temperatures increase along the list, but ${entry.temperature_degC} °C follows ${previous.temperature_degC} °C`,
      );
    }
  });
  const [first, last] = [list[0]!, list.at(-1)!];
  if (!(temperature_degC >= first.temperature_degC && temperature_degC <= last.temperature_degC)) {
    throw new InvalidQuantity(
      '/saturation',
      `the core temperature, ${temperature_degC} °C, lies outside the list of saturation flux densities, which runs from ` +
        `${first.temperature_degC} °C to ${last.temperature_degC} °C and is never extrapolated`,
    );
  }
  const above = list.findIndex((entry) => entry.temperature_degC >= temperature_degC);
  const upper = list[above]!;
  if (above === 0) return upper.fluxDensity_T;
  const lower = list[above - 1]!;
  const share = (temperature_degC - lower.temperature_degC) / (upper.temperature_degC - lower.temperature_degC);
  return lower.fluxDensity_T * (1 - share) + upper.fluxDensity_T * share;
}

function isList(saturation: Material['saturation']): saturation is readonly SaturationAtTemperature[] {
  return Array.isArray(saturation);
}

function positive(fluxDensity_T: number, pointer: string): number {
  if (fluxDensity_T > 0 && Number.isFinite(fluxDensity_T)) return fluxDensity_T;
  throw new InvalidQuantity(pointer, `a saturation flux density is positive and finite, not ${fluxDensity_T} T`);
}
