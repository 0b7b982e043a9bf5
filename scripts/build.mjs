// @ts-check
// npm run build: the client into dist/, whether or not its sources changed.
import { ensureClient } from './machine/client.mjs';
import { root } from './machine/place.mjs';
import { explain } from './machine/stop.mjs';

try {
  await ensureClient(root, console.log, { force: true });
} catch (error) {
  console.error(explain(error));
  process.exitCode = 1;
}
