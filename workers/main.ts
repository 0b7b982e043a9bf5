import { loadConfig } from '@/server/config';
import { makeParts } from '@/server/services/parts';
import { startWorker } from './run';

async function main() {
  const parts = makeParts(loadConfig(), 'worker');
  const worker = await startWorker(parts);
  let stopping = false;
  const stop = async () => {
    if (stopping) return;
    stopping = true;
    parts.log.info('stopping');
    await worker.stop();
    await parts.cubeFiles.close();
    await parts.db.destroy();
    process.exit(0);
  };
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
}

main().catch((error: Error) => {
  process.stderr.write(`${error.name === 'ConfigError' ? error.message : (error.stack ?? String(error))}\n`);
  process.exit(1);
});
