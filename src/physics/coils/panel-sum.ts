import { gaussLegendre } from '../numerics/quadrature.ts';
import { type FilamentPair, filamentPair } from './filament-pair.ts';
import type { FoldedPiece, RadialPiece } from './offset-density.ts';
import { between, type Panel } from './offset-panels.ts';

const MOST_POINTS = 40;
/** Points that ∫ t⁵ log t takes a natural-log digit, found by trial: 14 for 1e-11. */
const POINTS_PER_DIGIT = 0.55;

/**
 * Gauss-Legendre points for `digits` natural-log digits on [start, start + width], the integrand's nearest singularities being
 * at ±i·`height`: convergence goes as ρ^(−2n), ρ the sum of the half-axes of the ellipse about the interval that passes through
 * them (L. N. Trefethen, Approximation Theory and Approximation Practice, 2013, ch. 19).
 */
function points(start: number, width: number, height: number, digits: number, extra: number): number {
  if (width === 0) return 1;
  const end = start + width;
  const semiAxis = (Math.sqrt(start * start + height * height) + Math.sqrt(end * end + height * height)) / width;
  return Math.min(MOST_POINTS, Math.ceil(digits / (2 * Math.log(axesOf(semiAxis))) + extra));
}

/** Sum of the half-axes of an ellipse with foci ±1 from the greater of them. */
function axesOf(semiAxis: number): number {
  return semiAxis + Math.sqrt(Math.max(0, semiAxis * semiAxis - 1));
}

/**
 * The running sums of M/µ0 and (dM/dz)/µ0 over the panels of the offsets (δ, z).
 *
 * - A panel clear of the origin has a product rule.
 * - One with a corner at the origin is cut into two triangles, each integrated outwards from the origin (M. G. Duffy, SIAM J. Numer.
 *   Anal. 19 (1982) 1260-1262) over a distance that is taken as t³, which leaves t⁵ log t of the singularity.
 * - The mean over the radii has a rule of its own at each δ, in the cube root where it comes near the axis: there M goes as
 *   r̄ log r̄, with r̄ = r + δ/2 the mean of both radii, and that becomes t⁵ log t as well.
 */
export class PanelSum {
  mutual = 0;
  slope = 0;
  /** Build over outer radius of the fatter section: how far the low powers of the radii in M vary over it. */
  readonly #fatness: number;
  readonly #withSlope: boolean;
  readonly #pair: FilamentPair = { mutual: 0, slope: 0 };
  /** The rule in the smaller radius that is in use. */
  readonly #radii = new Float64Array(MOST_POINTS);
  readonly #weights = new Float64Array(MOST_POINTS);
  #radiusCount = 0;

  constructor(fatness: number, withSlope: boolean) {
    this.#fatness = fatness;
    this.#withSlope = withSlope;
  }

  /** A panel clear of the origin, to `digits` natural-log digits. */
  addPanel({ radial, axial }: Panel, digits: number): void {
    const radialPoints = Math.max(
      points(radial.start, radial.width, axial.start, digits, 1 + 2 * this.#fatness),
      radial.width === 0 ? 1 : this.#pointsForPowers(digits, 4),
    );
    const radialRule = gaussLegendre(radialPoints);
    // One point more for the fall of M with distance, or for the slope's poles.
    const fall = axial.start > 0 || this.#withSlope ? 2 : 1;
    const axialRule = gaussLegendre(points(axial.start, axial.width, radial.start, digits, fall));
    for (let i = 0; i < radialPoints; i++) {
      const s = (1 + radialRule.nodes[i]!) / 2;
      this.#placeRadii(radial, s, axial.start, digits);
      for (let j = 0; j < axialRule.nodes.length; j++) {
        const t = (1 + axialRule.nodes[j]!) / 2;
        this.#addPoint(radial, s, axial, t, (radialRule.weights[i]! * axialRule.weights[j]!) / 4);
      }
    }
  }

  /** A panel with a corner at the origin; where one side has no width, a line from it. */
  addCorner(panel: Panel, digits: number): void {
    const { radial, axial } = panel;
    if (radial.width === 0 || axial.width === 0) {
      this.#addLine(panel, digits);
      return;
    }
    const outward = gaussLegendre(Math.max(2, Math.ceil(digits * POINTS_PER_DIGIT)));
    const acrossAxial = gaussLegendre(points(0, 1, radial.width / axial.width, digits, 1));
    const acrossRadial = gaussLegendre(points(0, 1, axial.width / radial.width, digits, 1));
    for (let i = 0; i < outward.nodes.length; i++) {
      const t = (1 + outward.nodes[i]!) / 2;
      const u = t ** 3;
      const step = (outward.weights[i]! / 4) * 3 * t * t * u;
      this.#placeRadii(radial, u, 0, digits);
      for (let j = 0; j < acrossAxial.nodes.length; j++) {
        const v = (u * (1 + acrossAxial.nodes[j]!)) / 2;
        this.#addPoint(radial, u, axial, v, step * acrossAxial.weights[j]!);
      }
      for (let j = 0; j < acrossRadial.nodes.length; j++) {
        const v = (u * (1 + acrossRadial.nodes[j]!)) / 2;
        this.#placeRadii(radial, v, 0, digits);
        this.#addPoint(radial, v, axial, u, step * acrossRadial.weights[j]!);
      }
    }
  }

  /** Along a line there is one power of the distance less, so it is taken as t⁶. */
  #addLine({ radial, axial }: Panel, digits: number): void {
    const outward = gaussLegendre(Math.max(2, Math.ceil(digits * POINTS_PER_DIGIT)));
    for (let i = 0; i < outward.nodes.length; i++) {
      const t = (1 + outward.nodes[i]!) / 2;
      this.#placeRadii(radial, t ** 6, 0, digits);
      this.#addPoint(radial, t ** 6, axial, t ** 6, (outward.weights[i]! / 2) * 6 * t ** 5);
    }
  }

