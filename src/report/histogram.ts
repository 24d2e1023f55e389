import type { CustomSeriesOption } from 'echarts/charts';
import { inWords } from '../evidence/wording.ts';
import { type Axis, axisOver } from './axis.ts';
import { drawFigure, emptyFigure, type FigureOptions, LEAST_PLOT_WIDTH, type Mark } from './figure.ts';
import { INK, STROKES } from './stroke.ts';
import { withMinus } from './text.ts';

/** A drawing's limits on one quantity; a side that is absent is open. */
export interface Limits {
  readonly lower?: number;
  readonly upper?: number;
}

export interface HistogramData {
  /** the quantity, such as 'inductance at 0 A' */
  readonly label: string;
  /** SI unit without prefix, in which all numbers here are; '1' for none */
  readonly unit: string;
  readonly lot?: string;
  /** ascending, one more than there are counts; bar i holds edges[i] ≤ value < edges[i + 1] */
  readonly edges: readonly number[];
  readonly counts: readonly number[];
  /** values below the first edge and from the last edge on */
  readonly below: number;
  readonly above: number;
  readonly limits: Limits;
  readonly n: number;
  readonly mean?: number;
  readonly standardDeviation?: number;
  readonly capability?: {
    readonly cpk: number;
    readonly interval?: { readonly lower: number; readonly upper: number; readonly confidence: number };
  };
}

/** Histogram of one quantity as SVG, with its limits and mean; n, mean, standard deviation and capability in the caption. */
export function histogram(data: HistogramData, { id = 'histogram' }: FigureOptions = {}): string {
  const { label, unit, lot, edges, counts, limits, mean } = data;
  const title = `${label[0]?.toUpperCase() ?? ''}${label.slice(1)}${lot === undefined ? '' : `, lot ${lot}`}`;
  const bars = counts.flatMap((count, i) => {
    const [from, to] = [edges[i] ?? Number.NaN, edges[i + 1] ?? Number.NaN];
    return Number.isFinite(from) && Number.isFinite(to) ? [{ from, to, count }] : [];
  });
  const total = counts.reduce((sum, count) => sum + count, 0) + data.below + data.above;
  if (bars.length === 0 || total === 0) return emptyFigure(id, title, 'No values to show');

  const marked = [limits.lower, limits.upper, mean].filter((value) => value !== undefined);
  const x = axisOver([...bars.flatMap(({ from, to }) => [from, to]), ...marked], {
    label,
    unit,
    room: LEAST_PLOT_WIDTH,
  });
  const y = axisOver(counts, { label: 'units', unit: '1', fromZero: true, integers: true });
  const mark = (value: number | undefined, text: string, stroke: Mark['stroke'], spread?: number): Mark[] =>
    value !== undefined && Number.isFinite(value)
      ? [{ at: x.position(value), text: `${text} ${x.words(value, spread)}`, stroke }]
      : [];
  return drawFigure({
    id,
    title,
    caption: captionOf(data, x),
    x,
    y,
    series: [
      barSeries(bars.map(({ from, to, count }) => [x.position(from), x.position(to), y.position(count)] as const)),
    ],
    upright: [
      ...mark(limits.lower, 'lower limit', STROKES.limit),
      ...mark(mean, 'mean', STROKES.found, data.standardDeviation),
      ...mark(limits.upper, 'upper limit', STROKES.limit),
    ],
    across: [],
  });
}

function captionOf(data: HistogramData, x: Axis): string[] {
  const { unit, edges, below, above, n, mean, standardDeviation, capability } = data;
  const words = [`n = ${n}`];
  if (mean !== undefined && Number.isFinite(mean)) words.push(`mean = ${x.words(mean, standardDeviation)}`);
  if (standardDeviation !== undefined && Number.isFinite(standardDeviation)) {
    words.push(`s = ${inWords(standardDeviation, unit)}`);
  }
  if (capability && Number.isFinite(capability.cpk)) words.push(capabilityWords(capability));
  const outside = [
    ...(below > 0 ? [`${below} below ${x.words(edges[0]!)}`] : []),
    ...(above > 0 ? [`${above} above ${x.words(edges.at(-1)!)}`] : []),
  ];
  return [words.join('    '), ...(outside.length > 0 ? [`Not drawn: ${outside.join(', ')}`] : [])];
}

function capabilityWords({ cpk, interval }: NonNullable<HistogramData['capability']>): string {
  const digits = (value: number) => withMinus(value.toFixed(2));
  if (!interval || !Number.isFinite(interval.lower + interval.upper)) return `Cpk = ${digits(cpk)}`;
  const confidence = Number((interval.confidence * 100).toPrecision(4));
  return `Cpk = ${digits(cpk)} (${confidence} %: ${digits(interval.lower)} to ${digits(interval.upper)})`;
}

function barSeries(bars: readonly (readonly [from: number, to: number, height: number])[]): CustomSeriesOption {
  return {
    type: 'custom',
    data: bars.map((bar) => [...bar]),
    renderItem: (parameters, api) => {
      const [from, to, height] = bars[parameters.dataIndex]!;
      const [left = 0, top = 0] = api.coord([from, height]);
      const [right = 0, bottom = 0] = api.coord([to, 0]);
      return {
        type: 'rect',
        shape: { x: left, y: top, width: right - left, height: bottom - top },
        style: height > 0 ? { fill: '#c9c9c9', stroke: INK, lineWidth: 0.75 } : { fill: 'none' },
      };
    },
  };
}
