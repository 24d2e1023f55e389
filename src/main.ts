import closeWithGrace from 'close-with-grace';
import { compose } from './compose.ts';
import { readConfig } from './config/index.ts';

/** Process entry: reads the environment, starts to listen, and on SIGTERM or SIGINT lets what is in flight finish. */
async function main(): Promise<void> {
  const config = readConfig(process.env);
  const service = await compose(config);
  const { app } = service;
  closeWithGrace({ delay: 8000 }, async ({ err, signal }) => {
    if (err) app.log.fatal({ err }, 'stopping: an error nobody handled');
    else app.log.info({ signal }, 'stopping');
    await service.dispose();
  });
  await app.listen(config.listen);
}

main().catch((error: unknown) => {
  process.stderr.write(`coilproof: cannot start. ${error instanceof Error ? error.message : String(error)}\n`);
  process.exit(1);
});
