import { type FieldAt, type FieldCoil, fieldAt, fieldMethod, limitDistances } from '../fields/field.ts';
import { within } from '../invalid-quantity.ts';
import type { Method } from '../method.ts';
import type { Calculation } from './calculation.ts';

export interface FieldRequest {
  readonly coil: FieldCoil;
  readonly current_A: number;
  /** from the coil's centre */
  readonly points: readonly { readonly radius_m: number; readonly axial_m: number }[];
  readonly limit_T?: number;
}

export interface FieldAnswer {
  readonly points: readonly FieldAt[];
  /** from the coil's centre along its axis and in its mid-plane: beyond, the flux density stays at or below the limit */
  readonly limitDistance?: { readonly axial_m: number | null; readonly radial_m: number | null };
  readonly method: Method;
}

/** Flux density of a coil at points, and where it falls to a limit. */
export const field: Calculation<FieldRequest, FieldAnswer> = {
  calculate({ coil, current_A, points, limit_T }) {
    // First, so that dimensions which contradict each other are told of the coil and not of a point.
    const method = within('/coil', () => fieldMethod(coil));
    return {
      points: points.map((point, index) => within(`/points/${index}`, () => fieldAt(coil, current_A, point))),
      ...(limit_T !== undefined && { limitDistance: limitDistances(coil, current_A, limit_T) }),
      method,
    };
  },
  mainOutputs: ({ points }) =>
    Object.fromEntries(points.map(({ magnitude_T }, index) => [`points/${index}/magnitude_T`, magnitude_T])),
};
