import { InvalidQuantity } from '../invalid-quantity.ts';

/** One or several equal gaps in series in the path of a core's whole flux. */
export interface Gap {
  /** of each */
  readonly length_m: number;
  /** default 1 */
  readonly count?: number;
  /** the gapped leg, rectangular */
  readonly legWidth_m?: number;
  readonly legDepth_m?: number;
  /** the gapped leg, round */
  readonly legDiameter_m?: number;
  /** iron on either side of the gap, from its face to the yoke or halfway to the next gap; for `conformal-map` */
  readonly legLength_m?: number;
  /** a gap area that is known; then nothing is added */
  readonly area_m2?: number;
  /** default `expanded-area` where the leg is given, else `none` */
  readonly fringing?: Fringing;
}

/**
 * How the flux that bulges out of the gap is accounted for.
 * - `expanded-area`: the gap's area is (width + g)(depth + g), or π/4 (diameter + g)². Common practice.
 * - `conformal-map`: the same with 2δ in place of g, where δ = (g/π)(1 + ln(π h/(2g))) is what one edge of a long straight gap
 *   between legs of length h adds by the Schwarz-Christoffel transformation: A. Balakrishnan, W. T. Joyner, T. G. Wilson, IEEE
 *   Trans. Power Electron. 12 (1997) 654-663; J. Mühlethaler, J. W. Kolar, A. Ecklebe, ICPE-ECCE Asia (2011), both from memory.
 * - `none`: the leg's own section, or where no leg is given the known area or the core's effective area.
 */
export type Fringing = 'expanded-area' | 'conformal-map' | 'none';

/** The gaps of a core as its magnetic circuit sees them. */
export interface GapInCircuit {
  /** of all gaps together */
  readonly length_m: number;
  /** of each, fringing included */
  readonly area_m2: number;
  readonly fringing: Fringing;
  /** bound on the relative error of `area_m2` as a description of the gap's permeance */
  readonly relativeError: number;
}

/** The leg across the gap. */
interface Leg {
  readonly area_m2: number;
  /** largest extent across, m */
  readonly width_m: number;
  /** the section with `margin` added on every side, m² */
  readonly grown_m2: (margin_m: number) => number;
}

/**
 * The gaps of a core whose path is `effectiveLength_m` long on `effectiveArea_m2`.
 *
 * `relativeError` covers the finite-element fields of a round gapped leg in its window, iron without reluctance (leg radius a, gap
 * 0.005 to 0.6 a, iron 0.8 to 3.2 a long on either side, window 0.4 to 1.5 a wide and at least an eighth as wide as high,
 * winding near or away from the leg): there
 *
 * | fringing | gap/diameter | permeance against finite elements (0.1 %) |
 * |---|---|---|
 * | `expanded-area` | 0.0025; 0.03; 0.1; 0.3 | −1.4 to −2.2 %; −7 to −14 %; −7 to −26 %; −5 to −30 % |
 * | `conformal-map` | 0.0025; 0.03; 0.1; 0.3 | ±0.4 %; −3 to +2 %; −9 to +6 %; +2 to +14 % |
 *
 * A window narrower yet carries flux besides the gap's that neither counts. A known area is the caller's: 0.
 *
 * Throws `InvalidQuantity` where the gap is longer than the core's path (`/length_m`), or its fields contradict each other.
 */
export function gapInCircuit(gap: Gap, effectiveArea_m2: number, effectiveLength_m: number): GapInCircuit {
  const { count = 1, length_m: each_m } = gap;
  if (!(Number.isInteger(count) && count >= 1)) throw new InvalidQuantity('/count', `${count} is no number of gaps`);
  if (!(each_m >= 0)) throw new InvalidQuantity('/length_m', `a gap's length is not negative, as ${each_m} m is`);
  const length_m = count * each_m;
  if (length_m >= effectiveLength_m) {
    throw new InvalidQuantity(
      '/length_m',
      `the gap, ${count} × ${each_m} m, is not shorter than the core's path, ${effectiveLength_m} m`,
    );
  }
  const leg = givenLeg(gap);
  const fringing = gap.fringing ?? (leg ? 'expanded-area' : 'none');
  if (gap.area_m2 !== undefined) return { length_m, area_m2: knownArea(gap), fringing: 'none', relativeError: 0 };
  if (gap.legLength_m !== undefined && fringing !== 'conformal-map') {
    throw new InvalidQuantity(
      '/legLength_m',
      `the leg's length serves 'conformal-map' alone, but fringing is '${fringing}'`,
    );
  }
  // A leg that isn't given has, for the sake of the error bound, the core's effective area and is square.
  const assumed = leg ?? rectangularLeg(Math.sqrt(effectiveArea_m2), Math.sqrt(effectiveArea_m2));
  const area_m2 = areaByFringing(gap, fringing, leg) ?? effectiveArea_m2;
  return { length_m, area_m2, fringing, relativeError: areaError(each_m, fringing, area_m2, assumed) };
}

