import type { Coil } from '../physics/coil.ts';
import type { Cooling } from '../physics/losses/temperature-rise.ts';
import type { Winding } from '../physics/losses/winding-resistance.ts';

/** What the drawing promises. */
export interface Drawing {
  readonly inductance: {
    readonly nominal_H: number;
    readonly lower_H: number;
    readonly upper_H: number;
    /** absent: at zero current */
    readonly testCurrent_A?: number;
    readonly testFrequency_Hz?: number;
  };
  readonly resistance?: { readonly upper_ohm: number; readonly temperature_degC: number };
  readonly saturation?: {
    readonly current_A: number;
    readonly inductanceDrop: number;
    readonly temperature_degC: number;
  };
  readonly thermal?: { readonly current_A: number; readonly rise_K: number };
}

/** How the part is made. */
export interface Construction {
  readonly coil: Coil;
  readonly winding?: Winding;
  /** how the part sheds its heat; absent: as the drawing's thermal promise implies */
  readonly cooling?: Cooling;
}

/** A part at a revision: what its drawing promises and how it is made. */
export interface Part {
  readonly number: string;
  readonly revision: string;
  readonly description?: string;
  readonly drawing?: Drawing;
  readonly construction?: Construction;
}
