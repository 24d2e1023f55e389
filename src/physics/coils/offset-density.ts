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

/** A piece of the radial offset on one side of zero. */
export interface SignedPiece extends OffsetPiece {
  readonly sign: 1 | -1;
}

/**
 * Offset r₂ − r₁ of r₁ uniform in [inner₁, outer₁] and r₂ in [inner₂, outer₂] (m; equal ends: a fixed radius), cut at zero and at
 * the trapezoid's corners. Equal intervals give one side with twice the density: the other is its mirror image.
 */
export function radialOffsets(inner1: number, outer1: number, inner2: number, outer2: number): SignedPiece[] {
  const build1 = outer1 - inner1;
  const build2 = outer2 - inner2;
  const least = Math.min(build1, build2);
  const most = Math.max(build1, build2);
  if (most === 0) {
    const offset = inner2 - inner1;
    return [{ start: Math.abs(offset), width: 0, density: [1, 1], sign: offset < 0 ? -1 : 1 }];
  }
  const height = 1 / most;
  if (inner1 === inner2 && outer1 === outer2) {
    return [{ start: 0, width: most, density: [2 * height, 0], sign: 1 }];
  }
  // Widths from the builds, not from differences of far corners, which would lose a thin winding's digits.
  const flatFrom = Math.min(inner2 - inner1, outer2 - outer1);
  const flatTo = Math.max(inner2 - inner1, outer2 - outer1);
  return [
    ...cutAtZero(inner2 - outer1, flatFrom, least, 0, height),
    ...cutAtZero(flatFrom, flatTo, most - least, height, height),
    ...cutAtZero(flatTo, outer2 - inner1, least, height, 0),
  ];
}

function cutAtZero(from: number, to: number, width: number, atFrom: number, atTo: number): SignedPiece[] {
  if (width === 0) return [];
  if (from >= 0) return [{ start: from, width, density: [atFrom, atTo], sign: 1 }];
  if (to <= 0) return [{ start: -to, width, density: [atTo, atFrom], sign: -1 }];
  const atZero = atFrom + (atTo - atFrom) * (-from / width);
  return [
    { start: 0, width: -from, density: [atZero, atFrom], sign: -1 },
    { start: 0, width: to, density: [atZero, atTo], sign: 1 },
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
  return least === 0 ? foldedBox(most, distance) : foldedTrapezoid(most, least, distance);
}

function foldedBox(length: number, distance: number): FoldedPiece[] {
  const half = length / 2;
  const height = 1 / length;
  if (distance >= half) {
    return [{ start: distance - half, width: length, density: [height, height], oddDensity: [height, height] }];
  }
  const pieces: FoldedPiece[] = [
    { start: 0, width: half - distance, density: [2 * height, 2 * height], oddDensity: [0, 0] },
  ];
  if (distance > 0) {
    const width = 2 * distance;
    pieces.push({ start: half - distance, width, density: [height, height], oddDensity: [height, height] });
  }
  return pieces;
}

/**
 * The corners of the trapezoid lie at `distance` ± (most ± least)/2. Each is kept as a rounded sum and what rounding left over, so
 * that the width between two of them is right however close they are, and the densities are summed from those widths.
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
  const straddles = distance < outer[0];
  const marks = straddles ? [[0, 0] as const, ...corners] : corners;
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