function knownArea({ area_m2, fringing, legLength_m }: Gap): number {
  if (!(area_m2! > 0)) throw new InvalidQuantity('/area_m2', `a gap's area is positive, not ${area_m2} m²`);
  if (fringing !== undefined && fringing !== 'none') {
    throw new InvalidQuantity(
      '/fringing',
      `the gap's area is given as known, which leaves nothing for '${fringing}' to add`,
    );
  }
  if (legLength_m !== undefined) throw new InvalidQuantity('/legLength_m', 'serves no purpose beside a known gap area');
  return area_m2!;
}

/** The leg that is given, or null; contradictions are errors. */
function givenLeg({ legWidth_m, legDepth_m, legDiameter_m, area_m2 }: Gap): Leg | null {
  const rectangular = legWidth_m !== undefined || legDepth_m !== undefined;
  if (rectangular && legDiameter_m !== undefined) {
    throw new InvalidQuantity('/legDiameter_m', 'a leg is round or rectangular: give its diameter, or width and depth');
  }
  if (area_m2 !== undefined && (rectangular || legDiameter_m !== undefined)) {
    throw new InvalidQuantity(
      '/area_m2',
      'a known gap area and a leg to compute it from contradict each other: give one',
    );
  }
  if (rectangular) {
    if (legWidth_m === undefined) throw new InvalidQuantity('/legWidth_m', 'a rectangular leg needs width and depth');
    if (legDepth_m === undefined) throw new InvalidQuantity('/legDepth_m', 'a rectangular leg needs width and depth');
    return rectangularLeg(legWidth_m, legDepth_m);
  }
  return legDiameter_m === undefined ? null : roundLeg(legDiameter_m);
}

function rectangularLeg(width_m: number, depth_m: number): Leg {
  return {
    area_m2: width_m * depth_m,
    width_m: Math.max(width_m, depth_m),
    grown_m2: (margin_m) => (width_m + 2 * margin_m) * (depth_m + 2 * margin_m),
  };
}

function roundLeg(diameter_m: number): Leg {
  return {
    area_m2: (Math.PI / 4) * diameter_m ** 2,
    width_m: diameter_m,
    grown_m2: (margin_m) => (Math.PI / 4) * (diameter_m + 2 * margin_m) ** 2,
  };
}

/** The gap's area by the chosen method; null where there is no leg and none is needed. */
function areaByFringing(gap: Gap, fringing: Fringing, leg: Leg | null): number | null {
  if (fringing === 'none') return leg?.area_m2 ?? null;
  if (!leg) {
    throw new InvalidQuantity(
      '/fringing',
      `'${fringing}' needs the gapped leg: legWidth_m and legDepth_m, or legDiameter_m`,
    );
  }
  if (fringing === 'expanded-area') return leg.grown_m2(gap.length_m / 2);
  const { legLength_m } = gap;
  if (legLength_m === undefined) {
    throw new InvalidQuantity('/legLength_m', `'conformal-map' needs the length of the leg on either side of the gap`);
  }
  if (gap.length_m > SHORTEST_LEG * legLength_m) {
    throw new InvalidQuantity(
      '/legLength_m',
      `a leg of ${legLength_m} m is too short beside a gap of ${gap.length_m} m to be mapped`,
    );
  }
  return leg.grown_m2(edgeMargin_m(gap.length_m, legLength_m));
}

/** Largest gap/leg length for which the map of one edge, which knows no other edge, is kept: π h/(2g) ≥ 1. */
const SHORTEST_LEG = Math.PI / 2;

/** What one edge adds to the gap's width: Balakrishnan et al. (1997), Mühlethaler et al. (2011). */
function edgeMargin_m(gap_m: number, legLength_m: number): number {
  if (gap_m === 0) return 0;
  return (gap_m / Math.PI) * (1 + Math.log(Math.max((Math.PI * legLength_m) / (2 * gap_m), 1)));
}

/** Share of what the conformal map adds that it may be wrong by, from the finite-element fields (0.26 at most). */
const CONFORMAL_SHARE = 0.3;
/** The leg, in widths, and the factor for which the map of it bounds those fields where the leg's length is not known. */
const ASSUMED_LEG_WIDTHS = 1.5;
const ASSUMED_LEG_MARGIN = 1.15;

/** Bound on the relative error of `area_m2`: of the map itself, or of anything else against the map of a long leg. */
function areaError(gap_m: number, fringing: Fringing, area_m2: number, leg: Leg): number {
  if (gap_m === 0) return 0;
  if (fringing === 'conformal-map') return CONFORMAL_SHARE * (area_m2 / leg.area_m2 - 1);
  const mapped_m2 = leg.grown_m2(edgeMargin_m(gap_m, ASSUMED_LEG_WIDTHS * leg.width_m));
  return ASSUMED_LEG_MARGIN * Math.abs(mapped_m2 / area_m2 - 1);
}
