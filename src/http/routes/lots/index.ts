import type { FastifyInstance } from 'fastify';
import type { UnitDesk } from '../../../approval/measuring.ts';
import { lotEvents } from './events.ts';
import { getFigure } from './figures.ts';
import { getLot } from './get-lot.ts';
import { getUnits } from './get-units.ts';
import { postUnits } from './post-units.ts';
import { getStatistics } from './statistics.ts';
import { getTrend } from './trend.ts';

/** /v1/lots/{lot}: what was measured of a lot. */
export function lots(app: FastifyInstance, desk: UnitDesk): void {
  getLot(app, desk);
  postUnits(app, desk);
  getUnits(app, desk);
  getStatistics(app, desk);
  getTrend(app, desk);
  getFigure(app, desk);
  lotEvents(app, desk);
}
