import type { CustomSeriesOption } from 'echarts/charts';
import { axisOver } from './axis.ts';
import { drawFigure, emptyFigure, type FigureOptions, type Mark } from './figure.ts';
import type { Limits } from './histogram.ts';
import { INK, lineStyle, STROKES } from './stroke.ts';

export interface TrendGroup {
  /** the lot, day or rig */
  readonly name: string;
  readonly n: number;
  readonly mean: number;
  /** absent where one value tells none */
  readonly standardDeviation?: number;
}

export interface TrendData {
  /** the quantity, such as 'inductance at 0 A' */
  readonly label: string;
  /** SI unit without prefix, in which all numbers here are; '1' for none */
  readonly unit: string;
  readonly by: 'lot' | 'day' | 'rig';
  /** in the order they are drawn in */
  readonly groups: readonly TrendGroup[];
  readonly limits: Limits;
}

/** More groups than that leave no room for caps; their spreads are grey, so that the means show. */
const MANY = 50;

/** Mean ± standard deviation of each group in order, as SVG, with the limits. Rigs have no order: their means aren't joined. */
export function trend(data: TrendData, { id = 'trend' }: FigureOptions = {}): string {
  const { label, unit, by, limits } = data;
  const title = `${label[0]?.toUpperCase() ?? ''}${label.slice(1)} by ${by}`;
  const groups = data.groups.filter(({ mean }) => Number.isFinite(mean));
  if (groups.length === 0) return emptyFigure(id, title, 'No groups to show');

  const ranges = groups.map(({ mean, standardDeviation = Number.NaN }) =>
    Number.isFinite(standardDeviation)
      ? [mean - standardDeviation, mean, mean + standardDeviation]
      : [mean, mean, mean],
  );
  const marked = [limits.lower, limits.upper].filter((value) => value !== undefined);
  const y = axisOver([...ranges.flat(), ...marked], { label, unit });
  const mark = (value: number | undefined, text: string): Mark[] =>
    value !== undefined && Number.isFinite(value)
      ? [{ at: y.position(value), text: `${text} ${y.words(value)}`, stroke: STROKES.limit }]
      : [];
  const counts = groups.map(({ n }) => n);
  const [fewest, most] = [counts.reduce((a, b) => Math.min(a, b)), counts.reduce((a, b) => Math.max(a, b))];
  return drawFigure({
    id,
    title,
    caption: [
      `● mean    I ± standard deviation    ${groups.length} ${by}${groups.length === 1 ? '' : 's'}, ` +
        `n = ${fewest === most ? fewest : `${fewest} to ${most}`} in each`,
    ],
    x: { title: by, names: groups.map(({ name }) => name), details: counts.map((n) => `n = ${n}`) },
    y,
    series: [
      spreads(ranges.map((range) => range.map(y.position))),
      {
        type: 'line',
        data: groups.map(({ mean }, i) => [i, y.position(mean)]),
        symbol: 'circle',
        symbolSize: groups.length > MANY ? 3 : 8,
        showAllSymbol: true,
        itemStyle: { color: INK },
        lineStyle: { ...lineStyle(STROKES.level), width: by === 'rig' ? 0 : 1 },
        z: 5,
      },
    ],
    upright: [],
    across: [...mark(limits.upper, 'upper limit'), ...mark(limits.lower, 'lower limit')],
  });
}

function spreads(ranges: readonly (readonly number[])[]): CustomSeriesOption {
  const drawn = ranges.flatMap(([low = 0, , high = 0], i) => (high > low ? [{ i, low, high }] : []));
  const areMany = ranges.length > MANY;
  return {
    type: 'custom',
    z: 4,
    data: drawn.map(({ i, low, high }) => [i, low, high]),
    renderItem: (parameters, api) => {
      const { i, low, high } = drawn[parameters.dataIndex]!;
      const [x = 0, bottom = 0] = api.coord([i, low]);
      const [, top = 0] = api.coord([i, high]);
      const style = { stroke: areMany ? '#b5b5b5' : INK, lineWidth: 1.25, fill: 'none' };
      const line = (x1: number, y1: number, x2: number, y2: number) =>
        ({ type: 'line', shape: { x1, y1, x2, y2 }, style }) as const;
      const caps = areMany ? [] : [line(x - 5, bottom, x + 5, bottom), line(x - 5, top, x + 5, top)];
      return { type: 'group', children: [line(x, bottom, x, top), ...caps] };
    },
  };
}
