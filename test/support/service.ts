import { Writable } from 'node:stream';
import { afterAll, beforeAll } from 'vitest';
import { compose, type Overrides, type Service } from '../../src/compose.ts';
import { readConfig } from '../../src/config/index.ts';

/** A composed service that keeps nothing on disk and listens nowhere; log lines are collected. */
export async function testService(
  environment: Record<string, string> = {},
  overrides: Overrides = {},
): Promise<Service & { readonly logLines: string[] }> {
  const logLines: string[] = [];
  const logDestination = new Writable({
    write(chunk, _encoding, done) {
      logLines.push(String(chunk));
      done();
    },
  });
  const service = await compose(readConfig({ DATA_DIR: ':memory:', ...environment }), { logDestination, ...overrides });
  await service.app.ready();
  return { ...service, logLines };
}

/** One service for the tests of a file. */
export function useService(environment: Record<string, string> = {}): { readonly server: Service['app']['server'] } & {
  readonly service: () => Awaited<ReturnType<typeof testService>>;
} {
  let service: Awaited<ReturnType<typeof testService>>;
  beforeAll(async () => {
    service = await testService(environment);
  });
  afterAll(() => service.dispose());
  return {
    get server() {
      return service.app.server;
    },
    service: () => service,
  };
}
