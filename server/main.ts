import type { AddressInfo } from 'node:net';
import { loadConfig } from './config';
import { makeApp } from './app';
import { httpServer } from './httpServer';
import { makeParts } from './services/parts';
import { finishInterrupted } from './services/uploads';

async function main() {
  const parts = makeParts(loadConfig(), 'server');
  const { config, log } = parts;
  const app = await makeApp(parts);
  const server = httpServer(app.express);
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(config.port, config.host, resolve);
  });
  log.info({ port: (server.address() as AddressInfo).port, host: config.host }, 'listening');
  finishInterrupted(parts).catch((error) =>
    log.warn({ error }, 'interrupted uploads could not be looked at'),
  );

  let stopping = false;
  const stop = async () => {
    if (stopping) return;
    stopping = true;
    log.info('stopping');
    const closed = new Promise((resolve) => server.close(resolve));
    await app.close();
    server.closeIdleConnections();
    setTimeout(() => server.closeAllConnections(), 1500).unref(); // live feeds never end by themselves
    await closed;
    await parts.cubeFiles.close();
    await parts.db.destroy();
    process.exit(0);
  };
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
}

main().catch((error: Error & { code?: string }) => {
  const text =
    error.name === 'ConfigError'
      ? error.message
      : error.code === 'EADDRINUSE'
        ? 'The port is taken. Choose another one with PORT.'
        : (error.stack ?? String(error));
  process.stderr.write(`${text}\n`);
  process.exit(1);
});
