import { type CoaxialPair, coupledCoils } from '../mutual.ts';
import { type Calculation, numbersOf } from './calculation.ts';

/** Two coaxial coils: mutual inductance, coupling and, with currents, energy and axial force. */
export const mutualInductance: Calculation<CoaxialPair, ReturnType<typeof coupledCoils>> = {
  calculate: coupledCoils,
  mainOutputs: ({ method, ...numbers }) => numbersOf(numbers),
};
