/** What the figures share: frame, title, caption, axes, marks with their labels, and text for readers who don't see the drawing. */
import { CustomChart, type CustomSeriesOption, LineChart, type LineSeriesOption, ScatterChart } from 'echarts/charts';
import { GraphicComponent, GridComponent } from 'echarts/components';
import { init, use } from 'echarts/core';
import { SVGRenderer } from 'echarts/renderers';
import { type Axis, TICK_SIZE } from './axis.ts';
import { spread } from './placing.ts';
import { FAINT, GREY, INK, type Stroke, shapeStyle } from './stroke.ts';
import { escaped, fitted, fittedMiddle, oneLine, widthOf } from './text.ts';

use([LineChart, CustomChart, ScatterChart, GridComponent, GraphicComponent, SVGRenderer]);

export const WIDTH = 640;
export const HEIGHT = 400;
/** Pixels that any figure leaves to its horizontal axis at least. */
export const LEAST_PLOT_WIDTH = 380;

const MARGIN = 10;
const TITLE_SIZE = 14;
const TEXT_SIZE = 12;
const LABEL_SIZE = 11;
const LINE_HEIGHT = 17;
const LABEL_HEIGHT = 15;
/** Room between the plot's edge and labels, crossed by a slanted line from the mark to its label. */
const LEADER_LENGTH = 14;

export interface FigureOptions {
  /** begins every id in the SVG, so that several figures may stand in one document; default: the figure's name */
  readonly id?: string | undefined;
}

/** A line across the plot, labelled at its edge. */
export interface Mark {
  /** in ticks of its axis */
  readonly at: number;
  readonly text: string;
  readonly stroke: Stroke;
  /** where a mark across begins, in ticks of the horizontal axis; default: the plot's left edge */
  readonly from?: number;
}

/** A horizontal axis of names instead of numbers. */
export interface NamedGroups {
  readonly title: string;
  readonly names: readonly string[];
  /** second line under each name, where names stand upright */
  readonly details: readonly string[];
}

export interface Plot {
  readonly id: string;
  readonly title: string;
  readonly caption: readonly string[];
  readonly x: Axis | NamedGroups;
  readonly y: Axis;
  readonly series: readonly (LineSeriesOption | CustomSeriesOption | object)[];
  /** vertical lines, labelled above the plot */
  readonly upright: readonly Mark[];
  /** horizontal lines, labelled at the right */
  readonly across: readonly Mark[];
}

type Rectangle = { left: number; right: number; top: number; bottom: number };

export function drawFigure(plot: Plot): string {
  const [first = 0, last = 0] =
    'names' in plot.x
      ? []
      : [plot.x.tickLabels[0]!, plot.x.tickLabels.at(-1)!].map((text) => widthOf(text, TICK_SIZE) / 2);
  const yTicks = Math.max(...plot.y.tickLabels.map((text) => widthOf(text, TICK_SIZE)));
  const left = Math.max(MARGIN + 24 + yTicks, first + 4);
  const labelsWidth = Math.min(
    WIDTH - LEAST_PLOT_WIDTH - left - LEADER_LENGTH - MARGIN,
    Math.max(0, ...plot.across.map(({ text }) => widthOf(text, LABEL_SIZE))),
  );
  const right = WIDTH - Math.max(MARGIN + (plot.across.length > 0 ? labelsWidth + LEADER_LENGTH : 8), last + 4);
  const top =
    MARGIN + LINE_HEIGHT * (1 + plot.caption.length) + (plot.upright.length > 0 ? 4 + LABEL_HEIGHT + LEADER_LENGTH : 8);
  const horizontal = 'names' in plot.x ? namedAxis(plot.x, left, right - left) : numberAxis(plot.x);
  const frame = { left, right, top, bottom: HEIGHT - horizontal.height };
  const vertical = numberAxis(plot.y).option;
  return render(plot, {
    grid: { left, right: WIDTH - right, top, bottom: horizontal.height, outerBoundsMode: 'none' },
    xAxis: { ...horizontal.option, nameGap: horizontal.height - 22 },
    yAxis: { ...vertical, nameGap: left - MARGIN - 16, nameRotate: 90 },
    series: plot.series.map((series) => ({ ...series, silent: true, animation: false })),
    graphic: [...heading(plot), ...uprightMarks(plot, frame), ...acrossMarks(plot, frame)],
  });
}

