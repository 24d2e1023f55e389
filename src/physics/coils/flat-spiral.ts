import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { circleArcShare, concentricCircles_m } from './concentric-circles.ts';
import { concentricPolygons_m, polygonPartShare } from './concentric-polygons.ts';
import { trackPair, trackRowSelf, trackRowWithNextInside } from './concentric-tracks.ts';

/**
 * A flat spiral of track. The outer diameter is from outer edge to outer edge, of a polygon across flats (twice its
 * inscribed radius). Turns are counted from the outside; the last one may be a part of a turn. Without a thickness the track
 * is an infinitely thin strip.
 */
export interface FlatSpiral {
  readonly shape: 'flat-spiral';
  readonly outline: 'circle' | 'square' | 'hexagon' | 'octagon';
  readonly turns: number;
  readonly outerDiameter_m: number;
  readonly trackWidth_m: number;
  readonly trackSpacing_m: number;
  readonly trackThickness_m?: number;
}

/**
 * S. S. Mohan, M. Hershenson, S. Boyd, T. H. Lee, "Simple accurate expressions for planar spiral inductances", IEEE Journal of
 * Solid-State Circuits 34 (1999) 1419-1424: c₁…c₄ of Table II (current sheet), K₁ and K₂ of Table I (modified Wheeler).
 */
const OUTLINES = {
  circle: { sides: 0, currentSheet: [1.0, 2.46, 0.0, 0.2], wheeler: undefined },
  square: { sides: 4, currentSheet: [1.27, 2.07, 0.18, 0.13], wheeler: [2.34, 2.75] },
  hexagon: { sides: 6, currentSheet: [1.09, 2.23, 0.0, 0.17], wheeler: [2.33, 3.82] },
  octagon: { sides: 8, currentSheet: [1.07, 2.29, 0.0, 0.19], wheeler: [2.25, 3.55] },
} as const;

/** Beyond this the widths of tracks lose their meaning long before the sum loses its accuracy. */
const MOST_TURNS = 10_000;

/** Share of the outer diameter below which squares of distances within a track would leave the range of numbers. */
const NARROWEST = 1e-100;

/** Average diameter (d_out + d_in)/2 in m, and fill ratio φ = (d_out − d_in)/(d_out + d_in): `turns` tracks and a space less. */
function proportions(coil: FlatSpiral): { average: number; fill: number } {
  const { turns, outerDiameter_m, trackWidth_m, trackSpacing_m } = coil;
  const depth = turns * trackWidth_m + (turns - 1) * trackSpacing_m;
  return { average: outerDiameter_m - depth, fill: depth / (outerDiameter_m - depth) };
}

/**
 * Mohan's current-sheet expression in H: µ0 n² d_avg (c₁/2) [ln(c₂/φ) + c₃ φ + c₄ φ²]. Within 8 % for spaces
 * up to 3 tracks wide, say its authors (from memory).
 */
export function spiralCurrentSheet_H(coil: FlatSpiral): number {
  const [c1, c2, c3, c4] = OUTLINES[coil.outline].currentSheet;
  const { average, fill } = proportions(coil);
  const bracket = Math.log(c2 / fill) + fill * (c3 + fill * c4);
  return VACUUM_PERMEABILITY_H_PER_M * coil.turns * coil.turns * average * (c1 / 2) * bracket;
}

/** Mohan's modified Wheeler expression in H: K₁ µ0 n² d_avg/(1 + K₂ φ); none was published for the circle: undefined there. */
export function spiralModifiedWheeler_H(coil: FlatSpiral): number | undefined {
  const { wheeler } = OUTLINES[coil.outline];
  if (wheeler === undefined) return undefined;
  const { average, fill } = proportions(coil);
  return (wheeler[0] * VACUUM_PERMEABILITY_H_PER_M * coil.turns * coil.turns * average) / (1 + wheeler[1] * fill);
}

function checkDimensions(coil: FlatSpiral): void {
  const { turns, outerDiameter_m, trackWidth_m, trackSpacing_m, trackThickness_m = 0 } = coil;
  if (trackThickness_m > outerDiameter_m) {
    throw new InvalidQuantity('/trackThickness_m', 'a spiral thicker than its outer diameter is not flat');
  }
  if (trackWidth_m < NARROWEST * outerDiameter_m) {
    throw new InvalidQuantity(
      '/trackWidth_m',
      `a track at least ${NARROWEST} of the outer diameter wide can be calculated`,
    );
  }
  if (turns < 1) throw new InvalidQuantity('/turns', 'a spiral has at least one turn');
  if (turns > MOST_TURNS) throw new InvalidQuantity('/turns', `at most ${MOST_TURNS} turns`);
  // A part of a turn needs the room of a track.
  const tracks = Math.ceil(turns);
  if (outerDiameter_m <= 2 * (tracks * trackWidth_m + (tracks - 1) * trackSpacing_m)) {
    throw new InvalidQuantity(
      '/turns',
      'the turns do not fit: outerDiameter_m must exceed twice the width of all tracks and spaces',
    );
  }
}

