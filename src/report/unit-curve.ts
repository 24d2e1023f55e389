import { drawFigure, emptyFigure, type FigureOptions, type Mark } from './figure.ts';
import { inductanceAxes } from './inductance-axes.ts';
import {
  bandBar,
  dropLevel_H,
  extentOfLimits,
  type InductanceLimits,
  levelMarks,
  saturationMark,
} from './inductance-limits.ts';
import { pairs, thinned } from './points.ts';
import { INK, lineStyle, STROKES } from './stroke.ts';

/** Differential inductance over current, arrays of equal length, currents ascending. */
export interface InductanceOverCurrent {
  readonly current_A: readonly number[];
  readonly inductance_H: readonly number[];
}

export interface UnitCurveData {
  readonly serial: string;
  readonly lot?: string;
  /** as the rig sent it */
  readonly measured: InductanceOverCurrent;
  /** the characteristic that the judgement used */
  readonly curve: InductanceOverCurrent;
  /** differential inductance at zero current, which the drop is counted from */
  readonly initialInductance_H?: number;
  /** `atLeast`: the sweep ended at this current before the drop was reached */
  readonly dropCurrent?: { readonly current_A: number; readonly atLeast?: boolean };
  readonly limits: InductanceLimits;
}

const MOST_POINTS = 150;
const MOST_VERTICES = 500;

/**
 * One unit's differential inductance over current as SVG: measured points, curve, the drawing's band at its test current, the drop
 * level, the current the drawing demands it at and the one that was found. Points that are not finite are left out.
 */
export function unitCurve(data: UnitCurveData, { id = 'unit-curve' }: FigureOptions = {}): string {
  const { serial, lot, limits, initialInductance_H, dropCurrent } = data;
  const title = `Inductance over current: unit ${serial}${lot === undefined ? '' : `, lot ${lot}`}`;
  const measured = pairs(data.measured.current_A, data.measured.inductance_H);
  const curve = pairs(data.curve.current_A, data.curve.inductance_H);
  if (measured.length + curve.length === 0) return emptyFigure(id, title, 'No measured points to show');

  const extent = extentOfLimits(limits, initialInductance_H);
  const all = [...measured, ...curve];
  const found = dropCurrent === undefined ? [] : [dropCurrent.current_A];
  const { x, y } = inductanceAxes(
    [...all.map(([current]) => current), ...extent.currents, ...found],
    [...all.map(([, inductance]) => inductance), ...extent.inductances],
  );
  const placed = ([current, inductance]: readonly [number, number]) => [x.position(current), y.position(inductance)];
  const foundMark: Mark[] = [];
  const foundPoint: number[][] = [];
  if (dropCurrent && !dropCurrent.atLeast) {
    const { current_A } = dropCurrent;
    foundMark.push({
      at: x.position(current_A),
      text: `found ${x.words(current_A, current_A / 10)}`,
      stroke: STROKES.found,
    });
    if (limits.saturation && initialInductance_H !== undefined) {
      foundPoint.push(placed([current_A, dropLevel_H(initialInductance_H, limits.saturation.inductanceDrop)]));
    }
  }
  const points = thinned(measured, MOST_POINTS);
  const measuredWords =
    points.length < measured.length ? `${points.length} of ${measured.length} measured points` : 'measured';
  const values = [
    ...(initialInductance_H === undefined ? [] : [`L₀ = ${y.words(initialInductance_H, initialInductance_H / 10)}`]),
    ...dropWords(data, x.words),
  ];
  return drawFigure({
    id,
    title,
    caption: [
      [...(points.length > 0 ? [`○ ${measuredWords}`] : []), ...(curve.length > 0 ? ['— curve'] : [])].join('    '),
      ...(values.length > 0 ? [values.join('    ')] : []),
    ],
    x,
    y,
    series: [
      {
        type: 'line',
        data: thinned(curve, MOST_VERTICES).map(placed),
        symbol: 'none',
        lineStyle: lineStyle(STROKES.curve),
        z: 4,
      },
      {
        type: 'scatter',
        data: points.map(placed),
        symbol: 'circle',
        symbolSize: 7,
        itemStyle: { color: '#ffffff', borderColor: INK, borderWidth: 1.25, opacity: 1 },
        z: 5,
      },
      {
        type: 'scatter',
        data: foundPoint,
        symbol: 'diamond',
        symbolSize: 13,
        itemStyle: { color: INK, opacity: 1 },
        z: 6,
      },
      ...bandBar(limits, x, y),
    ],
    upright: [...saturationMark(limits, x), ...foundMark],
    across: levelMarks(limits, initialInductance_H, x, y),
  });
}

function dropWords(
  { dropCurrent, limits }: UnitCurveData,
  words: (value: number, spread?: number) => string,
): string[] {
  if (!dropCurrent) return [];
  const { current_A, atLeast } = dropCurrent;
  const drop = limits.saturation ? ` (${Number((limits.saturation.inductanceDrop * 100).toPrecision(4))} %)` : '';
  const value = words(current_A, current_A / 10);
  return [atLeast ? `drop current${drop} above ${value} (end of sweep)` : `◆ drop current${drop} ${value}`];
}
