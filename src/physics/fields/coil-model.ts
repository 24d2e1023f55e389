import type { Multilayer } from '../coils/multilayer.ts';
import type { RoundLoop } from '../coils/round-loop.ts';
import type { Solenoid } from '../coils/solenoid.ts';
import { VACUUM_PERMEABILITY_H_PER_M } from '../constants.ts';
import { InvalidQuantity } from '../invalid-quantity.ts';
import { loopField } from './loop.ts';
import type { FieldModel, FieldPoint } from './model.ts';
import { multilayerField } from './multilayer.ts';
import { solenoidField } from './solenoid.ts';

/** A coil in air whose field is calculated. */
export type FieldCoil = RoundLoop | Solenoid | Multilayer;

/** Flux density at a point: its components along the radius and along the axis, and what follows from them. */
export interface FieldAt {
  readonly radial_T: number;
  readonly axial_T: number;
  readonly magnitude_T: number;
  /** B²/2µ0; the same number in Pa is the magnetic pressure. */
  readonly energyDensity_J_per_m3: number;
}

/** Beyond this many sizes of the coil the field counts as zero: its cube is still a number, its reciprocal nearly none. */
const FARTHEST = 1e100;

/** Whether the field of this winding is calculated here. */
export function isFieldCoil<T extends { readonly shape: string }>(coil: T): coil is T & FieldCoil {
  return coil.shape === 'round-loop' || coil.shape === 'solenoid' || coil.shape === 'multilayer';
}

/** The coil made ready. Throws `InvalidQuantity` at the coil's own member where its dimensions contradict each other. */
export function fieldModel(coil: FieldCoil): FieldModel {
  switch (coil.shape) {
    case 'round-loop':
      return loopField(coil);
    case 'solenoid':
      return solenoidField(coil);
    case 'multilayer':
      return multilayerField(coil);
  }
}

/** Radial and axial flux density in T; not finite where it exceeds the range of numbers. */
function components(model: FieldModel, current_A: number, { radius_m, axial_m }: FieldPoint): [number, number] {
  const height_m = Math.abs(axial_m);
  const near = radius_m / model.size_m + height_m / model.size_m < FARTHEST;
  const unit = near ? model.at({ radius_m, axial_m: height_m }) : { radial: 0, axial: 0 };
  const scale = VACUUM_PERMEABILITY_H_PER_M * model.turns * (current_A / model.size_m);
  // Below the mid-plane the radial component points the other way. + 0 turns −0 into 0.
  return [scale * (axial_m < 0 ? -unit.radial : unit.radial) + 0, scale * unit.axial + 0];
}

/** |B| in T, for a search: what exceeds the range of numbers is the largest of them. */
export function magnitudeAt(model: FieldModel, current_A: number, point: FieldPoint): number {
  const [radial_T, axial_T] = components(model, current_A, point);
  const magnitude_T = Math.hypot(radial_T, axial_T);
  return Number.isFinite(magnitude_T) ? magnitude_T : Number.MAX_VALUE;
}

/**
 * Flux density of the coil that carries `current_A`, at a point on either side of its mid-plane. Throws `InvalidQuantity` as
 * the model's `at` does, and at '' where the flux density or its energy exceeds the range of numbers.
 */
export function fluxDensityAt(model: FieldModel, current_A: number, point: FieldPoint): FieldAt {
  const [radial_T, axial_T] = components(model, current_A, point);
  const magnitude_T = Math.hypot(radial_T, axial_T);
  const energyDensity_J_per_m3 = (magnitude_T / (2 * VACUUM_PERMEABILITY_H_PER_M)) * magnitude_T;
  if (!Number.isFinite(energyDensity_J_per_m3)) {
    throw new InvalidQuantity('', 'the flux density at this point exceeds the range of numbers');
  }
  return { radial_T, axial_T, magnitude_T, energyDensity_J_per_m3 };
}
