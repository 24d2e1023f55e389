import type { Pulse, PulseAnalysis } from '../evidence/pulse.ts';
import type { MonteCarloOptions, MonteCarloResult } from '../metrology/monte-carlo.ts';
import type { CalculationName } from '../physics/calculations/index.ts';

/** One Monte Carlo propagation: a calculation, its request, and which numbers of it are uncertain. */
export interface Simulation {
  readonly calculation: CalculationName;
  readonly request: object;
  readonly uncertainty: Readonly<Record<string, number>>;
  readonly options: MonteCarloOptions;
}

/** The port to what computes beside the event loop, so that it stays free. Errors are those of the calculation itself. */
export interface Compute {
  simulate(simulation: Simulation): Promise<MonteCarloResult>;
  analysePulse(pulse: Pulse): Promise<PulseAnalysis>;
  close(): Promise<void>;
}
