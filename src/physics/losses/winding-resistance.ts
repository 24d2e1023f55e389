import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';

export type Conductor = 'copper' | 'aluminium';

/**
 * What a coil is wound with: `turns` of mean length `meanTurnLength_m`, either round wire (`wireDiameter_m`, bare conductor; of
 * one strand where there are `strands` in parallel) or foil (`foilThickness_m` across the field, `foilWidth_m` along it).
 * `pitch_m` is the distance between the centres of neighbouring turns of one layer; `windowArea_m2` the section that the
 * winding has to fit into.
 */
export interface Winding {
  readonly turns: number;
  readonly meanTurnLength_m: number;
  readonly wireDiameter_m?: number;
  readonly foilThickness_m?: number;
  readonly foilWidth_m?: number;
  /** Default 1. */
  readonly strands?: number;
  /** Default 1; a half-filled layer may be counted as a half. */
  readonly layers?: number;
  readonly pitch_m?: number;
  /** Default copper. */
  readonly conductor?: Conductor;
  readonly windowArea_m2?: number;
}

interface ConductorProperties {
  readonly resistivityAt20_ohm_m: number;
  readonly temperatureCoefficientAt20_per_K: number;
  /** 20 °C − 1/α: where the straight line of resistance over temperature meets zero. */
  readonly zeroResistance_degC: number;
  readonly melting_degC: number;
}

/**
 * Copper: IEC 60028 (1925), standard annealed copper, 1/58 Ω·mm²/m and 0.00393 /K at 20 °C. Aluminium: IEC 60889 (1987), hard
 * drawn, 61 % of copper's conductivity (28.264 nΩ·m) and 0.00403 /K. Melting points: fixed points of ITS-90.
 */
const CONDUCTORS: Readonly<Record<Conductor, ConductorProperties>> = {
  copper: {
    resistivityAt20_ohm_m: 1e-6 / 58,
    temperatureCoefficientAt20_per_K: 0.00393,
    zeroResistance_degC: 20 - 1 / 0.00393,
    melting_degC: 1084.62,
  },
  aluminium: {
    resistivityAt20_ohm_m: 1e-6 / 58 / 0.61,
    temperatureCoefficientAt20_per_K: 0.00403,
    zeroResistance_degC: 20 - 1 / 0.00403,
    melting_degC: 660.323,
  },
};

/** Densest packing of equal circles in any convex window (L. Fejes Tóth, Lagerungen in der Ebene, 1953; from memory). */
const DENSEST_ROUND_FILL = Math.PI / Math.sqrt(12);

/** The temperatures between which `conductor` is a solid with a positive resistance, both excluded. */
export function conductorTemperatureRange(conductor: Conductor): { lower_degC: number; upper_degC: number } {
  const { zeroResistance_degC, melting_degC } = CONDUCTORS[conductor];
  return { lower_degC: zeroResistance_degC, upper_degC: melting_degC };
}

/**
 * Resistivity ρ = ρ₂₀·(1 + α₂₀·(θ − 20 °C)) in Ω·m, IEC 60028 and IEC 60889.
 * Throws `InvalidQuantity` at `/temperature_degC` where the line gives no positive resistivity (copper −234.5 °C, aluminium
 * −228.1 °C) and from the melting point up.
 */
export function conductorResistivity_ohm_m(conductor: Conductor, temperature_degC: number): number {
  checkTemperature(conductor, temperature_degC, '/temperature_degC');
  const { resistivityAt20_ohm_m, temperatureCoefficientAt20_per_K, zeroResistance_degC } = CONDUCTORS[conductor];
  // The same line written from its zero: exact next to it, where 1 + α(θ − 20) would cancel.
  return resistivityAt20_ohm_m * temperatureCoefficientAt20_per_K * (temperature_degC - zeroResistance_degC);
}

/** Resistance ρ·l/A in Ω of a conductor of `length_m` and section `area_m2`, current uniform over the section. */
export function conductorResistance_ohm(resistivity_ohm_m: number, length_m: number, area_m2: number): number {
  return (resistivity_ohm_m * length_m) / area_m2;
}

/**
 * A resistance measured at `from_degC` as it is at `to_degC`: R·(θ₂ − θ₀)/(θ₁ − θ₀) with θ₀ the zero-resistance temperature
 * (the form of IEC 60034-1, there with 235 °C and 225 °C rounded).
 * Throws `InvalidQuantity` at `/from_degC` or `/to_degC` outside the conductor's range.
 */
export function resistanceAtTemperature(
  measured_ohm: number,
  from_degC: number,
  to_degC: number,
  conductor: Conductor = 'copper',
): number {
  checkTemperature(conductor, from_degC, '/from_degC');
  checkTemperature(conductor, to_degC, '/to_degC');
  const { zeroResistance_degC } = CONDUCTORS[conductor];
  return measured_ohm * ((to_degC - zeroResistance_degC) / (from_degC - zeroResistance_degC));
}

/** Section of conductor of one turn in m², all strands. Throws as `checkWinding`. */
export function conductorArea_m2(winding: Winding): number {
  checkWinding(winding);
  return sectionOf(winding);
}

/** Bare conductor over window, where the winding says its window. Throws as `checkWinding`. */
export function windowFill(winding: Winding): number | undefined {
  checkWinding(winding);
  return winding.windowArea_m2 === undefined ? undefined : (sectionOf(winding) / winding.windowArea_m2) * winding.turns;
}

