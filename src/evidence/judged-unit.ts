import { InvalidQuantity } from '../physics/invalid-quantity.ts';
import type { Conductor } from '../physics/losses/winding-resistance.ts';
import type { Method } from '../physics/method.ts';
import type { Drawing } from './drawing.ts';
import { type Judgement, judge, mostAdverse, type Observed, type Outcome } from './judge.ts';
import type { Limit, Observation } from './observation.ts';
import { isOutOfCalibration, type Unit } from './unit.ts';
import {
  energyMeasurement,
  inductanceMeasurement,
  type Measurement,
  observeUnit,
  resistanceMeasurement,
  saturationMeasurement,
} from './unit-observations.ts';

export const UNIT_QUANTITIES = ['inductance', 'saturation-current', 'energy', 'resistance'] as const;
export type UnitQuantity = (typeof UNIT_QUANTITIES)[number];

/** One quantity of a unit: decided where the drawing limits it, else as it was found. */
export interface JudgedQuantity {
  readonly quantity: UnitQuantity;
  readonly detail: string;
  readonly method: Method;
  readonly limit: Limit;
  readonly outcome?: Outcome;
  readonly observed?: Observed;
  readonly margin?: number;
  readonly conformanceProbability?: number;
}

/** A unit as a drawing judges it. */
export interface JudgedUnit {
  readonly serial: string;
  readonly measuredAt: string;
  readonly rig?: string;
  readonly outcome: Outcome;
  readonly outOfCalibration?: true;
  readonly quantities: readonly JudgedQuantity[];
}

/** What judging needs beside the unit. */
export interface Yardstick {
  readonly drawing: Drawing;
  /** of the winding; default copper */
  readonly conductor?: Conductor;
}

/** Accepted probability of a wrong decision on one quantity of one unit. */
const RISK = 0.05;

/** The quantities that a drawing has every unit measured for. Energy is at the drawing's saturation current, and has no limit there. */
export function measurementsOf({
  drawing,
  conductor,
}: Yardstick): { readonly quantity: UnitQuantity; readonly measurement: Measurement }[] {
  const { saturation } = drawing;
  const candidates: [UnitQuantity, Measurement | undefined][] = [
    ['inductance', inductanceMeasurement(drawing)],
    ['saturation-current', saturationMeasurement(drawing)],
    ['energy', saturation && energyMeasurement(saturation.current_A, undefined, saturation.temperature_degC)],
    ['resistance', resistanceMeasurement(drawing, conductor)],
  ];
  return candidates.flatMap(([quantity, measurement]) => (measurement ? [{ quantity, measurement }] : []));
}

/**
 * Judges a unit by a drawing: each quantity in three zones, with its rig's uncertainty. The unit is as its most adverse quantity is.
 * A resistance that was not measured is left out. Throws `InvalidQuantity`, pointing into the unit, where its readings cannot be.
 */
export function judgeUnit(unit: Unit, yardstick: Yardstick): JudgedUnit {
  const quantities: JudgedQuantity[] = [];
  const judgements: Judgement[] = [];
  for (const { quantity, measurement } of measurementsOf(yardstick)) {
    if (quantity === 'resistance' && unit.resistance_ohm === undefined) continue;
    const observation = observeUnit(unit, measurement);
    if (!isLimited(measurement.limit)) {
      quantities.push(unlimited(quantity, observation));
      continue;
    }
    const judgement = judge(observation, RISK);
    judgements.push(judgement);
    const { serial, ...rest } = judgement;
    quantities.push({ quantity, ...rest });
  }
  if (judgements.length === 0)
    throw new InvalidQuantity('', 'the drawing limits nothing that this unit was measured for');
  return {
    serial: unit.serial,
    measuredAt: unit.measuredAt,
    ...(unit.rig !== undefined && { rig: unit.rig }),
    outcome: mostAdverse(judgements).outcome,
    ...(isOutOfCalibration(unit) && { outOfCalibration: true as const }),
    quantities,
  };
}

const isLimited = ({ lower, upper }: Limit): boolean => lower !== undefined || upper !== undefined;

function unlimited(
  quantity: UnitQuantity,
  { what, unit, limit, method, value, standardUncertainty = 0, undecided }: Observation,
): JudgedQuantity {
  if (value === undefined) return { quantity, limit, method, detail: `${what}: ${undecided}.` };
  return {
    quantity,
    limit,
    method,
    observed: { value, unit, standardUncertainty },
    detail: `${what} as measured; no limit is given.`,
  };
}
