/**
 * How the offset between two points is distributed when each is uniform over an interval of its own: the trapezoid that turns
 * an average over two windings into an average over their offsets, with one dimension less.
 */

/** One piece on which densities are linear: `start` ≥ 0 and `width` in m, densities in 1/m at the two ends. Width 0: a unit mass. */
export interface OffsetPiece {
  readonly start: number;
  readonly width: number;
  readonly density: readonly [number, number];
}

/** A piece of the axial offset folded to z ≥ 0: p(z) + p(−z), and p(z) − p(−z), which weighs what is odd in z. */
export interface FoldedPiece extends OffsetPiece {
  readonly oddDensity: readonly [number, number];
}

/** A piece of the radial offset δ = |r₂ − r₁|, with the interval that it leaves for the smaller of the radii, at its two ends. */
export interface RadialPiece extends OffsetPiece {
  readonly lower: readonly [number, number];
  readonly upper: readonly [number, number];
}

/** An interval of radii in m; equal ends: a fixed radius. */
export type Radii = readonly [inner: number, outer: number];

/**
 * Distance of two radii, each uniform in an interval of its own, cut at the corners of the trapezoid. Equal intervals give twice
 * the density of one side: the other is its mirror image.
 */
export function radialOffsets(first: Radii, second: Radii): RadialPiece[] {
  const height = 1 / Math.max(first[1] - first[0], second[1] - second[0]);
  if (height === Infinity) {
    const radius = Math.min(first[0], second[0]);
    const start = Math.abs(first[0] - second[0]);
    return [{ start, width: 0, density: [1, 1], lower: [radius, radius], upper: [radius, radius] }];
  }
  if (first[0] === second[0] && first[1] === second[1]) {
    const [inner, outer] = first;
    return [{ start: 0, width: outer - inner, density: [2 * height, 0], lower: [inner, inner], upper: [outer, inner] }];
  }
  return [...outwardOffsets(first, second, height), ...outwardOffsets(second, first, height)];
}

interface Corner {
  readonly at: number;
  readonly density: number;
  readonly lower: number;
  readonly upper: number;
}

/**
 * Offsets of the points whose radius in the second interval is the greater. At the trapezoid's corners the smaller radius is known without a subtraction
 * from the greater, in which a coil near the axis would lose its digits; between them everything is linear.
 */
function outwardOffsets([a1, b1]: Radii, [a2, b2]: Radii, height: number): RadialPiece[] {
  const [build1, build2] = [b1 - a1, b2 - a2];
  const least = Math.min(build1, build2);
  const corners: Corner[] = [
    { at: a2 - b1, density: 0, lower: b1, upper: b1 },
    build1 <= build2
      ? { at: a2 - a1, density: height, lower: a1, upper: b1 }
      : { at: b2 - b1, density: height, lower: b1 - build2, upper: b1 },
    build1 <= build2
      ? { at: b2 - b1, density: height, lower: a1, upper: b1 }
      : { at: a2 - a1, density: height, lower: a1, upper: a1 + build2 },
    { at: b2 - a1, density: 0, lower: a1, upper: a1 },
  ];
  // Widths from the builds, not from differences of far corners, in which a thin winding would lose its digits.
  return [least, Math.abs(build1 - build2), least].flatMap((width, i) =>
    width === 0 ? [] : piecesFrom(corners[i]!, corners[i + 1]!, width),
  );
}

function piecesFrom(from: Corner, to: Corner, width: number): RadialPiece[] {
  if (to.at <= 0) return [];
  const cut = from.at < 0 ? -from.at / width : 0;
  const mixed = (start: number, end: number): [number, number] => [start * (1 - cut) + end * cut, end];
  return [
    {
      start: Math.max(0, from.at),
      width: from.at < 0 ? to.at : width,
      density: mixed(from.density, to.density),
      lower: mixed(from.lower, to.lower),
      upper: mixed(from.upper, to.upper),
    },
  ];
}

/**
 * Axial offset of two points uniform over lengths `length1` and `length2` (m, zero allowed) whose centres are `distance` ≥ 0 apart,
 * folded to z ≥ 0.
 */