/**
 * Neumann's integral of the whole spiral in units of its outer radius: concentric closed turns, a track and a space apart, each
 * pair of filaments averaged over the tracks' sections with uniform current. A part of a turn lies one pitch inside the last whole
 * one: it has its share of the mutual inductance with each whole turn (exact for a circle; within 0.2 % of a turn's for
 * polygons) and, with itself, what a part of a turn of the same outline has.
 */
function concentricSum(coil: FlatSpiral): number {
  const { sides } = OUTLINES[coil.outline];
  const kernel =
    sides === 0
      ? concentricCircles_m
      : (mean: number, difference: number, v: number) => concentricPolygons_m(sides, mean, difference, v);
  const radius = coil.outerDiameter_m / 2;
  const section = { width: coil.trackWidth_m / radius, thickness: (coil.trackThickness_m ?? 0) / radius };
  const pitch = section.width + coil.trackSpacing_m / radius;
  const count = Math.floor(coil.turns);
  const part = coil.turns - count;
  const row = { count, innermost: 1 - section.width / 2 - (count - 1) * pitch, pitch };
  const whole = trackRowSelf(kernel, row, section);
  if (part === 0) return whole;
  const last = row.innermost - pitch;
  // Geometric mean distance of a rectangle from itself, 0.2235 (width + thickness), Rosa and Grover 1916.
  const offset = (0.2235 * (section.width + section.thickness)) / last;
  const share = sides === 0 ? circleArcShare(part, offset) : polygonPartShare(sides, part, offset);
  const mutual = part * trackRowWithNextInside(kernel, row, section);
  return whole + 2 * mutual + share * trackPair(kernel, last, 0, section);
}

/**
 * What concentric turns with uniform current leave out, as a share of the inductance. First the passage from turn to turn: of a
 * spiral that draws in evenly and has the same diameter across, the mean radius is a quarter pitch smaller. Second the current's
 * preference for the inside of the bend, as 1/r across a wide track. Both factors bound numeric comparisons with circles:
 * Archimedean spirals of 2 to 8 turns (0.33 to 0.39 was found), and single turns from narrow to a disc with a pinhole (0.11 to
 * 0.20). Polygons are taken to be no worse.
 */
function neglected(coil: FlatSpiral): number {
  const radius = proportions(coil).average / 2;
  const pitch = (coil.trackWidth_m + coil.trackSpacing_m) / radius;
  const width = coil.trackWidth_m / radius;
  return 0.42 * Math.min(1, coil.turns - 1) * pitch + 0.21 * width * width;
}

/**
 * Inductance in H of a flat spiral: `inductance_H` by summing concentric turns, `closedForm_H` by Mohan's current-sheet expression
 * beside it. `relativeError` is their relative difference, or what concentric turns neglect where that is larger.
 * Throws InvalidQuantity at /turns for less than one turn, more than 10 000, or turns that do not fit;
 * at /trackThickness_m and /trackWidth_m for tracks out of all proportion.
 *
 * | domain                                                                     | worst relative error | against                          |
 * |----------------------------------------------------------------------------|----------------------|----------------------------------|
 * | circle, 1..20 turns, inner/outer radius 0.05..0.999, thickness 0..25 widths | 2e-9                | direct integration over r₁, r₂, v |
 * | polygons, 1..8 turns, the same radii, thickness 0..1 width                 | 5e-9                 | the same, whose own limit it is  |
 * | 100 turns, sum over all pairs                                              | 2e-15                | pair by pair                     |
 */
export function flatSpiralInductance(coil: FlatSpiral): { inductance_H: number; closedForm_H: number; method: Method } {
  checkDimensions(coil);
  const inductance_H = (VACUUM_PERMEABILITY_H_PER_M / (8 * Math.PI)) * coil.outerDiameter_m * concentricSum(coil);
  const closedForm_H = spiralCurrentSheet_H(coil);
  return {
    inductance_H,
    closedForm_H,
    method: {
      name: 'Sum over concentric turns of finite track width, uniform current; current-sheet expression beside it',
      references: [
        'J. C. Maxwell, A Treatise on Electricity and Magnetism (1873), vol. 2, art. 701',
        'G. A. Campbell, Mutual inductances of circuits composed of straight wires, Physical Review 5 (1915) 452-458',
        'S. S. Mohan, M. Hershenson, S. Boyd, T. H. Lee, Simple accurate expressions for planar spiral inductances, IEEE Journal of Solid-State Circuits 34 (1999) 1419-1424',
      ],
      relativeError: Math.max(Math.abs(closedForm_H / inductance_H - 1), neglected(coil)),
      validity:
        'Turns closed and concentric, without the steps between them and without the lead from the inner end; no conducting or ' +
        'magnetic plane near; direct current and low frequency.',
    },
  };
}