  /** Adds the kernel at fractions `s` and `t` of the panel's sides, averaged over the placed radii. */
  #addPoint(radial: RadialPiece, s: number, axial: FoldedPiece, t: number, weight: number): void {
    const offset = radial.start + radial.width * s;
    const height = axial.start + axial.width * t;
    let mutual = 0;
    let slope = 0;
    for (let k = 0; k < this.#radiusCount; k++) {
      filamentPair(this.#radii[k]!, offset, height, this.#withSlope, this.#pair);
      mutual += this.#weights[k]! * this.#pair.mutual;
      slope += this.#weights[k]! * this.#pair.slope;
    }
    const radialWeight = weight * sideWeight(radial.width, radial.density, s);
    this.mutual += radialWeight * sideWeight(axial.width, axial.density, t) * mutual;
    this.slope += radialWeight * sideWeight(axial.width, axial.oddDensity, t) * slope;
  }

  /** Rule for the mean over the smaller radius at fraction `s` of the radial side, on a panel that begins at axial offset `height`. */
  #placeRadii(radial: RadialPiece, s: number, height: number, digits: number): void {
    const low = between(radial.lower, s);
    const extent = between(radial.upper, s) - low;
    if (!(extent > 0)) {
      this.#radiusCount = 1;
      this.#radii[0] = low;
      this.#weights[0] = 1;
      return;
    }
    const halfOffset = (radial.start + radial.width * s) / 2;
    const direct = Math.max(
      points(low + halfOffset, extent, height / 2, digits, 1 + 2 * this.#fatness),
      this.#pointsForPowers(digits, 3),
    );
    const lowRoot = Math.cbrt(low + halfOffset);
    const rootExtent = Math.cbrt(low + extent + halfOffset) - lowRoot;
    const byRoot = Math.min(
      points(lowRoot, rootExtent, Math.cbrt(height / 2), digits, 3),
      Math.max(2, Math.ceil(digits * POINTS_PER_DIGIT)),
    );
    // Roots that are close together would lose their difference to rounding.
    const useRoot = byRoot < direct && low + halfOffset < (low + extent + halfOffset) / 4;
    const rule = gaussLegendre(useRoot ? byRoot : direct);
    this.#radiusCount = rule.nodes.length;
    for (let k = 0; k < this.#radiusCount; k++) {
      const t = (1 + rule.nodes[k]!) / 2;
      const root = lowRoot + rootExtent * t;
      this.#radii[k] = useRoot ? root ** 3 - halfOffset : low + extent * t;
      this.#weights[k] = (rule.weights[k]! / 2) * (useRoot ? (3 * root * root * rootExtent) / extent : 1);
    }
  }

  /** Points for the powers of the radii alone, at most `most`: with those the rule is exact for r₁²r₂² and its weights. */
  #pointsForPowers(digits: number, most: number): number {
    return Math.min(most, Math.ceil(digits / (2 * Math.log(axesOf(2 / this.#fatness - 1))) + 1));
  }
}

/** Density times width at a fraction of the side: what a rule on (0, 1) weighs. */
function sideWeight(width: number, density: readonly [number, number], fraction: number): number {
  return width === 0 ? 1 : width * between(density, fraction);
}