export function axialOffsets(length1: number, length2: number, distance: number): FoldedPiece[] {
  const most = Math.max(length1, length2);
  const least = Math.min(length1, length2);
  if (most === 0) return [{ start: distance, width: 0, density: [1, 1], oddDensity: [1, 1] }];
  if (distance >= (most + least) / 2) return trapezoidApart(most, least, distance);
  return least === 0 ? foldedBox(most, distance) : foldedTrapezoid(most, least, distance);
}

/** Nothing to fold: the trapezoid rises over the lesser length, stays for the difference, and falls. */
function trapezoidApart(most: number, least: number, distance: number): FoldedPiece[] {
  const height = 1 / most;
  const sides = [
    { start: distance - (most + least) / 2, width: least, density: [0, height] },
    { start: distance - (most - least) / 2, width: most - least, density: [height, height] },
    { start: distance + (most - least) / 2, width: least, density: [height, 0] },
  ] as const;
  return sides.filter(({ width }) => width > 0).map((side) => ({ ...side, oddDensity: side.density }));
}

/** One length is zero, and the other reaches over the origin. */
function foldedBox(length: number, distance: number): FoldedPiece[] {
  const start = length / 2 - distance;
  const height = 1 / length;
  const both: FoldedPiece = { start: 0, width: start, density: [2 * height, 2 * height], oddDensity: [0, 0] };
  if (distance === 0) return [both];
  return [both, { start, width: 2 * distance, density: [height, height], oddDensity: [height, height] }];
}

/**
 * Both lengths count, and the trapezoid reaches over the origin. Its corners lie at `distance` ± (most ± least)/2; each is kept as
 * a rounded sum and what rounding left over, so that the width between two of them is right however close they are, and the
 * densities are summed from those widths: the odd one is right however small `distance` is.
 */
function foldedTrapezoid(most: number, least: number, distance: number): FoldedPiece[] {
  const outer = exactSum(most / 2, least / 2);
  const inner = exactSum(most / 2, -least / 2);
  const corners = [outer, inner, negative(inner), negative(outer)]
    .map(([high, low]) => {
      const [sum, rest] = exactSum(distance, high);
      return sum < 0 ? negative([sum, rest + low]) : ([sum, rest + low] as const);
    })
    .sort((first, second) => first[0] - second[0] || first[1] - second[1]);
  const marks = [[0, 0] as const, ...corners];
  const widths = marks.slice(1).map((mark, i) => Math.max(0, mark[0] - marks[i]![0] + (mark[1] - marks[i]![1])));
  // Slope of p at offset z, in units of 1/(most·least): +1 on the rising side, −1 on the falling one.
  const slope = (z: number): number => {
    const t = z - distance;
    return Math.abs(t) >= outer[0] || Math.abs(t) <= inner[0] ? 0 : -Math.sign(t);
  };
  const even = new Float64Array(marks.length);
  const odd = new Float64Array(marks.length);
  for (let i = 0; i < widths.length; i++) {
    const middle = marks[i]![0] + widths[i]! / 2;
    odd[i + 1] = odd[i]! + ((slope(middle) + slope(-middle)) * widths[i]!) / most / least;
  }
  for (let i = widths.length - 1; i >= 0; i--) {
    const middle = marks[i]![0] + widths[i]! / 2;
    even[i] = even[i + 1]! - ((slope(middle) - slope(-middle)) * widths[i]!) / most / least;
  }
  return widths.flatMap((width, i) =>
    width > 0
      ? [{ start: marks[i]![0], width, density: [even[i]!, even[i + 1]!], oddDensity: [odd[i]!, odd[i + 1]!] }]
      : [],
  );
}

type Sum = readonly [rounded: number, rest: number];

/** a + b as its rounded value and the exact rest (D. E. Knuth's two-sum). */
function exactSum(a: number, b: number): Sum {
  const sum = a + b;
  const part = sum - a;
  return [sum, a - (sum - part) + (b - part)];
}

function negative([rounded, rest]: Sum): Sum {
  return [-rounded, -rest];
}
