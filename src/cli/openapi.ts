import { writeFileSync } from 'node:fs';
import { compose } from '../compose.ts';
import { readConfig } from '../config/index.ts';

/** Writes openapi/openapi.json from the running app; a test fails when the committed file is another. */
const service = await compose(readConfig({ DATA_DIR: ':memory:', LOG_LEVEL: 'silent' }));
await service.app.ready();
writeFileSync(
  new URL('../../openapi/openapi.json', import.meta.url),
  `${JSON.stringify(service.app.swagger(), null, 2)}\n`,
);
await service.dispose();