/**
 * Direct-current resistance of a winding at one temperature, R = ρ(θ)·N·l_turn/A.
 * Throws `InvalidQuantity` at a field of the winding as `checkWinding` does, at `/meanTurnLength_m` where the resistance is
 * too large or too small to be a number, and at `/temperature_degC` (beside the winding, not in it) as
 * `conductorResistivity_ohm_m` does.
 *
 * `relativeError` covers the conductor, not its dimensions: enamelled wire conducts up to 59 MS/m where the standard value is
 * 58 (IEC 60317-0-1), and the true curve bends from the line outside about −50 … 250 °C.
 */
export function windingResistance(
  winding: Winding,
  temperature_degC: number,
): { resistance_ohm: number; method: Method } {
  checkWinding(winding);
  const conductor = winding.conductor ?? 'copper';
  const resistivity = conductorResistivity_ohm_m(conductor, temperature_degC);
  const resistance_ohm =
    winding.turns * conductorResistance_ohm(resistivity, winding.meanTurnLength_m, sectionOf(winding));
  if (!(resistance_ohm > 0 && Number.isFinite(resistance_ohm))) {
    throw new InvalidQuantity(
      '/meanTurnLength_m',
      'with these turns and this section the resistance is not a finite number above zero',
    );
  }
  return { resistance_ohm, method: directMethod(conductor, temperature_degC) };
}

/**
 * Relations between the fields of a winding: wire or foil and not both, foil with both dimensions, strands only of round
 * wire, no more layers than turns, a pitch that the conductor fits into, a window that the bare conductor fits into.
 * Throws `InvalidQuantity` at the field.
 */
export function checkWinding(winding: Winding): void {
  const { turns, wireDiameter_m, foilThickness_m, foilWidth_m, pitch_m, windowArea_m2 } = winding;
  const strands = winding.strands ?? 1;
  const layers = winding.layers ?? 1;
  const foil = foilThickness_m !== undefined || foilWidth_m !== undefined;
  if (wireDiameter_m === undefined && !foil) {
    throw new InvalidQuantity('/wireDiameter_m', 'a winding needs wireDiameter_m, or foilThickness_m and foilWidth_m');
  }
  if (wireDiameter_m !== undefined && foil) {
    throw new InvalidQuantity('/wireDiameter_m', 'a winding is of round wire or of foil, not both');
  }
  if (foil && foilThickness_m === undefined) throw new InvalidQuantity('/foilThickness_m', 'foil needs its thickness');
  if (foil && foilWidth_m === undefined) throw new InvalidQuantity('/foilWidth_m', 'foil needs its width');
  if (foil && strands !== 1) throw new InvalidQuantity('/strands', 'strands are of round wire; foil has one');
  if (layers > Math.max(1, turns)) {
    throw new InvalidQuantity('/layers', `${layers} layers cannot be wound from ${turns} turns`);
  }
  const width_m = wireDiameter_m ?? foilWidth_m;
  if (pitch_m !== undefined && width_m !== undefined && pitch_m < width_m) {
    throw new InvalidQuantity('/pitch_m', `turns ${pitch_m} m apart overlap: the conductor is ${width_m} m wide`);
  }
  const section_m2 = sectionOf(winding);
  if (!(section_m2 > 0 && Number.isFinite(section_m2))) {
    throw new InvalidQuantity(
      foil ? '/foilThickness_m' : '/wireDiameter_m',
      'the section of conductor is not a finite area above zero',
    );
  }
  if (windowArea_m2 === undefined) return;
  // One circle may fill a round window whole; two or more never fill more than the hexagonal lattice does.
  const densest = !foil && turns * strands >= 2 ? DENSEST_ROUND_FILL : 1;
  const fill = (section_m2 / windowArea_m2) * turns;
  if (fill > densest) {
    throw new InvalidQuantity(
      '/windowArea_m2',
      `the bare conductor would fill ${fill.toPrecision(4)} of the window; no more than ${densest.toPrecision(4)} can be`,
    );
  }
}

function sectionOf({ wireDiameter_m, foilThickness_m, foilWidth_m, strands = 1 }: Winding): number {
  if (wireDiameter_m !== undefined) return strands * (Math.PI / 4) * wireDiameter_m * wireDiameter_m;
  return (foilThickness_m ?? 0) * (foilWidth_m ?? 0);
}

function checkTemperature(conductor: Conductor, temperature_degC: number, pointer: string): void {
  const { lower_degC, upper_degC } = conductorTemperatureRange(conductor);
  if (temperature_degC <= lower_degC) {
    throw new InvalidQuantity(
      pointer,
      `${conductor} has no positive resistance by its temperature coefficient at or below ${lower_degC.toFixed(1)} °C`,
    );
  }
  if (temperature_degC >= upper_degC) {
    throw new InvalidQuantity(pointer, `${conductor} melts at ${upper_degC.toFixed(1)} °C`);
  }
}

function directMethod(conductor: Conductor, temperature_degC: number): Method {
  return {
    name: `direct-current resistance of ${conductor}, linear in temperature`,
    references: [conductor === 'copper' ? 'IEC 60028:1925' : 'IEC 60889:1987'],
    relativeError: resistivityError(conductor, temperature_degC),
    validity:
      'conductor of standard resistivity; its dimensions as given, without their tolerances; joints and terminations not counted',
  };
}

/**
 * How far a real conductor may lie from the standard line, common practice: 3 % in −50 … 250 °C (59 against 58 MS/m, and the
 * curve's bend), 0.02 % more for every kelvin above, and below rising to all of it at the zero-resistance temperature, where
 * residual resistivity is all that is left.
 */
function resistivityError(conductor: Conductor, temperature_degC: number): number {
  const { zeroResistance_degC } = CONDUCTORS[conductor];
  const above = Math.max(0, temperature_degC - 250);
  const below = Math.max(0, -50 - temperature_degC) / (-50 - zeroResistance_degC);
  return 0.03 + 2e-4 * above + 0.97 * below;
}
