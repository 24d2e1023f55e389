import { InvalidQuantity } from '../invalid-quantity.ts';

/** What a transient did from 0 to its horizon: everything that the energy audit and the answer are made from. */
export interface Course {
  readonly horizon_s: number;
  /** When |i| falls to the safe current for good; null where it does not by the horizon or no safe current is given. */
  readonly timeToSafe_s: number | null;
  /** When the current is first zero; null where it is not by the horizon. */
  readonly timeToZero_s: number | null;
  /** Largest |voltage| up to the horizon. */
  readonly peakVoltage_V: number;
  /** ∫ i dt to the horizon, in A·s. */
  readonly charge: number;
  /** ∫ i² dt to the horizon, in A²·s. */
  readonly square: number;
  /** Of the snubber's capacitor at the horizon; 0 where there is none. */
  readonly capacitorVoltage_V: number;
  at(time_s: number): { readonly current_A: number; readonly voltage_V: number };
}

/** How far a default horizon goes: this many natural logarithms of decay, to 0.1 % of the change. */
export const HORIZON_DECAY = Math.log(1000);

/** For quantities that are each in range but lead to numbers that are not. */
export function outOfRange(): InvalidQuantity {
  return new InvalidQuantity('', 'the transient leaves the range of numbers that can be calculated with');
}
