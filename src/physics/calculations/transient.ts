import { type Inductor, inductorCharacteristic } from '../inductor.ts';
import { within } from '../invalid-quantity.ts';
import { type TransientRequest as Event, type Transient, transient as transientOf } from '../transients/transient.ts';
import { type Calculation, numbersOf } from './calculation.ts';

export type TransientRequest = Event & {
  readonly inductor: Inductor;
  /** of the core, where the inductor has one */
  readonly temperature_degC?: number;
};

/** Turn-on and turn-off of an inductor. */
export const transient: Calculation<TransientRequest, Transient> = {
  calculate({ inductor, temperature_degC, ...event }) {
    return transientOf(
      within('/inductor', () => inductorCharacteristic(inductor, temperature_degC)),
      event,
    );
  },
  mainOutputs: ({ peakVoltage_V, timeToSafe_s, timeToZero_s, finalCurrent_A, energy }) => {
    const { residual_J, ...energies } = energy;
    return numbersOf({ peakVoltage_V, timeToSafe_s, timeToZero_s, finalCurrent_A, ...energies });
  },
};
