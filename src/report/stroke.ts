/** Lines tell themselves apart by dashes and width, in black and grey: figures are printed and read without colour. */
export interface Stroke {
  readonly width: number;
  readonly ink: string;
  /** lengths drawn and left out in turn, in pixels; absent: solid */
  readonly dashes?: readonly number[];
}

export const INK = '#000000';
export const GREY = '#595959';
export const FAINT = '#d9d9d9';

export const STROKES = {
  curve: { width: 2, ink: INK },
  limit: { width: 1.5, ink: INK, dashes: [9, 4] },
  level: { width: 1.5, ink: INK, dashes: [2, 3] },
  found: { width: 1.5, ink: INK, dashes: [10, 3, 2, 3] },
  quartile: { width: 1.25, ink: INK, dashes: [5, 3] },
  tail: { width: 1.25, ink: INK, dashes: [1.5, 2.5] },
  leader: { width: 0.75, ink: GREY, dashes: [1, 5] },
} as const satisfies Record<string, Stroke>;

export const lineStyle = ({ width, ink, dashes }: Stroke) => ({
  width,
  color: ink,
  type: dashes === undefined ? ('solid' as const) : [...dashes],
});

export const shapeStyle = ({ width, ink, dashes }: Stroke) => ({
  lineWidth: width,
  stroke: ink,
  ...(dashes === undefined ? {} : { lineDash: [...dashes] }),
});
