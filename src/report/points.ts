/** The pairs of two arrays in which both numbers are finite. */
export function pairs(xs: readonly number[], ys: readonly number[]): (readonly [number, number])[] {
  return xs
    .map((x, i) => [x, ys[i] ?? Number.NaN] as const)
    .filter(([x, y]) => Number.isFinite(x) && Number.isFinite(y));
}

/** At most `most` of them, evenly by their order, first and last among them. */
export function thinned<T>(points: readonly T[], most: number): readonly T[] {
  if (points.length <= most) return points;
  return Array.from({ length: most }, (_, i) => points[Math.round((i * (points.length - 1)) / (most - 1))]!);
}
