import type { CustomSeriesOption } from 'echarts/charts';
import { drawFigure, emptyFigure, type FigureOptions, type Mark } from './figure.ts';
import { inductanceAxes } from './inductance-axes.ts';
import { bandBar, extentOfLimits, type InductanceLimits, levelMarks, saturationMark } from './inductance-limits.ts';
import { pairs, thinned } from './points.ts';
import { lineStyle, STROKES } from './stroke.ts';

/** Quantiles over the lot's units of differential inductance at each current, in H; arrays as long as `current_A`. */
export interface FanQuantiles {
  readonly p05: readonly number[];
  readonly p25: readonly number[];
  readonly p50: readonly number[];
  readonly p75: readonly number[];
  readonly p95: readonly number[];
}

export interface LotFanData {
  readonly lot: string;
  /** units whose curves the quantiles are of */
  readonly n: number;
  /** ascending */
  readonly current_A: readonly number[];
  readonly quantiles: FanQuantiles;
  /** the lot's median at zero current, which the drop level is drawn from */
  readonly initialInductance_H?: number;
  readonly limits: InductanceLimits;
}

const MOST_VERTICES = 300;

const LINES = [
  ['p95', '95 %', STROKES.tail],
  ['p75', '75 %', STROKES.quartile],
  ['p50', 'median', STROKES.curve],
  ['p25', '25 %', STROKES.quartile],
  ['p05', '5 %', STROKES.tail],
] as const;

const BANDS = [
  ['p05', 'p95', '#e3e3e3'],
  ['p25', 'p75', '#bdbdbd'],
] as const;

/** A lot's differential inductance over current as SVG: bands between quantiles of its units, with the drawing's limits. */
export function lotFan(data: LotFanData, { id = 'lot-fan' }: FigureOptions = {}): string {
  const { lot, n, current_A, quantiles, initialInductance_H, limits } = data;
  const title = `Inductance over current: lot ${lot}`;
  const curves = Object.fromEntries(
    LINES.map(([name]) => [name, thinned(pairs(current_A, quantiles[name]), MOST_VERTICES)]),
  ) as Record<keyof FanQuantiles, readonly (readonly [number, number])[]>;
  const all = Object.values(curves).flat();
  if (all.length === 0) return emptyFigure(id, title, 'No measured units to show');

  const extent = extentOfLimits(limits, initialInductance_H);
  const { x, y } = inductanceAxes(
    [...all.map(([current]) => current), ...extent.currents],
    [...all.map(([, inductance]) => inductance), ...extent.inductances],
  );
  const placed = ([current, inductance]: readonly [number, number]) => [x.position(current), y.position(inductance)];
  const ends: Mark[] = LINES.flatMap(([name, text]) => {
    const last = curves[name].at(-1);
    return last ? [{ at: y.position(last[1]), from: x.position(last[0]), text, stroke: STROKES.leader }] : [];
  });
  return drawFigure({
    id,
    title,
    caption: [`n = ${n} units    quantiles: — median    -- 25 % and 75 %    ··· 5 % and 95 %`],
    x,
    y,
    series: [
      ...BANDS.map(([low, high, ink]) => area(curves[low].map(placed), curves[high].map(placed), ink)),
      ...LINES.map(([name, , stroke]) => ({
        type: 'line',
        data: curves[name].map(placed),
        symbol: curves[name].length === 1 ? 'circle' : 'none',
        lineStyle: lineStyle(stroke),
        itemStyle: { color: stroke.ink },
        z: 4,
      })),
      ...bandBar(limits, x, y),
    ],
    upright: saturationMark(limits, x),
    across: [...ends, ...levelMarks(limits, initialInductance_H, x, y)],
  });
}

function area(low: readonly number[][], high: readonly number[][], fill: string): CustomSeriesOption {
  const outline = [...low, ...[...high].reverse()];
  return {
    type: 'custom',
    z: 1,
    data: outline.length > 2 ? [[0, 0]] : [],
    renderItem: (_, api) => ({
      type: 'polygon',
      shape: { points: outline.map((point) => api.coord(point) as [number, number]) },
      style: { fill },
    }),
  };
}
