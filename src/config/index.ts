import { z } from 'zod';
import { CoilproofError } from '../errors.ts';

/** Checked and grouped; read once at start and passed down, never read again. */
export interface Config {
  readonly listen: { readonly host: string; readonly port: number };
  readonly store: { readonly dataDir: string } | { readonly postgresUrl: string };
  readonly limits: {
    readonly bodyBytes: number;
    readonly requestTimeout_ms: number;
    readonly requestsInFlight: number;
  };
  readonly log: { readonly level: string };
}

/** The environment's variables, their defaults and what they accept; the README's table is compared with this in a test. */
export const Environment = z.object({
  HOST: z.string().min(1).default('127.0.0.1').describe('address to listen on; loopback unless told otherwise'),
  PORT: z.coerce.number().int().min(0).max(65535).default(8080).describe('port to listen on; 0 takes a free one'),
  DATA_DIR: z.string().min(1).default('./data').describe('folder of the embedded store'),
  DATABASE_URL: z
    .url({ protocol: /^postgres(ql)?$/ })
    .optional()
    .describe('PostgreSQL in place of the embedded store'),
  LOG_LEVEL: z
    .enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent'])
    .default('info')
    .describe('least severe level that is logged'),
  BODY_LIMIT_BYTES: z.coerce
    .number()
    .int()
    .min(1024)
    .max(1 << 30)
    .default(1 << 20)
    .describe('largest request body'),
  REQUEST_TIMEOUT_MS: z.coerce
    .number()
    .int()
    .min(100)
    .max(600_000)
    .default(30_000)
    .describe('time a request may be idle, and may take to be answered'),
  REQUESTS_IN_FLIGHT: z.coerce
    .number()
    .int()
    .min(1)
    .max(100_000)
    .default(1000)
    .describe('requests under way at once; further ones are told to come back'),
});

/** Reads the environment; throws `CoilproofError` naming every variable that is not usable. Empty counts as absent. */
export function readConfig(environment: Readonly<Record<string, string | undefined>>): Config {
  const given = Object.fromEntries(
    Object.entries(environment).filter(([, value]) => value !== undefined && value !== ''),
  );
  const parsed = Environment.safeParse(given);
  if (!parsed.success) {
    const detail = parsed.error.issues.map(({ path, message }) => `${path.join('.')}: ${message}`).join('; ');
    throw new CoilproofError('invalid-parameter', `The environment is not usable. ${detail}`);
  }
  const e = parsed.data;
  return {
    listen: { host: e.HOST, port: e.PORT },
    store: e.DATABASE_URL === undefined ? { dataDir: e.DATA_DIR } : { postgresUrl: e.DATABASE_URL },
    limits: {
      bodyBytes: e.BODY_LIMIT_BYTES,
      requestTimeout_ms: e.REQUEST_TIMEOUT_MS,
      requestsInFlight: e.REQUESTS_IN_FLIGHT,
    },
    log: { level: e.LOG_LEVEL },
  };
}
