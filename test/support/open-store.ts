import { compose } from '../../src/compose.ts';
import { readConfig } from '../../src/config/index.ts';

/** A process of its own that opens the store that its environment names, migrates it, and ends. */
const service = await compose(readConfig(process.env));
await service.desk.store.ping();
await service.dispose();
