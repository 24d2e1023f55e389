import type { Drawing } from '../evidence/drawing.ts';
import type { Coil } from '../physics/coil.ts';
import type { Cooling } from '../physics/losses/temperature-rise.ts';
import type { Winding } from '../physics/losses/winding-resistance.ts';

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
