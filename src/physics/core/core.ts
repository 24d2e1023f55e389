import { InvalidQuantity, within } from '../invalid-quantity.ts';
import { type CoreDimensions, type EffectiveParameters, effectiveParameters } from './effective-parameters.ts';
import type { Gap } from './gap.ts';
import type { Material } from './material.ts';

/** A core by its effective parameters, or by the dimensions they follow from. */
export interface Core {
  readonly effectiveArea_m2?: number;
  readonly effectiveLength_m?: number;
  /** the smallest section that carries the whole flux; default the effective area */
  readonly minimumArea_m2?: number;
  readonly dimensions?: CoreDimensions;
  readonly material: Material;
  readonly gap?: Gap;
}

/** The areas are read from data sheets, which round each on its own. */
const ROUNDING_OF_AREA = 0.01;

/**
 * The core's effective parameters, as given or from its dimensions.
 * Throws `InvalidQuantity` where neither or both are given, or the smallest section exceeds the effective area, which no mean of
 * sections can be below.
 */
export function coreParameters(core: Core): EffectiveParameters {
  const { dimensions, effectiveArea_m2, effectiveLength_m, minimumArea_m2 } = core;
  if (dimensions) {
    for (const name of ['effectiveArea_m2', 'effectiveLength_m', 'minimumArea_m2'] as const) {
      if (core[name] !== undefined) {
        throw new InvalidQuantity(`/${name}`, `${name} follows from the dimensions given; give the one or the other`);
      }
    }
    return within('/dimensions', () => effectiveParameters(dimensions));
  }
  if (effectiveArea_m2 === undefined || !(effectiveArea_m2 > 0)) {
    throw new InvalidQuantity('/effectiveArea_m2', 'a core has an effective area, or dimensions that it follows from');
  }
  if (effectiveLength_m === undefined || !(effectiveLength_m > 0)) {
    throw new InvalidQuantity(
      '/effectiveLength_m',
      'a core has an effective length, or dimensions that it follows from',
    );
  }
  const smallest_m2 = minimumArea_m2 ?? effectiveArea_m2;
  if (!(smallest_m2 > 0 && smallest_m2 <= (1 + ROUNDING_OF_AREA) * effectiveArea_m2)) {
    throw new InvalidQuantity(
      '/minimumArea_m2',
      `the smallest section, ${smallest_m2} m², is positive and not above the effective area, ${effectiveArea_m2} m²`,
    );
  }
  return {
    effectiveArea_m2,
    effectiveLength_m,
    effectiveVolume_m3: effectiveArea_m2 * effectiveLength_m,
    minimumArea_m2: smallest_m2,
  };
}
