import { type FluxCharacteristic, methodAt } from '../characteristic.ts';
import { type Coil, coilCharacteristic } from '../coil.ts';
import { spiralCurrentSheet_H } from '../coils/flat-spiral.ts';
import { within } from '../invalid-quantity.ts';
import { type Winding, windingResistance } from '../losses/winding-resistance.ts';
import type { Method } from '../method.ts';
import { type Calculation, numbersOf } from './calculation.ts';

export interface InductanceRequest {
  readonly coil: Coil;
  readonly current_A?: number;
  /** of core and winding */
  readonly temperature_degC?: number;
  readonly winding?: Winding;
}

export interface InductanceAnswer {
  /** at zero current */
  readonly inductance_H: number;
  /** of a flat spiral: a published closed form beside the sum; their difference is in the method's relative error */
  readonly closedForm_H?: number;
  /** at `current_A` */
  readonly energy_J?: number;
  readonly fluxLinkage_Wb?: number;
  readonly apparentInductance_H?: number;
  readonly differentialInductance_H?: number;
  /** of the winding, direct current */
  readonly resistance_ohm?: number;
  readonly timeConstant_s?: number;
  readonly method: Method;
}

const TEMPERATURE_BESIDE = { '/temperature_degC': '/temperature_degC' };

/** Temperature of a winding where none is given: the one that conductor standards state resistivity at. */
const REFERENCE_TEMPERATURE_DEGC = 20;

/** Inductance of a construction; what it stores at a current; resistance and time constant of its winding. */
export const inductance: Calculation<InductanceRequest, InductanceAnswer> = {
  calculate({ coil, current_A, temperature_degC, winding }) {
    const characteristic = within('/coil', () => coilCharacteristic(coil, temperature_degC));
    const inductance_H = characteristic.differentialInductance_H(0);
    return {
      inductance_H,
      ...(coil.shape === 'flat-spiral' && { closedForm_H: spiralCurrentSheet_H(coil) }),
      ...(current_A !== undefined && atCurrent(characteristic, current_A)),
      ...(winding && resistive(winding, inductance_H, temperature_degC)),
      method: methodAt(characteristic, current_A ?? 0),
    };
  },
  mainOutputs: ({ method, ...numbers }) => numbersOf(numbers),
};

function atCurrent(characteristic: FluxCharacteristic, current_A: number) {
  return {
    energy_J: characteristic.energy_J(current_A),
    fluxLinkage_Wb: characteristic.fluxLinkage_Wb(current_A),
    ...(characteristic.kind !== 'linear' && {
      apparentInductance_H: characteristic.apparentInductance_H(current_A),
      differentialInductance_H: characteristic.differentialInductance_H(current_A),
    }),
  };
}

function resistive(winding: Winding, inductance_H: number, temperature_degC = REFERENCE_TEMPERATURE_DEGC) {
  const { resistance_ohm } = within('/winding', () => windingResistance(winding, temperature_degC), TEMPERATURE_BESIDE);
  return { resistance_ohm, timeConstant_s: inductance_H / resistance_ohm };
}
