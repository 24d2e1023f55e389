import { gaussLegendre } from '../numerics/quadrature.ts';
import { type FilamentPair, filamentPair } from './filament-pair.ts';
import { axialOffsets, type FoldedPiece, type OffsetPiece, radialOffsets, type SignedPiece } from './offset-density.ts';
import { cutIntoPanels, type Panel } from './offset-panels.ts';

/**
 * A coaxial winding section: the rectangle in the half-plane (r, z) that carries uniform current density. A cylindrical current
 * sheet (equal radii) and a filament (equal radii, no length) are its limits.
 */
export interface WindingSection {
  readonly innerRadius_m: number;
  readonly outerRadius_m: number;
  readonly length_m: number;
}

/** M/µ0 in m and (dM/dz)/µ0 of two windings of one turn each. */
export interface SectionAverage {
  readonly mutualPerMu0_m: number;
  readonly slopePerMu0: number;
}

/** Relative error aimed at on each panel; what the sum over the panels reaches was measured (see multilayer.ts, mutual.ts). */
const PANEL_TOLERANCE = 1e-12;
const MOST_POINTS = 40;
/** Points a natural-log digit that t⁵ log t takes, found by trial: 14 for 1e-11. */
const POINTS_PER_DIGIT = 0.55;

/**
 * Mutual inductance of two filaments, and where `withSlope` its derivative by their axial distance, averaged over two sections
 * whose centres are `axialDistance_m` apart. A section with itself gives the self-inductance of a thick coil. Exchanging the
 * sections gives the same numbers to the last digit. Sections may overlap; coincident filaments have no finite value.
 *
 * The average over four coordinates becomes one over three, with known linear densities p and w of the offsets (δ, z):
 *
 *     ∫ p(δ) dδ ∫ w(z) dz · mean of M(r̄, δ, z) over the mean radii r̄ that the radial offset δ leaves.
 *
 * All of it is positive, so nothing cancels, however far, thin or long the windings are; what is left is to place the points.
 * M is analytic but for δ = ±iz (log-singular at δ = z = 0) and z = ±2ir̄, so:
 * - panels of the (δ, z) plane shrink geometrically towards the origin; on each, Gauss-Legendre converges as ρ^(−2n), ρ the sum of
 *   the half-axes of the ellipse through the nearest singularity (L. N. Trefethen, Approximation Theory and Approximation
 *   Practice, 2013, ch. 19), and that gives n;
 * - a panel at the origin is cut into two triangles, each integrated outwards from the origin (M. G. Duffy, SIAM J. Numer. Anal.
 *   19 (1982) 1260-1262), the distance being t³, which leaves t⁵ log t of the singularity;
 * - a mean radius that comes near the axis, where M goes as r̄ log r̄, is taken as t³ likewise;
 * - a panel gets the digits that its share in the whole calls for, so the many small ones by the origin cost little.
 */
export function averageOverSections(
  first: WindingSection,
  second: WindingSection,
  axialDistance_m: number,
  withSlope: boolean,
): SectionAverage {
  // Lengths relative to the radii, so that squares neither overflow nor underflow; a power of two, so that nothing is rounded.
  const size = 2 ** Math.floor(Math.log2(Math.max(first.outerRadius_m, second.outerRadius_m)));
  const [a, b] = inOrder(scaled(first, size), scaled(second, size));
  const axial = axialOffsets(a.length_m, b.length_m, Math.abs(axialDistance_m) / size);
  const panels: Panel[] = [];
  for (const radial of radialOffsets(a.innerRadius_m, a.outerRadius_m, b.innerRadius_m, b.outerRadius_m)) {
    for (const piece of axial) cutIntoPanels(radial, piece, panels);
  }
  const shares = panels.map((panel) => roughly(panel, a, b));
  const whole = shares.reduce((sum, { mutual, slope }) => ({ mutual: sum.mutual + mutual, slope: sum.slope + slope }));
  const sum = new PanelSum(a, b);
  panels.forEach((panel, i) => {
    const mutualShare = shares[i]!.mutual / whole.mutual;
    const slopeShare = withSlope && whole.slope !== 0 ? shares[i]!.slope / whole.slope : 0;
    const digits = Math.log(Math.max(1, Math.max(mutualShare, slopeShare) / PANEL_TOLERANCE));
    if (panel.corner) sum.addCorner(panel, digits);
    else sum.addPanel(panel, digits);
  });
  return { mutualPerMu0_m: sum.mutual * size, slopePerMu0: axialDistance_m < 0 ? -sum.slope : sum.slope };
}

