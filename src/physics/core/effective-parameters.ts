import { InvalidQuantity } from '../invalid-quantity.ts';

/**
 * Ring of rectangular section.
 *
 *      |<---- outerDiameter ---->|
 *           |< innerDiameter >|
 *      +----+                 +----+  --
 *      |////|                 |////|  height (along the axis)
 *      +----+                 +----+  --
 */
export interface RingDimensions {
  readonly kind: 'ring';
  readonly outerDiameter_m: number;
  readonly innerDiameter_m: number;
  readonly height_m: number;
}

/**
 * Pair of equal E cores of rectangular section, legs facing; one half is drawn, and its dimensions are given. The outer legs are
 * equal: each (width − outerLegSpacing)/2 wide. The back is height − windowHeight thick.
 *
 *      |<----------- width ----------->|
 *           |<- outerLegSpacing ->|
 *      +----+       +------+      +----+  --            --
 *      |////|       |//////|      |////|  windowHeight
 *      |////+-------+//////+------+////|  --            height (one half, from the mating face to the back)
 *      |///////////////////////////////|
 *      +-------------------------------+                --
 *                   |<---->| centreLegWidth             depth: into the paper
 */
export interface ECoreDimensions {
  readonly kind: 'E';
  readonly width_m: number;
  readonly height_m: number;
  readonly depth_m: number;
  readonly windowHeight_m: number;
  readonly outerLegSpacing_m: number;
  readonly centreLegWidth_m: number;
}

/**
 * Pair of equal U cores of rectangular section with equal legs, facing; one half is drawn, and its dimensions are given.
 *
 *      |<------- width ------->|
 *           |<windowWidth>|
 *      +----+             +----+  --            --
 *      |////|             |////|  windowHeight
 *      |////+-------------+////|  --            height (one half, from the mating face to the back)
 *      |///////////////////////|
 *      +-----------------------+                --   depth: into the paper
 */
export interface UCoreDimensions {
  readonly kind: 'U';
  readonly width_m: number;
  readonly height_m: number;
  readonly depth_m: number;
  readonly windowHeight_m: number;
  readonly windowWidth_m: number;
}

export type CoreDimensions = RingDimensions | ECoreDimensions | UCoreDimensions;

/** What a magnetic circuit needs of a core: the uniform bar that has the same inductance at low flux density. */
export interface EffectiveParameters {
  readonly effectiveArea_m2: number;
  readonly effectiveLength_m: number;
  readonly effectiveVolume_m3: number;
  /** The smallest section that carries the whole flux, never above the effective area. */
  readonly minimumArea_m2: number;
}

/** A stretch of the flux's path: its mean length and its section. */
interface Section {
  readonly length_m: number;
  readonly area_m2: number;
}

/**
 * Effective parameters of a core by IEC 60205 (from memory): with the core constants C1 = Σ l/A and C2 = Σ l/A²,
 * Ae = C1/C2, le = C1²/C2, Ve = C1³/C2².
 *
 * Ring: the sums become integrals over the radius, C1 = 2π/(h ln(r2/r1)), C2 = 2π (1/r1 − 1/r2)/(h² ln³(r2/r1)).
 * E and U pairs: legs, back and corners, where a corner between a leg of width p and a back of thickness q is taken as the quarter
 * circle of mean length π/8 (p + q) and the mean of both sections. Corner radii, chamfers and centre holes are neglected.
 *
 * Throws `InvalidQuantity` naming the dimension that does not fit into the others.
 *
 * | core | domain | worst relative error | against |
 * |---|---|---|---|
 * | ring | outer/inner 1 + 1e-9 to 1e6 | 5e-16 | the integrals over the radius, mpmath 60 digits |
 * | E, U | 30 random proportions each, 1e-6 to 1e3 m | 6e-16 | the sums section by section, mpmath 60 digits |
 */
export function effectiveParameters(dimensions: CoreDimensions): EffectiveParameters {
  switch (dimensions.kind) {
    case 'ring':
      return ring(dimensions);
    case 'E':
      return fromSections(eCoreSections(dimensions));
    case 'U':
      return fromSections(uCoreSections(dimensions));
  }
}

