import { quantilesOf } from '../metrology/statistics/quantiles.ts';
import { isUnavailable } from '../metrology/statistics/unavailable.ts';
import { measuredCharacteristic } from '../physics/characteristics/measured.ts';
import type { Unit } from './unit.ts';

/** Currents that a fan is drawn at. */
const POINTS = 60;
const PROBABILITIES = [0.05, 0.25, 0.5, 0.75, 0.95];

/** Quantiles of the differential inductance of units over current, up to the largest current that every one of them reaches. */
export function fanOf(units: readonly Unit[]) {
  const characteristics = units.map(({ sweep }) => measuredCharacteristic(sweep));
  const reach_A = characteristics.reduce(
    (least, { maximumCurrent_A }) => Math.min(least, maximumCurrent_A),
    Number.POSITIVE_INFINITY,
  );
  const current_A =
    characteristics.length === 0 ? [] : Array.from({ length: POINTS + 1 }, (_, k) => (reach_A * k) / POINTS);
  const quantiles = current_A.map((current) => {
    const found = quantilesOf(
      characteristics.map((characteristic) => characteristic.differentialInductance_H(current)),
      PROBABILITIES,
    );
    return isUnavailable(found) ? [] : found;
  });
  const row = (index: number) => quantiles.map((values) => values[index] ?? Number.NaN);
  const median = quantiles[0]?.[2];
  return {
    current_A,
    quantiles: { p05: row(0), p25: row(1), p50: row(2), p75: row(3), p95: row(4) },
    ...(median !== undefined && { initialInductance_H: median }),
  };
}