function scaled(section: WindingSection, size: number): WindingSection {
  return {
    innerRadius_m: section.innerRadius_m / size,
    outerRadius_m: section.outerRadius_m / size,
    length_m: section.length_m / size,
  };
}

function inOrder(first: WindingSection, second: WindingSection): [WindingSection, WindingSection] {
  const difference =
    first.innerRadius_m - second.innerRadius_m ||
    first.outerRadius_m - second.outerRadius_m ||
    first.length_m - second.length_m;
  return difference > 0 ? [second, first] : [first, second];
}

/** The panel's contribution by one point in its middle: enough to know its share. */
function roughly({ radial, axial }: Panel, a: WindingSection, b: WindingSection): FilamentPair {
  const offset = radial.start + radial.width / 2;
  const share: FilamentPair = { mutual: 0, slope: 0 };
  const [low, high] = meanRadii(a, b, radial.sign * offset);
  filamentPair((low + high) / 2, offset, axial.start + axial.width / 2, share);
  const radialMass = mass(radial.width, radial.density);
  share.mutual *= radialMass * mass(axial.width, axial.density);
  share.slope *= radialMass * mass(axial.width, axial.oddDensity);
  return share;
}

function mass(width: number, density: readonly [number, number]): number {
  return width === 0 ? 1 : (width * (density[0] + density[1])) / 2;
}

/** The interval of (r₁ + r₂)/2 for r₁ in one section, r₂ in the other and r₂ − r₁ = offset. */
function meanRadii(a: WindingSection, b: WindingSection, offset: number): [number, number] {
  const low = Math.max(a.innerRadius_m + offset / 2, b.innerRadius_m - offset / 2);
  const high = Math.min(a.outerRadius_m + offset / 2, b.outerRadius_m - offset / 2);
  return low < high ? [low, high] : [(low + high) / 2, (low + high) / 2];
}

/**
 * Gauss-Legendre points for `digits` natural-log digits on [start, start + width], the integrand's nearest singularities being
 * at ±i·`height`.
 */
function points(start: number, width: number, height: number, digits: number, extra: number): number {
  if (width === 0) return 1;
  const end = start + width;
  const semiAxis = (Math.sqrt(start * start + height * height) + Math.sqrt(end * end + height * height)) / width;
  const rho = semiAxis + Math.sqrt(Math.max(0, semiAxis * semiAxis - 1));
  return Math.min(MOST_POINTS, Math.ceil(digits / (2 * Math.log(rho)) + extra));
}

/** The running sums of M and dM/dz over the panels, with the rule in the mean radius that is in use. */
class PanelSum {
  mutual = 0;
  slope = 0;
  readonly #a: WindingSection;
  readonly #b: WindingSection;
  /** Build over outer radius of the fatter section: how far the low powers of the radii in M vary over it. */
  readonly #fatness: number;
  readonly #pair: FilamentPair = { mutual: 0, slope: 0 };
  readonly #radii = new Float64Array(MOST_POINTS);
  readonly #weights = new Float64Array(MOST_POINTS);
  #radiusCount = 0;

  constructor(a: WindingSection, b: WindingSection) {
    this.#a = a;
    this.#b = b;
    this.#fatness = Math.max(1 - a.innerRadius_m / a.outerRadius_m, 1 - b.innerRadius_m / b.outerRadius_m);
  }

