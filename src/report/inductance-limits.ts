import type { CustomSeriesOption } from 'echarts/charts';
import type { Axis } from './axis.ts';
import type { Mark } from './figure.ts';
import { INK, STROKES } from './stroke.ts';

/** What a drawing demands of differential inductance over current. */
export interface InductanceLimits {
  /** the band at the test current; a side that is absent is open */
  readonly inductance?: { readonly lower_H?: number; readonly upper_H?: number; readonly testCurrent_A: number };
  readonly saturation?: {
    /** by how much of L₀ the inductance may have fallen at `current_A` */
    readonly inductanceDrop: number;
    readonly current_A: number;
  };
}

/** Differential inductance at which the drop is reached. */
export const dropLevel_H = (initialInductance_H: number, inductanceDrop: number): number =>
  (1 - inductanceDrop) * initialInductance_H;

/** Values that the axes must cover for the limits to be seen. */
export function extentOfLimits({ inductance, saturation }: InductanceLimits, initialInductance_H: number | undefined) {
  const level =
    saturation && initialInductance_H !== undefined
      ? [dropLevel_H(initialInductance_H, saturation.inductanceDrop)]
      : [];
  const { lower_H, upper_H, testCurrent_A } = inductance ?? {};
  return {
    inductances: [lower_H, upper_H, ...level].filter((value) => value !== undefined),
    currents: [testCurrent_A, saturation?.current_A].filter((value) => value !== undefined),
  };
}

/** Horizontal lines: the band's ends from the test current on, and the drop level. */
export function levelMarks(
  { inductance, saturation }: InductanceLimits,
  initialInductance_H: number | undefined,
  current: Axis,
  level: Axis,
): Mark[] {
  const marks: Mark[] = [];
  if (inductance) {
    const { lower_H, upper_H, testCurrent_A } = inductance;
    const from = current.position(testCurrent_A);
    const end = (value: number, sign: string): Mark => ({
      at: level.position(value),
      from,
      text: `${sign} ${level.words(value)} at ${current.words(testCurrent_A)}`,
      stroke: STROKES.leader,
    });
    if (upper_H !== undefined) marks.push(end(upper_H, '≤'));
    if (lower_H !== undefined) marks.push(end(lower_H, '≥'));
  }
  if (saturation && initialInductance_H !== undefined) {
    const { inductanceDrop } = saturation;
    const value = dropLevel_H(initialInductance_H, inductanceDrop);
    const text = `${Number((1 - inductanceDrop).toPrecision(4))}·L₀ = ${level.words(value, value / 10)}`;
    marks.push({ at: level.position(value), text, stroke: STROKES.level });
  }
  return marks;
}

export function saturationMark({ saturation }: InductanceLimits, current: Axis): Mark[] {
  if (!saturation) return [];
  const { current_A } = saturation;
  return [{ at: current.position(current_A), text: `required ≥ ${current.words(current_A)}`, stroke: STROKES.limit }];
}

/** The band at the test current as a heavy bar with caps; an open side has none. */
export function bandBar({ inductance }: InductanceLimits, current: Axis, level: Axis): CustomSeriesOption[] {
  if (!inductance) return [];
  const { lower_H, upper_H, testCurrent_A } = inductance;
  const at = current.position(testCurrent_A);
  const low = lower_H === undefined ? 0 : level.position(lower_H);
  const high = upper_H === undefined ? level.tickLabels.length - 1 : level.position(upper_H);
  return [
    {
      type: 'custom',
      z: 5,
      data: [[at, low, high]],
      renderItem: (_, api) => {
        const [x = 0, bottom = 0] = api.coord([at, low]);
        const [, top = 0] = api.coord([at, high]);
        const style = { stroke: INK, lineWidth: 3, fill: 'none' };
        const line = (x1: number, y1: number, x2: number, y2: number) =>
          ({ type: 'line', shape: { x1, y1, x2, y2 }, style }) as const;
        return {
          type: 'group',
          children: [
            line(x, bottom, x, top),
            ...(lower_H === undefined ? [] : [line(x - 5, bottom, x + 5, bottom)]),
            ...(upper_H === undefined ? [] : [line(x - 5, top, x + 5, top)]),
          ],
        };
      },
    },
  ];
}
