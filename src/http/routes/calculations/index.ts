import type { FastifyInstance } from 'fastify';
import type { CalculationPorts } from './calculation.ts';
import { conformityRoute } from './conformity.ts';
import { energyRoute } from './energy.ts';
import { energyDensityRoute } from './energy-density.ts';
import { fieldRoute } from './field.ts';
import { inductanceRoute } from './inductance.ts';
import { lossesRoute } from './losses.ts';
import { mutualInductanceRoute } from './mutual-inductance.ts';
import { pulseAnalysisRoute } from './pulse-analysis.ts';
import { saturationRoute } from './saturation.ts';
import { transientRoute } from './transient.ts';

/** The calculations of /v1: nothing stored. */
export function calculations(app: FastifyInstance, ports: CalculationPorts): void {
  inductanceRoute(app, ports);
  mutualInductanceRoute(app, ports);
  energyRoute(app, ports);
  energyDensityRoute(app, ports);
  saturationRoute(app, ports);
  fieldRoute(app, ports);
  transientRoute(app, ports);
  lossesRoute(app, ports);
  conformityRoute(app);
  pulseAnalysisRoute(app, ports);
}
