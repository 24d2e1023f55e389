import { measurementsOf, type UnitQuantity, type Yardstick } from './judged-unit.ts';
import { spreadOf } from './lot-statistics.ts';
import type { Limit } from './observation.ts';
import { mergeRolled, NOTHING_ROLLED_UP, type Rolled } from './rollup.ts';
import type { Rollup, UnitCounts } from './unit-store.ts';

/** What an approval takes from a lot: how many units, and the spread of each quantity that has a limit. */
export interface LotSummary {
  readonly lot: string;
  readonly counts: UnitCounts;
  readonly quantities: readonly {
    readonly quantity: UnitQuantity;
    readonly limit: Limit;
    readonly n: number;
    readonly mean?: number;
    readonly standardDeviation?: number;
  }[];
}

export function summariseLot(
  lot: string,
  counts: UnitCounts,
  rollups: readonly Rollup[],
  yardstick: Yardstick,
): LotSummary {
  const limited = measurementsOf(yardstick).filter(
    ({ measurement: { limit } }) => limit.lower !== undefined || limit.upper !== undefined,
  );
  const quantities = limited.flatMap(({ quantity, measurement: { limit } }) => {
    const rolled = rollups
      .filter((rollup) => rollup.quantity === quantity)
      .reduce<Rolled>(mergeRolled, NOTHING_ROLLED_UP);
    const { n, mean, standardDeviation } = spreadOf(rolled.moments);
    return n === 0 && quantity === 'resistance'
      ? []
      : [
          {
            quantity,
            limit,
            n,
            ...(mean !== undefined && { mean }),
            ...(standardDeviation !== undefined && { standardDeviation }),
          },
        ];
  });
  return { lot, counts, quantities };
}

/** Units measured of a lot. */
export const measuredIn = ({ counts }: LotSummary): number => counts.pass + counts.inconclusive + counts.fail;
