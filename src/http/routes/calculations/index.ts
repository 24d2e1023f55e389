import type { FastifyInstance } from 'fastify';
import type { Registry } from '../../../approval/registry.ts';
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
export function calculations(app: FastifyInstance, registry: Registry): void {
  inductanceRoute(app, registry);
  mutualInductanceRoute(app, registry);
  energyRoute(app, registry);
  energyDensityRoute(app, registry);
  saturationRoute(app, registry);
  fieldRoute(app, registry);
  transientRoute(app, registry);
  lossesRoute(app, registry);
  conformityRoute(app);
}
