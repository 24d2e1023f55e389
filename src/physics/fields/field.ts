import type { Method } from '../method.ts';
import { type FieldAt, type FieldCoil, fieldModel, fluxDensityAt } from './coil-model.ts';
import type { FieldPoint } from './model.ts';

export { type FieldAt, type FieldCoil, isFieldCoil } from './coil-model.ts';
export { limitDistances } from './limit-distance.ts';
export type { FieldPoint } from './model.ts';
export { worstFieldAtDistance } from './worst-field.ts';

/**
 * Flux density in T of a coil in air that carries `current_A`, at a point measured from the coil's centre. A positive current
 * makes the axial component at the centre positive.
 *
 * Finite everywhere but on the edge of a solenoid's ideal current sheet; on the sheet itself the mean of both sides. The
 * radial component is exactly 0 on the axis and in the mid-plane. Accuracy: `filamentField`, `sheetField`, `sectionField`.
 *
 * Throws `InvalidQuantity` with a pointer into the **point**: `/radius_m` on that edge, '' where the flux density exceeds the
 * range of numbers. A contradiction within the coil throws with a pointer into the **coil**; callers who have to tell them
 * apart ask for `fieldMethod(coil)` first.
 */
export function fieldAt(coil: FieldCoil, current_A: number, point: FieldPoint): FieldAt {
  return fluxDensityAt(fieldModel(coil), current_A, point);
}

/** How the coil's field is obtained. Throws `InvalidQuantity` at the coil's member where its dimensions contradict. */
export function fieldMethod(coil: FieldCoil): Method {
  return fieldModel(coil).method;
}
