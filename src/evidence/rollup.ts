import { type Binning, type Bins, binning, binsOf, EMPTY_BINS, mergeBins } from '../metrology/statistics/bins.ts';
import { type Moments, mergeMoments, momentsOf, NO_VALUES } from '../metrology/statistics/moments.ts';
import type { JudgedUnit, UnitQuantity, Yardstick } from './judged-unit.ts';
import { measurementsOf } from './judged-unit.ts';

/** Statistics of one quantity that merge, so that a lot of a million units costs no more to describe than one of a thousand. */
export interface Rolled {
  readonly moments: Moments;
  readonly bins: Bins;
}

/** What some units add to the rollups: one for each rig, day and quantity among them. */
export interface RollupPart extends Rolled {
  readonly rig: string;
  readonly day: string;
  readonly quantity: UnitQuantity;
}

export const NOTHING_ROLLED_UP: Rolled = { moments: NO_VALUES, bins: EMPTY_BINS };

export const mergeRolled = (a: Rolled, b: Rolled): Rolled => ({
  moments: mergeMoments(a.moments, b.moments),
  bins: mergeBins(a.bins, b.bins),
});

/** Where the bins of a quantity lie: from the drawing's limits; of the energy, which has none, from ½·L·I² of the nominal inductance. */
export function binningOf(quantity: UnitQuantity, yardstick: Yardstick): Binning | undefined {
  const measurement = measurementsOf(yardstick).find((candidate) => candidate.quantity === quantity)?.measurement;
  if (!measurement) return undefined;
  if (quantity !== 'energy') return binning(measurement.limit);
  const { inductance, saturation } = yardstick.drawing;
  return binning({ lower: (inductance.nominal_H * (saturation?.current_A ?? 0) ** 2) / 2 });
}

/**
 * Rolls up the measured values of some units. A value that is only a lower bound (the sweep ended before the quantity was
 * reached) is left out: it is not one of the distribution.
 */
export function rollUp(units: readonly JudgedUnit[], yardstick: Yardstick): RollupPart[] {
  const values = new Map<string, { rig: string; day: string; quantity: UnitQuantity; values: number[] }>();
  for (const { rig = '', measuredAt, quantities } of units) {
    const day = measuredAt.slice(0, 10);
    for (const { quantity, observed } of quantities) {
      if (!observed || observed.atLeast) continue;
      const key = `${day} ${quantity} ${rig}`;
      const group = values.get(key) ?? { rig, day, quantity, values: [] };
      group.values.push(observed.value);
      values.set(key, group);
    }
  }
  return [...values.values()].flatMap(({ values: group, ...key }) => {
    const where = binningOf(key.quantity, yardstick);
    return where ? [{ ...key, moments: momentsOf(group), bins: binsOf(where, group) }] : [];
  });
}