/** A figure without anything to draw says so. */
export function emptyFigure(id: string, title: string, reason: string): string {
  const text = textAt(WIDTH / 2, HEIGHT / 2, reason, { size: TEXT_SIZE, align: 'center' });
  return render(
    { id, title, caption: [reason], upright: [], across: [] },
    {
      graphic: [...heading({ title, caption: [] }), text],
    },
  );
}

type Described = Pick<Plot, 'id' | 'title' | 'caption' | 'upright' | 'across'>;

function render(described: Described, option: object): string {
  const chart = init(null, null, { renderer: 'svg', ssr: true, width: WIDTH, height: HEIGHT });
  try {
    chart.setOption({ animation: false, backgroundColor: '#ffffff', ...option });
    return finished(chart.renderToSVGString(), described);
  } finally {
    chart.dispose();
  }
}

/**
 * The library numbers its drawings and clip paths by counters of the process, and adds classes for a pointer that has nothing to do
 * here. Both go, so that equal data gives equal text. Quotes within texts are escaped, so these patterns meet attributes only.
 */
function finished(svg: string, { id, title, caption, upright, across }: Described): string {
  const prefix = id.replace(/[^A-Za-z0-9_-]/g, '-').replace(/^(?![A-Za-z_])/, 'figure-');
  const marks = [...upright, ...across].map(({ text }) => text).join('; ');
  const description = [...caption, marks].filter((line) => line !== '').join('. ');
  const clipPaths: string[] = [];
  const clipPath = (name: string) => {
    if (!clipPaths.includes(name)) clipPaths.push(name);
    return `${prefix}-clip-${clipPaths.indexOf(name)}`;
  };
  return `${svg
    // Not every renderer knows this baseline; the shift is the same for the middle of digits.
    .replace(/ dominant-baseline="central"/g, ' dy="0.35em"')
    .replace(/<style >[\s\S]*?<\/style>\n?/g, '')
    .replace(/ (?:class|pointer-events|ecmeta_\w+)="[^"]*"/g, '')
    .replace(/clip-path="url\(#([^)"]*)\)"/g, (_, name: string) => `clip-path="url(#${clipPath(name)})"`)
    .replace(/<clipPath id="([^"]*)"/g, (_, name: string) => `<clipPath id="${clipPath(name)}"`)
    .replace(/(stroke-width|font-size)="(\d+\.\d{3})\d+"/g, (_, name: string, number: string) => `${name}="${number}"`)
    .replace(
      /^<svg ([^>]*)>/,
      (_, attributes: string) =>
        `<svg ${attributes} role="img" aria-labelledby="${prefix}-title ${prefix}-desc">\n` +
        `<title id="${prefix}-title">${escaped(title)}</title>\n<desc id="${prefix}-desc">${escaped(description)}</desc>`,
    )
    .replace(/\n{2,}/g, '\n')
    .trimEnd()}\n`;
}

const AXIS_STYLE = {
  nameLocation: 'middle',
  nameTextStyle: { color: INK, fontSize: TEXT_SIZE },
  axisLine: { show: true, lineStyle: { color: GREY } },
  axisTick: { show: true, lineStyle: { color: GREY } },
};

function numberAxis({ title, tickLabels }: Axis) {
  return {
    height: 50,
    option: {
      ...AXIS_STYLE,
      type: 'value',
      name: oneLine(title),
      min: 0,
      max: tickLabels.length - 1,
      interval: 1,
      axisLabel: { color: INK, fontSize: TICK_SIZE, formatter: (tick: number) => tickLabels[Math.round(tick)] ?? '' },
      splitLine: { lineStyle: { color: FAINT, width: 0.75 } },
    },
  };
}

const SLANT = { degrees: 50, sine: 0.766, cosine: 0.643 };

/** Names upright where they fit or are few, aslant where there is room for that, and else as many of them as fit. */
function namedAxis({ title, names, details }: NamedGroups, left: number, width: number) {
  const slot = width / names.length;
  const widestOf = (texts: readonly string[]) => Math.max(...texts.map((text) => widthOf(text, TICK_SIZE)));
  const full = names.map(oneLine);
  const areUpright = names.length <= 4 || widestOf([...full, ...details]) + 8 <= slot;
  const areAslant = !areUpright && slot >= TICK_SIZE + 4;
  const longest = areUpright ? slot - 8 : areAslant ? (left + slot / 2 - 4) / SLANT.cosine : 120;
  const shown = full.map((name) => fittedMiddle(name, longest, TICK_SIZE));
  const drop = areUpright ? 2 * TICK_SIZE : areAslant ? widestOf(shown) * SLANT.sine + 6 : TICK_SIZE;
  const every = areUpright || areAslant ? 1 : Math.ceil((widestOf(shown) + 12) / slot);
  return {
    height: Math.round(drop) + 40,
    option: {
      ...AXIS_STYLE,
      type: 'category',
      name: oneLine(title),
      data: names.map((_, index) => String(index)),
      axisTick: { ...AXIS_STYLE.axisTick, alignWithLabel: true, interval: 0, show: slot > 3 },
      axisLabel: {
        color: INK,
        fontSize: TICK_SIZE,
        interval: every - 1,
        rotate: areAslant ? SLANT.degrees : 0,
        formatter: (_: string, index: number) => (areUpright ? `${shown[index]}\n${details[index]}` : shown[index]),
      },
    },
  };
}

