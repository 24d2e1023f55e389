import type { Method } from '../method.ts';

/** Radial and axial component of H per ampere, in 1 over whatever unit of length the point was given in. */
export interface UnitField {
  readonly radial: number;
  readonly axial: number;
}

/** A point by its distance from the coil's axis, ≥ 0, and its height above the coil's mid-plane. */
export interface FieldPoint {
  readonly radius_m: number;
  readonly axial_m: number;
}

/** A coil made ready for its field: symmetrical about its mid-plane, all of its current within the envelope. */
export interface FieldModel {
  readonly turns: number;
  /** A length of the coil's own size, the unit of `at`. */
  readonly size_m: number;
  /** Largest radius at which current may flow, the winding's outer surface. */
  readonly outerRadius_m: number;
  /** Height over the mid-plane up to which the model's current flows. */
  readonly halfLength_m: number;
  /** Distance of the winding's farthest point from the coil's centre. */
  readonly reach_m: number;
  readonly method: Method;
  /**
   * H per ampere-turn in 1/size at a point whose axial_m is ≥ 0. Throws `InvalidQuantity` at `/radius_m` where the ideal
   * current distribution has no finite field.
   */
  at(point: FieldPoint): UnitField;
}
