import type { FastifyInstance } from 'fastify';
import type { UnitDesk } from '../../../approval/measuring.ts';
import { lotEvents } from './events.ts';
import { getUnits } from './get-units.ts';
import { postUnits } from './post-units.ts';

/** /v1/lots/{lot}: what was measured of a lot. */
export function lots(app: FastifyInstance, desk: UnitDesk): void {
  postUnits(app, desk);
  getUnits(app, desk);
  lotEvents(app, desk);
}
