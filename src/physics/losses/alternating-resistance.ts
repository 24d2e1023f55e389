import { InvalidQuantity } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import { dowellRatio } from './dowell.ts';
import { roundWireResistanceRatio, skinDepth_m } from './skin-effect.ts';
import { checkWinding, conductorResistivity_ohm_m, type Winding } from './winding-resistance.ts';

/** Dowell's square of equal section: a wire of diameter d is a square of side √(π/4)·d. */
const SQUARE_SIDE = Math.sqrt(Math.PI) / 2;

/**
 * Ratio of alternating to direct resistance of a winding at one frequency and temperature, by the model that its
 * description allows:
 *
 * - Round wire of one strand in one layer whose pitch is not given: the isolated wire, exact skin effect. Nothing is known
 *   of the neighbours, so their proximity is not guessed at; `relativeError` reaches up to the same layer wound touching.
 * - Round wire in several layers, or with a pitch (touching where only layers are given): Dowell with the equal square and
 *   porosity η = side/pitch, never less than the isolated wire's skin effect, which stays when the neighbours go away.
 * - Strands: the bundle as √n × √n square array, so √n·p layers of strands √n times closer (C. R. Sullivan, IEEE Trans. Power
 *   Electronics 14 (1999) 283-291, from memory), each strand taking every place in turn.
 * - Foil: Dowell, porosity foilWidth/pitch (1 where the pitch is not given).
 *
 * Throws `InvalidQuantity` as `checkWinding`; at `/pitch_m` where strands do not fit into it side by side; at
 * `/temperature_degC` (beside the winding) as `conductorResistivity_ohm_m`. The ratio is Infinity or NaN where it, or the
 * argument of its sines, is beyond the range of numbers.
 */
export function alternatingResistanceRatio(
  winding: Winding,
  frequency_Hz: number,
  temperature_degC: number,
): { resistanceRatio: number; method: Method } {
  checkWinding(winding);
  const resistivity = conductorResistivity_ohm_m(winding.conductor ?? 'copper', temperature_degC);
  const skinDepth = skinDepth_m(resistivity, frequency_Hz);
  return winding.wireDiameter_m === undefined
    ? foil(winding, skinDepth)
    : roundWire(winding, winding.wireDiameter_m, skinDepth);
}

function foil(winding: Winding, skinDepth: number): { resistanceRatio: number; method: Method } {
  const { foilThickness_m = 0, foilWidth_m = 0, pitch_m = foilWidth_m, layers = 1 } = winding;
  const porosity = foilWidth_m / pitch_m;
  const resistanceRatio = dowellRatio(Math.sqrt(porosity) * (foilThickness_m / skinDepth), layers);
  return {
    resistanceRatio,
    method: {
      name: `alternating resistance of foil by Dowell's layers, porosity ${porosity.toPrecision(3)}`,
      references: [DOWELL, HURLEY],
      relativeError: (1 - 1 / resistanceRatio) * (0.1 + (1 - porosity)),
      validity:
        'field along the foil, nothing on one side of the portion; exact for foil as wide as the window; currents crowding at ' +
        'the edges of narrower foil and by an air gap are allowed for by common practice only',
    },
  };
}

