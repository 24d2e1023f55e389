import type { FoldedPiece, RadialPiece } from './offset-density.ts';

/**
 * A rectangle in the plane of the offsets (δ, z), both ≥ 0, with the densities at its edges.
 * `corner`: it touches the origin, where the kernel of two filaments is singular.
 */
export interface Panel {
  readonly radial: RadialPiece;
  readonly axial: FoldedPiece;
  readonly corner: boolean;
}

/** Largest ratio of a panel's far edge to its near edge, and of the two sides of a panel in the corner. */
const GRADING = 3;
/** A ratio that is exactly GRADING but for rounding is not cut once more. */
const ROUNDING_ALLOWANCE = 1 + 1e-9;
/** Relative to the radii, which are about 1: what lies inside a panel this near the origin is below 1e-15 of the whole. */
const SMALLEST = 1e-18;
/**
 * Longest panel in the corner, relative to the greatest of the smaller radii r on it: at z = ±2ir the filaments have another
 * singularity, which the rule of the corner does not know. Along a line through the origin that rule takes less.
 */
const LONGEST_CORNER = 2;
const LONGEST_LINE_CORNER = 1e-2;

/** Appends the panels of one pair of pieces: a geometric series of rectangles around the origin, so few however thin or near. */
export function cutIntoPanels(radial: RadialPiece, axial: FoldedPiece, panels: Panel[]): void {
  const radialEnd = radial.start + radial.width;
  const axialEnd = axial.start + axial.width;
  const near = Math.max(radial.start, axial.start);
  const far = Math.max(radialEnd, axialEnd);
  if (near * GRADING * ROUNDING_ALLOWANCE >= far) {
    panels.push({ radial, axial, corner: false });
    return;
  }
  if (near === 0) {
    const onLine = radial.width === 0 || axial.width === 0;
    const square = Math.min(radialEnd, axialEnd) * GRADING * ROUNDING_ALLOWANCE >= far;
    const longest = (onLine ? LONGEST_LINE_CORNER : LONGEST_CORNER) * Math.max(...radial.upper);
    if (far <= longest && (onLine || square)) {
      panels.push({ radial, axial, corner: true });
      return;
    }
  }
  if (far <= SMALLEST) {
    panels.push({ radial, axial, corner: near === 0 });
    return;
  }
  const at = far / GRADING;
  for (const r of cutRadial(radial, at)) for (const z of cutAxial(axial, at)) cutIntoPanels(r, z, panels);
}

function cutRadial(piece: RadialPiece, at: number): RadialPiece[] {
  const { start, width, density, lower, upper } = piece;
  if (at <= start || at >= start + width) return [piece];
  const [near, far] = [at - start, start + width - at];
  const cut = near / width;
  const [densityAt, lowerAt, upperAt] = [between(density, cut), between(lower, cut), between(upper, cut)];
  return [
    { start, width: near, density: [density[0], densityAt], lower: [lower[0], lowerAt], upper: [upper[0], upperAt] },
    { start: at, width: far, density: [densityAt, density[1]], lower: [lowerAt, lower[1]], upper: [upperAt, upper[1]] },
  ];
}

function cutAxial(piece: FoldedPiece, at: number): FoldedPiece[] {
  const { start, width, density, oddDensity } = piece;
  if (at <= start || at >= start + width) return [piece];
  const [near, far] = [at - start, start + width - at];
  const middle = between(density, near / width);
  const oddMiddle = between(oddDensity, near / width);
  return [
    { start, width: near, density: [density[0], middle], oddDensity: [oddDensity[0], oddMiddle] },
    { start: at, width: far, density: [middle, density[1]], oddDensity: [oddMiddle, oddDensity[1]] },
  ];
}

/** Value at a fraction of the way between two ends. */
export function between([from, to]: readonly [number, number], fraction: number): number {
  return from * (1 - fraction) + to * fraction;
}

/** Mass of a side: the integral of its density; a side without width is a unit mass. */
export function massOf(width: number, density: readonly [number, number]): number {
  return width === 0 ? 1 : (width * (density[0] + density[1])) / 2;
}
