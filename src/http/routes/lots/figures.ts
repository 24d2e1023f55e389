import type { FastifyInstance } from 'fastify';
import type { ZodTypeProvider } from 'fastify-type-provider-zod';
import { z } from 'zod';
import { type LotUnderTest, lotUnderTest, type UnitDesk } from '../../../approval/measuring.ts';
import { CoilproofError } from '../../../errors.ts';
import { UNIT_QUANTITIES } from '../../../evidence/judged-unit.ts';
import { fanOf } from '../../../evidence/lot-fan.ts';
import { lotStatistics, trendOf } from '../../../evidence/lot-statistics.ts';
import { measuredCurve } from '../../../evidence/unit-curve.ts';
import { histogram } from '../../../report/histogram.ts';
import type { InductanceLimits } from '../../../report/inductance-limits.ts';
import { lotFan } from '../../../report/lot-fan.ts';
import { trend } from '../../../report/trend.ts';
import { unitCurve } from '../../../report/unit-curve.ts';
import { operation } from '../../operation.ts';
import { identifier, text } from '../../schemas/text.ts';

/** Units whose sweeps a fan is drawn from: the last recorded; more would not be seen in the bands. */
const UNITS_IN_A_FAN = 500;

const Params = z.object({
  lot: identifier.meta({ examples: ['example-1'] }),
  name: z.enum(['fan.svg', 'histogram.svg', 'trend.svg', 'unit.svg']).meta({ examples: ['histogram.svg'] }),
});

const Query = z.strictObject({
  quantity: z.enum(UNIT_QUANTITIES).default('inductance').meta({ description: 'of histogram and trend' }),
  by: z.enum(['day', 'rig']).default('day').meta({ description: 'of trend' }),
  serial: text(100).exactOptional().meta({ description: 'of unit' }),
});

type Wanted = z.output<typeof Query>;

/** GET /v1/lots/{lot}/figures/{name}.svg */
export function getFigure(app: FastifyInstance, desk: UnitDesk): void {
  app.withTypeProvider<ZodTypeProvider>().get(
    '/v1/lots/:lot/figures/:name',
    {
      schema: {
        ...operation({
          operationId: 'getLotFigure',
          summary: 'A figure of a lot: fan of its L(i), histogram, trend, or one unit’s L(i)',
          description: 'image/svg+xml, readable without colour.',
          tag: 'evidence',
          scope: 'read',
          success: { 200: z.string() },
          problems: ['not-found', 'invalid-parameter', 'unknown-reference', 'overloaded', 'internal'],
        }),
        params: Params,
        querystring: Query,
      },
    },
    async (request, reply) => {
      const lot = await lotUnderTest(desk.registry, request.params.lot);
      const svg = await DRAW[request.params.name](desk, lot, request.query);
      return reply
        .type('image/svg+xml')
        .serializer((body: unknown) => String(body))
        .send(svg);
    },
  );
}

const DRAW: Record<
  z.output<typeof Params>['name'],
  (desk: UnitDesk, lot: LotUnderTest, wanted: Wanted) => Promise<string>
> = {
  'histogram.svg': async ({ units }, { id, yardstick }, { quantity }) => {
    const found = lotStatistics(await units.rollups([id]), yardstick).find((entry) => entry.quantity === quantity);
    if (!found) throw notMeasured(quantity);
    const { unit, limit, n, mean, standardDeviation, histogram: bars, capability } = found;
    return histogram({
      label: labelOf(quantity),
      unit,
      lot: id,
      edges: bars?.edges ?? [],
      counts: bars?.counts ?? [],
      below: bars?.below ?? 0,
      above: bars?.above ?? 0,
      limits: limit,
      n,
      ...(mean !== undefined && { mean }),
      ...(standardDeviation !== undefined && { standardDeviation }),
      ...(capability && {
        capability: {
          cpk: capability.cpk.value,
          interval: { ...capability.cpk.interval, confidence: capability.confidence },
        },
      }),
    });
  },

  'trend.svg': async ({ units }, { id, yardstick }, { quantity, by }) => {
    const found = trendOf(await units.rollups([id]), by, yardstick).find((entry) => entry.quantity === quantity);
    if (!found) throw notMeasured(quantity);
    const groups = found.groups.flatMap(({ group, n, mean, standardDeviation }) =>
      mean === undefined
        ? []
        : [{ name: group || 'inline', n, mean, ...(standardDeviation !== undefined && { standardDeviation }) }],
    );
    return trend({ label: labelOf(quantity), unit: found.unit, by, groups, limits: found.limit });
  },

  'fan.svg': async ({ units }, lot) => {
    const { total, recent } = await recentUnits(units, lot.id);
    return lotFan({ lot: lot.id, n: total, ...fanOf(recent.map(({ unit }) => unit)), limits: limitsOf(lot) });
  },

  'unit.svg': async ({ units }, lot, { serial }) => {
    if (serial === undefined) throw new CoilproofError('invalid-parameter', 'serial: which unit of the lot');
    const found = await units.ofSerial(lot.id, serial);
    if (!found) throw new CoilproofError('not-found', `No unit ${serial} is recorded in lot ${lot.id}.`);
    return unitCurve({
      serial,
      lot: lot.id,
      ...measuredCurve(found.unit, lot.yardstick.drawing.saturation?.inductanceDrop),
      limits: limitsOf(lot),
    });
  },
};

const labelOf = (quantity: string): string => (quantity.charAt(0).toUpperCase() + quantity.slice(1)).replace('-', ' ');

const notMeasured = (quantity: string) =>
  new CoilproofError('not-found', `The drawing has no ${quantity} that units are measured for.`);

async function recentUnits(units: UnitDesk['units'], lot: string) {
  const counts = await units.counts(lot);
  const total = counts.pass + counts.inconclusive + counts.fail;
  return { total, recent: await units.last(lot, UNITS_IN_A_FAN) };
}

function limitsOf({ yardstick: { drawing } }: LotUnderTest): InductanceLimits {
  const { lower_H, upper_H, testCurrent_A = 0 } = drawing.inductance;
  const { saturation } = drawing;
  return {
    inductance: { lower_H, upper_H, testCurrent_A },
    ...(saturation && { saturation: { inductanceDrop: saturation.inductanceDrop, current_A: saturation.current_A } }),
  };
}
