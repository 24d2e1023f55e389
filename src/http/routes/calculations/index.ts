import type { FastifyInstance } from 'fastify';
import { conformityRoute } from './conformity.ts';
import { energyRoute } from './energy.ts';
import { energyDensityRoute } from './energy-density.ts';
import { fieldRoute } from './field.ts';
import { inductanceRoute } from './inductance.ts';
import { lossesRoute } from './losses.ts';
import { mutualInductanceRoute } from './mutual-inductance.ts';
import { saturationRoute } from './saturation.ts';
import { transientRoute } from './transient.ts';

/** The calculations of /v1: nothing stored. */
export function calculations(app: FastifyInstance): void {
  inductanceRoute(app);
  mutualInductanceRoute(app);
  energyRoute(app);
  energyDensityRoute(app);
  saturationRoute(app);
  fieldRoute(app);
  transientRoute(app);
  lossesRoute(app);
  conformityRoute(app);
}
