import { randomUUIDv7 } from 'node:crypto';
import { readFileSync } from 'node:fs';
import type { FastifyInstance } from 'fastify';
import { type DestinationStream, pino } from 'pino';
import type { ApprovalDesk } from './approval/approval.ts';
import type { Config } from './config/index.ts';
import { groupCommit } from './evidence/group-commit.ts';
import { createApp } from './http/app.ts';
import { approvalStore } from './storage/approvals.ts';
import { openPostgres } from './storage/postgres.ts';
import { registryStore } from './storage/registry.ts';
import { openSqlite } from './storage/sqlite.ts';
import { unitStore } from './storage/units.ts';
import { createCompute } from './workers/compute.ts';

/** The service, wired: an unstarted server and what has to be disposed of after it. */
export interface Service {
  readonly app: FastifyInstance;
  readonly desk: ApprovalDesk;
  dispose(): Promise<void>;
}

/** What tests put in place of the real thing. */
export interface Overrides {
  readonly now?: () => Date;
  readonly newId?: () => string;
  readonly logDestination?: DestinationStream;
}

const { version } = JSON.parse(readFileSync(new URL('../package.json', import.meta.url), 'utf8')) as {
  version: string;
};

/** Picks the implementations and wires them; the one place that does. */
export async function compose(config: Config, overrides: Overrides = {}): Promise<Service> {
  const logger = pino({ level: config.log.level }, overrides.logDestination ?? pino.destination({ sync: false }));
  const { store } = config;
  const database = 'postgresUrl' in store ? await openPostgres(store.postgresUrl) : await openSqlite(store.dataDir);
  const desk: ApprovalDesk = {
    store: approvalStore(database),
    registry: registryStore(database),
    units: groupCommit(unitStore(database)),
    compute: createCompute(),
    engineVersion: version,
    now: overrides.now ?? (() => new Date()),
    newId: overrides.newId ?? randomUUIDv7,
  };
  const app = await createApp({ version, logger, limits: config.limits, desk });
  return {
    app,
    desk,
    dispose: async () => {
      await app.close();
      await desk.compute.close();
      await database.close();
    },
  };
}