function ring({ outerDiameter_m, innerDiameter_m, height_m }: RingDimensions): EffectiveParameters {
  requireLess(innerDiameter_m, outerDiameter_m, '/innerDiameter_m', 'the inner diameter', 'the outer diameter');
  const [outer, inner] = [outerDiameter_m / 2, innerDiameter_m / 2];
  const thickness = (outerDiameter_m - innerDiameter_m) / 2;
  const log = Math.log1p(thickness / inner);
  // 1/r1 − 1/r2 = (r2 − r1)/(r1 r2), kept as the product: a thin ring has both nearly equal.
  const effectiveArea_m2 = ((height_m * log * log) / thickness) * inner * outer;
  const effectiveLength_m = ((2 * Math.PI * log) / thickness) * inner * outer;
  return {
    effectiveArea_m2,
    effectiveLength_m,
    effectiveVolume_m3: effectiveArea_m2 * effectiveLength_m,
    // The whole section h (r2 − r1) is larger than Ae; but its inner part saturates first, so Ae is the safer of the two.
    minimumArea_m2: effectiveArea_m2,
  };
}

/** One window of the pair, with half the centre leg. */
function eCoreSections(core: ECoreDimensions): Section[] {
  const { width_m, height_m, depth_m, windowHeight_m, outerLegSpacing_m, centreLegWidth_m } = core;
  requireLess(windowHeight_m, height_m, '/windowHeight_m', 'the window height', 'the height');
  requireLess(outerLegSpacing_m, width_m, '/outerLegSpacing_m', 'the spacing of the outer legs', 'the width');
  requireLess(
    centreLegWidth_m,
    outerLegSpacing_m,
    '/centreLegWidth_m',
    'the centre leg',
    'the spacing of the outer legs',
  );
  const leg = (width_m - outerLegSpacing_m) / 2;
  const back = height_m - windowHeight_m;
  const halfCentre = centreLegWidth_m / 2;
  const window = (outerLegSpacing_m - centreLegWidth_m) / 2;
  // Two such paths lie side by side: every section counts twice.
  const wide = 2 * depth_m;
  return [
    { length_m: 2 * windowHeight_m, area_m2: leg * wide },
    { length_m: 2 * window, area_m2: back * wide },
    { length_m: 2 * windowHeight_m, area_m2: halfCentre * wide },
    corner(leg, back, wide, 2),
    corner(halfCentre, back, wide, 2),
  ];
}

function uCoreSections(core: UCoreDimensions): Section[] {
  const { width_m, height_m, depth_m, windowHeight_m, windowWidth_m } = core;
  requireLess(windowHeight_m, height_m, '/windowHeight_m', 'the window height', 'the height');
  requireLess(windowWidth_m, width_m, '/windowWidth_m', 'the window width', 'the width');
  const leg = (width_m - windowWidth_m) / 2;
  const back = height_m - windowHeight_m;
  return [
    { length_m: 4 * windowHeight_m, area_m2: leg * depth_m },
    { length_m: 2 * windowWidth_m, area_m2: back * depth_m },
    corner(leg, back, depth_m, 4),
  ];
}

/** `count` corners between a leg and a back. */
function corner(leg: number, back: number, depth: number, count: number): Section {
  return { length_m: ((count * Math.PI) / 8) * (leg + back), area_m2: ((leg + back) / 2) * depth };
}

/** C1 and C2 relative to the smallest section, so that no power of a tiny or huge area leaves the range of numbers. */
function fromSections(sections: readonly Section[]): EffectiveParameters {
  const minimumArea_m2 = Math.min(...sections.map(({ area_m2 }) => area_m2));
  let [c1, c2] = [0, 0];
  for (const { length_m, area_m2 } of sections) {
    const ratio = minimumArea_m2 / area_m2;
    c1 += length_m * ratio;
    c2 += length_m * ratio * ratio;
  }
  const effectiveArea_m2 = minimumArea_m2 * (c1 / c2);
  const effectiveLength_m = c1 * (c1 / c2);
  return {
    effectiveArea_m2,
    effectiveLength_m,
    effectiveVolume_m3: effectiveArea_m2 * effectiveLength_m,
    minimumArea_m2,
  };
}

function requireLess(small: number, large: number, pointer: string, smallName: string, largeName: string): void {
  if (small < large) return;
  throw new InvalidQuantity(pointer, `${smallName}, ${small} m, is not less than ${largeName}, ${large} m`);
}
