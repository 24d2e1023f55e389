import { InvalidQuantity } from '../invalid-quantity.ts';
import { type Multilayer, multilayerInductance, turnCell } from './multilayer.ts';
import { type RoundLoop, roundLoopInductance } from './round-loop.ts';
import { type Solenoid, solenoidInductance } from './solenoid.ts';
import type { WindingSection } from './winding-sections.ts';

/** A coil that is round about an axis, so that its mutual inductance with another on that axis is calculated. */
export type CoaxialCoil = RoundLoop | Solenoid | Multilayer;

/** A coil as its mutual inductance sees it, and what that leaves out. */
export interface CoaxialWinding {
  readonly coil: CoaxialCoil;
  readonly turns: number;
  /** The filament, the sheet or the thick section that carries the current. */
  readonly section: WindingSection;
  /** Length of the winding from the centre of its first wire to that of its last; of the section, where no wire is known. */
  readonly centreLength_m: number;
  /** Half the thickness of that wire, 0 where it is not known. */
  readonly halfWire_m: number;
  /** Extent of the conductor that one filament stands for. */
  readonly conductor_m: number;
  /** Distance of one turn from the next. */
  readonly pitch_m: number;
  /** Whether turns stand on a line across which they do not wind, so that their spacing counts to second order. */
  readonly stacked: boolean;
}

/** Throws `InvalidQuantity` at the coil's own member where its dimensions contradict each other. */
export function coaxialWinding(coil: CoaxialCoil): CoaxialWinding {
  if (coil.shape === 'multilayer') return multilayerWinding(coil);
  const { diameter_m, wireDiameter_m, turns = 1 } = coil;
  if (wireDiameter_m !== undefined && wireDiameter_m >= diameter_m) {
    throw new InvalidQuantity('/wireDiameter_m', `must be less than the coil's diameter of ${diameter_m} m`);
  }
  const length_m = coil.shape === 'solenoid' ? coil.length_m : 0;
  const pitch_m = Math.min(length_m / turns, length_m);
  return {
    coil,
    turns,
    section: { innerRadius_m: diameter_m / 2, outerRadius_m: diameter_m / 2, length_m },
    centreLength_m: wireDiameter_m === undefined ? length_m : length_m - pitch_m,
    halfWire_m: (wireDiameter_m ?? 0) / 2,
    conductor_m: wireDiameter_m ?? Math.min(pitch_m, diameter_m),
    pitch_m,
    stacked: false,
  };
}

function multilayerWinding(coil: Multilayer): CoaxialWinding {
  const { turns, innerDiameter_m, outerDiameter_m, length_m } = coil;
  if (innerDiameter_m >= outerDiameter_m) {
    throw new InvalidQuantity('/outerDiameter_m', `must exceed the inner diameter of ${innerDiameter_m} m`);
  }
  const { thin_m, wide_m } = turnCell(coil);
  return {
    coil,
    turns,
    section: { innerRadius_m: innerDiameter_m / 2, outerRadius_m: outerDiameter_m / 2, length_m },
    centreLength_m: length_m,
    halfWire_m: 0,
    conductor_m: wide_m,
    pitch_m: wide_m,
    stacked: wide_m > thin_m,
  };
}

/** Self-inductance in H, by the coil's own model. */
export function selfInductance_H(coil: CoaxialCoil): number {
  switch (coil.shape) {
    case 'round-loop':
      return roundLoopInductance(coil).inductance_H;
    case 'solenoid':
      return solenoidInductance(coil).inductance_H;
    case 'multilayer':
      return multilayerInductance(coil).inductance_H;
  }
}

/** Rounding that touching sections may carry, relative to the coils' size, and touching wires, relative to their thickness. */
const TOUCHING_SECTIONS = 1e-12;
const TOUCHING_WIRES = 1e-9;

/**
 * Distance in m between the windings of two coils whose centres are `axialDistance_m` apart; 0 where sheets cross or coincide.
 *
 * Throws `InvalidQuantity` at `/axialDistance_m` where the conductors would take up the same space: sections that overlap, a wire
 * that reaches into a section or into another wire. An ideal current sheet takes up none, and single layers of known wire may
 * share a diameter where each leaves room for the other's wire between its turns. Also where a loop lies on the very end of
 * a sheet: the force of a sheet has no finite value there.
 */
export function clearance_m(first: CoaxialWinding, second: CoaxialWinding, axialDistance_m: number): number {
  const [a, b] = [first.section, second.section];
  const size = Math.max(a.outerRadius_m, b.outerRadius_m);
  const height = Math.abs(axialDistance_m);
  const radial = Math.max(a.innerRadius_m - b.outerRadius_m, b.innerRadius_m - a.outerRadius_m);
  const axial = height - (first.centreLength_m + second.centreLength_m) / 2;
  const thick = [first, second].some(({ coil }) => coil.shape === 'multilayer');
  const rounding = TOUCHING_SECTIONS * size;
  if (thick && radial < -rounding && axial < -rounding) refuse('the winding sections overlap');
  const gap = Math.hypot(Math.max(0, radial), Math.max(0, axial));
  const wires = first.halfWire_m + second.halfWire_m;
  if (gap < wires * (1 - TOUCHING_WIRES) - Number.EPSILON * size && !interleaved(first, second)) {
    refuse(`the conductors overlap, with ${gap} m between centre lines and ${wires} m of wire`);
  }
  if (radial === 0 && a.length_m * b.length_m === 0 && 2 * height === a.length_m + b.length_m) {
    refuse('a filament lies on another, or on the end of a current sheet');
  }
  return gap;
}

/** Whether single layers, and a loop among them, find room for all their wire between the turns. */
function interleaved(first: CoaxialWinding, second: CoaxialWinding): boolean {
  const coils = [first, second];
  const layers = coils.filter(({ coil }) => coil.shape === 'solenoid');
  const room = 2 * (first.halfWire_m + second.halfWire_m) * (1 - TOUCHING_WIRES);
  return (
    layers.length > 0 &&
    coils.every(({ coil }) => coil.shape !== 'multilayer') &&
    layers.every(({ halfWire_m, pitch_m }) => halfWire_m === 0 || pitch_m >= room)
  );
}

function refuse(why: string): never {
  throw new InvalidQuantity('/axialDistance_m', `puts both coils in the same place: ${why}`);
}