function heading({ title, caption }: Pick<Plot, 'title' | 'caption'>): object[] {
  const line = (index: number) => MARGIN + LINE_HEIGHT * (index + 0.5);
  const room = WIDTH - 2 * MARGIN;
  return [
    textAt(MARGIN, line(0), fitted(oneLine(title), room, TITLE_SIZE, 'bold'), { size: TITLE_SIZE, weight: 'bold' }),
    ...caption.map((text, index) =>
      textAt(MARGIN, line(index + 1), fitted(oneLine(text), room, TEXT_SIZE), { size: TEXT_SIZE }),
    ),
  ];
}

function uprightMarks({ upright, x }: Plot, { left, right, top, bottom }: Rectangle): object[] {
  if ('names' in x) return [];
  const pixel = (position: number) => left + (position / (x.tickLabels.length - 1)) * (right - left);
  const texts = upright.map(({ text }) => fitted(oneLine(text), WIDTH / 3, LABEL_SIZE));
  const wishes = upright.map(({ at }, i) => ({ at: pixel(at), size: widthOf(texts[i]!, LABEL_SIZE) + 12 }));
  const middles = spread(wishes, 2, WIDTH - 2);
  return upright.flatMap(({ stroke }, i) => {
    const at = wishes[i]!.at;
    const end = top - LEADER_LENGTH;
    return [
      line([at, top, at, bottom], stroke),
      line([at, top, middles[i]!, end + 1], { width: 0.75, ink: GREY }),
      textAt(middles[i]!, end - LABEL_HEIGHT / 2, texts[i]!, { size: LABEL_SIZE, align: 'center' }),
    ];
  });
}

function acrossMarks({ across, x, y }: Plot, { left, right, top, bottom }: Rectangle): object[] {
  const pixel = (position: number) => bottom - (position / (y.tickLabels.length - 1)) * (bottom - top);
  const beginning = (from: number | undefined) =>
    from === undefined || 'names' in x ? left : left + (from / (x.tickLabels.length - 1)) * (right - left);
  const wishes = across.map(({ at }) => ({ at: pixel(at), size: LABEL_HEIGHT }));
  const middles = spread(wishes, top - LABEL_HEIGHT / 2, HEIGHT - MARGIN);
  const room = WIDTH - right - LEADER_LENGTH - MARGIN / 2;
  return across.flatMap(({ text, stroke, from }, i) => {
    const at = wishes[i]!.at;
    const end = right + LEADER_LENGTH;
    return [
      line([beginning(from), at, right, at], stroke),
      line([right, at, end - 2, middles[i]!], { width: 0.75, ink: GREY }),
      textAt(end, middles[i]!, fitted(oneLine(text), room, LABEL_SIZE), { size: LABEL_SIZE }),
    ];
  });
}

const rounded = (pixel: number) => Math.round(pixel * 10) / 10;

function line([x1, y1, x2, y2]: [number, number, number, number], stroke: Stroke): object {
  const shape = { x1: rounded(x1), y1: rounded(y1), x2: rounded(x2), y2: rounded(y2) };
  return { type: 'line', silent: true, z: 3, shape, style: { fill: 'none', ...shapeStyle(stroke) } };
}

interface TextStyle {
  readonly size: number;
  readonly weight?: 'plain' | 'bold';
  readonly align?: 'left' | 'center';
}

function textAt(x: number, y: number, text: string, { size, weight = 'plain', align = 'left' }: TextStyle): object {
  const font = `${weight === 'bold' ? 'bold ' : ''}${size}px sans-serif`;
  const style = { text, font, fill: INK, align, verticalAlign: 'middle' };
  return { type: 'text', silent: true, z: 4, x: rounded(x), y: rounded(y), style };
}
