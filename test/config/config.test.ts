import { describe, expect, it } from 'vitest';
import { readConfig } from '../../src/config/index.ts';

describe('configuration from the environment', () => {
  it('listens on loopback unless told otherwise', () => {
    expect(readConfig({})).toEqual({
      listen: { host: '127.0.0.1', port: 8080 },
      store: { dataDir: './data' },
      limits: { bodyBytes: 1048576, requestTimeout_ms: 30000, requestsInFlight: 1000 },
      log: { level: 'info' },
    });
  });

  it('takes an empty variable as absent and ignores variables that are not its own', () => {
    expect(readConfig({ PORT: '', PATH: '/bin' }).listen.port).toBe(8080);
  });

  it.each([
    ['PORT', '-1'],
    ['PORT', '80x'],
    ['PORT', '65536'],
    ['LOG_LEVEL', 'loud'],
    ['BODY_LIMIT_BYTES', '12'],
    ['REQUEST_TIMEOUT_MS', '1.5'],
  ])('refuses %s=%s and names the variable', (name, value) => {
    expect(() => readConfig({ [name]: value })).toThrow(name);
  });

  it('names every variable that is not usable', () => {
    expect(() => readConfig({ PORT: 'x', LOG_LEVEL: 'x' })).toThrow(/PORT.*LOG_LEVEL/);
  });
});