  /** A panel clear of the origin: a product rule. */
  addPanel({ radial, axial }: Panel, digits: number): void {
    const radialPoints = Math.max(
      points(radial.start, radial.width, axial.start, digits, 1 + 2 * this.#fatness),
      radial.width === 0 ? 1 : this.#pointsForPowers(digits, 4),
    );
    const radialRule = gaussLegendre(radialPoints);
    const axialRule = gaussLegendre(points(axial.start, axial.width, radial.start, digits, 2));
    for (let i = 0; i < radialPoints; i++) {
      const s = (1 + radialRule.nodes[i]!) / 2;
      this.#placeMeanRadii(radial, s, axial.start, digits);
      for (let j = 0; j < axialRule.nodes.length; j++) {
        const t = (1 + axialRule.nodes[j]!) / 2;
        this.#addPoint(radial, s, axial, t, (radialRule.weights[i]! * axialRule.weights[j]!) / 4);
      }
    }
  }

  /** A panel with a corner at the origin: outwards in u = t³ (u = t⁶ along a line), across in the two triangles. */
  addCorner({ radial, axial }: Panel, digits: number): void {
    const outward = gaussLegendre(Math.max(2, Math.ceil(digits * POINTS_PER_DIGIT)));
    const onLine = radial.width === 0 || axial.width === 0;
    const across = onLine
      ? ([[1, true]] as const)
      : ([
          [points(0, 1, radial.width / axial.width, digits, 1), true],
          [points(0, 1, axial.width / radial.width, digits, 1), false],
        ] as const);
    for (let i = 0; i < outward.nodes.length; i++) {
      const t = (1 + outward.nodes[i]!) / 2;
      const u = onLine ? t ** 6 : t ** 3;
      const step = (outward.weights[i]! / 2) * (onLine ? 6 * t ** 5 : 3 * t * t * u);
      for (const [count, byRadius] of across) {
        const rule = gaussLegendre(count);
        for (let j = 0; j < count; j++) {
          const v = (u * (1 + rule.nodes[j]!)) / 2;
          const s = onLine || byRadius ? u : v;
          if (j === 0 || !byRadius) this.#placeMeanRadii(radial, s, 0, digits);
          this.#addPoint(radial, s, axial, onLine || !byRadius ? u : v, (step * rule.weights[j]!) / 2);
        }
      }
    }
  }

  /** Adds the kernel at fractions `s` and `t` of the panel's sides, averaged over the placed mean radii. */
  #addPoint(radial: OffsetPiece, s: number, axial: FoldedPiece, t: number, weight: number): void {
    const offset = radial.start + radial.width * s;
    const height = axial.start + axial.width * t;
    let mutual = 0;
    let slope = 0;
    for (let k = 0; k < this.#radiusCount; k++) {
      filamentPair(this.#radii[k]!, offset, height, this.#pair);
      mutual += this.#weights[k]! * this.#pair.mutual;
      slope += this.#weights[k]! * this.#pair.slope;
    }
    const radialWeight = weight * massDensity(radial.width, radial.density, s);
    this.mutual += radialWeight * massDensity(axial.width, axial.density, t) * mutual;
    this.slope += radialWeight * massDensity(axial.width, axial.oddDensity, t) * slope;
  }

  /** Rule for the mean over the mean radii at fraction `s` of the radial side, on a panel that begins at axial offset `height`. */
  #placeMeanRadii(radial: SignedPiece, s: number, height: number, digits: number): void {
    const [low, high] = meanRadii(this.#a, this.#b, radial.sign * (radial.start + radial.width * s));
    const extent = high - low;
    if (extent === 0) {
      this.#radiusCount = 1;
      this.#radii[0] = low;
      this.#weights[0] = 1;
      return;
    }
    const direct = Math.max(
      points(low, extent, height / 2, digits, 1 + 2 * this.#fatness),
      this.#pointsForPowers(digits, 3),
    );
    const lowRoot = Math.cbrt(low);
    const rootExtent = Math.cbrt(high) - lowRoot;
    const byRoot = Math.min(
      points(lowRoot, rootExtent, Math.cbrt(height / 2), digits, 3),
      Math.max(2, Math.ceil(digits * POINTS_PER_DIGIT)),
    );
    // A root far from zero would lose its extent to rounding.
    const useRoot = byRoot < direct && low < high / 4;
    const rule = gaussLegendre(useRoot ? byRoot : direct);
    this.#radiusCount = rule.nodes.length;
    for (let k = 0; k < this.#radiusCount; k++) {
      const t = (1 + rule.nodes[k]!) / 2;
      const root = lowRoot + rootExtent * t;
      this.#radii[k] = useRoot ? root * root * root : low + extent * t;
      this.#weights[k] = (rule.weights[k]! / 2) * (useRoot ? (3 * root * root * rootExtent) / extent : 1);
    }
  }

  /** Points for the powers of the radii alone, at most `most`: with those the rule is exact for r₁²r₂² and its weights. */
  #pointsForPowers(digits: number, most: number): number {
    const semiAxis = 2 / this.#fatness - 1;
    const rho = semiAxis + Math.sqrt(Math.max(0, semiAxis * semiAxis - 1));
    return Math.min(most, Math.ceil(digits / (2 * Math.log(rho)) + 1));
  }
}

/** Density times width at a fraction of the piece: what a rule on (0, 1) weighs. */
function massDensity(width: number, density: readonly [number, number], fraction: number): number {
  return width === 0 ? 1 : width * (density[0] + (density[1] - density[0]) * fraction);
}
