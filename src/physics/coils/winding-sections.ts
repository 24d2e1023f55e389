import { type FilamentPair, filamentPair } from './filament-pair.ts';
import { axialOffsets, radialOffsets } from './offset-density.ts';
import { cutIntoPanels, massOf, type Panel } from './offset-panels.ts';
import { PanelSum } from './panel-sum.ts';

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

/**
 * Relative error aimed at on each panel, for thick sections and for sheets and filaments, whose single integral is cheap. What the
 * sum over the panels reaches was measured (see multilayer.ts, mutual.ts).
 */
const PANEL_TOLERANCE = 2e-12;
const LINE_TOLERANCE = 1e-15;

/**
 * Mutual inductance of two filaments, and where `withSlope` its derivative by their axial distance, averaged over two sections
 * whose centres are `axialDistance_m` apart. A section with itself gives the self-inductance of a thick coil. Exchanging the
 * sections gives the same numbers to the last digit. Sections may overlap; coincident filaments have no finite value.
 *
 * The average over four coordinates becomes one over three, with linear densities p and w of the offsets (δ, z):
 *
 *     ∫ p(δ) dδ ∫ w(z) dz · mean of M(r, δ, z) over the smaller radii r that the radial offset δ leaves.
 *
 * All of it is positive, so nothing cancels, however far, thin or long the windings are; what is left is to place the points.
 * M is analytic but for δ = ±iz (log-singular at δ = z = 0) and 2r + δ = ±iz. So panels of the (δ, z) plane shrink geometrically
 * towards the origin (offset-panels.ts), each with the rule that its distance from the singularities calls for (panel-sum.ts),
 * to the digits that its share in the whole calls for: the many small ones by the origin cost little.
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
  for (const radial of radialOffsets([a.innerRadius_m, a.outerRadius_m], [b.innerRadius_m, b.outerRadius_m])) {
    for (const piece of axial) cutIntoPanels(radial, piece, panels);
  }
  const shares = panels.map(roughly);
  const whole = shares.reduce((sum, { mutual, slope }) => ({ mutual: sum.mutual + mutual, slope: sum.slope + slope }));
  const fatness = Math.max(1 - a.innerRadius_m / a.outerRadius_m, 1 - b.innerRadius_m / b.outerRadius_m);
  const tolerance = fatness === 0 ? LINE_TOLERANCE : PANEL_TOLERANCE;
  const sum = new PanelSum(fatness, withSlope);
  panels.forEach((panel, i) => {
    const mutualShare = shares[i]!.mutual / whole.mutual;
    const slopeShare = withSlope && whole.slope !== 0 ? shares[i]!.slope / whole.slope : 0;
    const digits = Math.log(Math.max(1, Math.max(mutualShare, slopeShare) / tolerance));
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
function roughly({ radial, axial }: Panel): FilamentPair {
  const share: FilamentPair = { mutual: 0, slope: 0 };
  const radius = (radial.lower[0] + radial.lower[1] + radial.upper[0] + radial.upper[1]) / 4;
  filamentPair(radius, radial.start + radial.width / 2, axial.start + axial.width / 2, true, share);
  const radialMass = massOf(radial.width, radial.density);
  share.mutual *= radialMass * massOf(axial.width, axial.density);
  share.slope *= radialMass * massOf(axial.width, axial.oddDensity);
  return share;
}