function roundWire(winding: Winding, diameter: number, skinDepth: number): { resistanceRatio: number; method: Method } {
  const { strands = 1, layers = 1, pitch_m } = winding;
  const isolated = roundWireResistanceRatio(diameter / skinDepth / Math.SQRT2);
  if (strands === 1 && layers === 1 && pitch_m === undefined) {
    return { resistanceRatio: isolated, method: isolatedMethod(isolated, winding, diameter, skinDepth) };
  }
  const across = Math.sqrt(strands);
  const strandPitch = pitch_m === undefined ? diameter : pitch_m / across;
  // A unit in the last place of grace: the pitch may well have been calculated as √n·d.
  if (strandPitch < diameter * (1 - 4 * Number.EPSILON)) {
    throw new InvalidQuantity(
      '/pitch_m',
      `${strands} strands of ${diameter} m lie ${(across * diameter).toPrecision(4)} m wide as a square bundle`,
    );
  }
  const { ratio: resistanceRatio, relativeError } = stackedRatio(
    diameter / skinDepth,
    strandPitch / diameter,
    across * layers,
  );
  const litz = strands > 1;
  return {
    resistanceRatio,
    method: {
      name: litz
        ? `alternating resistance of ${strands} transposed strands by Dowell's layers, √n layers of strands to each`
        : "alternating resistance of round wire by Dowell's layers, equal square and porosity",
      references: litz ? [DOWELL, SULLIVAN] : [DOWELL, HURLEY],
      relativeError: relativeError + (litz ? 0.2 * (1 - 1 / resistanceRatio) : 0),
      validity:
        'field along the layers, nothing on one side of the portion, no field of an air gap; wires in straight rows; ' +
        (litz
          ? 'strands insulated and transposed so that each takes every place (litz); parallel wires that are not transposed lose more, without bound here'
          : 'best to 1.3 wire diameters of pitch; error checked for wires up to 100 skin depths thick'),
    },
  };
}

/**
 * Dowell's ratio of stacked round wires and how far it may be wrong, `thickness` = d/δ and `spread` = pitch/d.
 *
 * The bound encloses the exact field of such rows, solved by multipoles (test/fixtures/multipole), for d/δ from 0.1 to 100,
 * pitch 1.02 to 10 d, 1 to 10 layers (32 in a few cases), 1.02 d or one pitch apart, square and staggered: Dowell is 5 % high
 * for d < δ (the equal square's proximity loss is π/3 of the circle's), high by up to 1 − d/pitch of itself where
 * sparse wires are thick, and low where many layers of thick wire almost touch. `added` caps that by what is added to 1:
 * at low frequency all of it vanishes; layers much closer than turns (pitch 10 d) are what needs a cap above it.
 */
function stackedRatio(thickness: number, spread: number, layers: number): { ratio: number; relativeError: number } {
  const porosity = SQUARE_SIDE / spread;
  const ratio = Math.max(
    dowellRatio(Math.sqrt(porosity) * SQUARE_SIDE * thickness, layers),
    roundWireResistanceRatio(thickness / Math.SQRT2),
  );
  const high = Math.min(1.12 - 1 / spread, 0.05 * thickness + 0.012 * thickness ** 3);
  const low = Math.min(0.02 * thickness, 1 + Math.log10(Math.max(1, thickness / 50)));
  const added = Math.max(1.1, 0.4 * spread) * (1 - 1 / ratio);
  return { ratio, relativeError: Math.min(added, Math.max(high, low)) };
}

function isolatedMethod(isolated: number, winding: Winding, diameter: number, skinDepth: number): Method {
  const alone = winding.turns <= 1;
  const touching = stackedRatio(diameter / skinDepth, 1, 1);
  return {
    name: 'alternating resistance of an isolated round wire, skin effect exact',
    references: ['NBS Circular 74 (1924), Table 17', 'NIST Digital Library of Mathematical Functions, 10.33'],
    relativeError: alone
      ? (1 - 1 / isolated) * Math.min(1, (Math.PI * diameter) / winding.meanTurnLength_m)
      : Math.max(0, (touching.ratio * (1 + touching.relativeError)) / isolated - 1),
    validity: alone
      ? 'wire thin against the turn it is bent to, nothing conducting near'
      : 'turns far apart against their diameter; the error given reaches up to turns that touch: give pitch_m for their proximity',
  };
}

const DOWELL = 'P. L. Dowell, Effects of eddy currents in transformer windings, Proc. IEE 113 (1966) 1387-1394';
const HURLEY =
  'W. G. Hurley, E. Gath, J. G. Breslin, Optimizing the AC resistance of multilayer transformer windings with arbitrary current waveforms, IEEE Trans. Power Electronics 15 (2000) 369-376';
const SULLIVAN =
  'C. R. Sullivan, Optimal choice for number of strands in a litz-wire transformer winding, IEEE Trans. Power Electronics 14 (1999) 283-291';
