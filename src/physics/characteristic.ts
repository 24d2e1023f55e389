import type { Method } from './method.ts';

/**
 * The flux characteristic of an inductor: its flux linkage λ as a function of its current i. Everything that is decided about
 * a part goes through one of these and never asks whether it came from a construction or from a rig.
 *
 * Odd in i: λ(−i) = −λ(i). Strictly increasing. All functions take currents up to `maximumCurrent_A` in magnitude and throw
 * `InvalidQuantity` (pointer '', the caller prefixes) beyond it: nothing is extrapolated.
 */
export interface FluxCharacteristic {
  readonly kind: 'linear' | 'cored' | 'measured';
  /** Largest |i| that the characteristic knows; Infinity for a construction, the last reading for a measured sweep. */
  readonly maximumCurrent_A: number;
  readonly method: Method;
  /** λ(i) in Wb. */
  fluxLinkage_Wb(current_A: number): number;
  /** dλ/di in H. */
  differentialInductance_H(current_A: number): number;
  /** λ/i in H; at i = 0 its limit, the differential inductance there. */
  apparentInductance_H(current_A: number): number;
  /** ∫₀^λ i dλ in J: what the inductor stores. */
  energy_J(current_A: number): number;
  /** ∫₀^i λ di in J; energy + co-energy = i·λ. */
  coenergy_J(current_A: number): number;
  /** The inverse: the current in A at which the flux linkage is λ. */
  current_A(fluxLinkage_Wb: number): number;
  /**
   * Currents in A, positive and increasing, between which (and below and above which) dλ/di is monotone; none where it is monotone
   * throughout. Whoever looks for the first crossing of a level needs no finer scan.
   */
  readonly slopeTurns_A?: readonly number[];
  /**
   * Bound on the model's relative error at a current, where it grows with it; `method.relativeError` is the one near zero current.
   * It bounds the current at which a flux linkage is reached, hence λ, energy and apparent inductance; of dλ/di beyond the knee see
   * `differentialInductanceError`.
   */
  relativeErrorAt?(current_A: number): number;
}

/** The method of a quantity taken from the characteristic at one current, with the error that belongs there. */
export function methodAt(characteristic: FluxCharacteristic, current_A: number): Method {
  const { method } = characteristic;
  return { ...method, relativeError: relativeErrorAt(characteristic, current_A) };
}

function relativeErrorAt(characteristic: FluxCharacteristic, current_A: number): number {
  return characteristic.relativeErrorAt?.(current_A) ?? characteristic.method.relativeError;
}

/**
 * Bound on the relative error of dλ/di at a current. Beyond the knee a small error of the current scale e moves dλ/di far, so that it
 * is read at the currents i/(1 + e) and i·(1 + e) as well; the larger of the two changes, plus e, at most 1.
 */
export function differentialInductanceError(characteristic: FluxCharacteristic, current_A: number): number {
  const error = relativeErrorAt(characteristic, current_A);
  const here = characteristic.differentialInductance_H(current_A);
  const changes = [1 / (1 + error), 1 + error].map((scale) => {
    const shifted = Math.min(Math.abs(current_A) * scale, characteristic.maximumCurrent_A);
    return Math.abs(characteristic.differentialInductance_H(shifted) / here - 1);
  });
  return Math.min(Math.max(...changes) + error, 1);
}
