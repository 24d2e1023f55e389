import type { MonteCarloOptions, MonteCarloResult } from '../metrology/monte-carlo.ts';
import type { CalculationName } from '../physics/calculations/index.ts';

/** One Monte Carlo propagation: a calculation, its request, and which numbers of it are uncertain. */
export interface Simulation {
  readonly calculation: CalculationName;
  readonly request: object;
  readonly uncertainty: Readonly<Record<string, number>>;
  readonly options: MonteCarloOptions;
}

/** The port to what runs simulations beside the event loop. */
export interface Simulator {
  simulate(simulation: Simulation): Promise<MonteCarloResult>;
  close(): Promise<void>;
}
