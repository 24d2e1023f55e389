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
}
