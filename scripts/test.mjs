// @ts-check
/**
 * npm test: installs what the tests need, runs the parts, and closes with one line that counts them all.
 * `node scripts/test.mjs unit api` runs only those; the parts are checks, unit, api and e2e.
 */
import { chmodSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { ensurePrograms } from './machine/debian.mjs';
import { ensureModules } from './machine/nodeModules.mjs';
import { checkNode } from './machine/nodeVersion.mjs';
import { root } from './machine/place.mjs';
import { Stop, explain } from './machine/stop.mjs';
import { endAll } from './test/execute.mjs';
import { parts } from './test/parts.mjs';

const say = (/** @type {string} */ line) => console.log(line);
const scratch = mkdtempSync(join(tmpdir(), 'outswell-tests-'));
chmodSync(scratch, 0o711); // the database's account must pass through
const cleanUp = () => rmSync(scratch, { recursive: true, force: true, maxRetries: 5, retryDelay: 100 });

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'])
  process.once(signal, () => {
    endAll();
    setTimeout(() => {
      cleanUp();
      process.exit(130);
    }, 1000);
  });

/** @param {string[]} names */
async function main(names) {
  const unknown = names.find((name) => !(name in parts));
  if (unknown) throw new Stop(`There is no part ${unknown}. The parts: ${Object.keys(parts).join(', ')}.`);
  checkNode();
  /** @param {string[]} those */
  const runsAny = (...those) => those.some((name) => names.includes(name));
  await ensurePrograms(
    [
      ...(runsAny('unit', 'api', 'e2e') ? /** @type {const} */ (['postgresql']) : []),
      ...(runsAny('e2e') ? /** @type {const} */ (['chromium']) : []),
    ],
    say,
  );
  await ensureModules(root, say);
  const total = { passed: 0, failed: 0, skipped: 0 };
  const times = [];
  for (const name of names) {
    say(`\n== ${name}`);
    const began = Date.now();
    const count = await part(name);
    times.push(`${name} ${Math.round((Date.now() - began) / 1000)} s (${count.passed + count.failed})`);
    total.passed += count.passed;
    total.failed += count.failed;
    total.skipped += count.skipped;
  }
  const skipped = total.skipped > 0 ? `, ${total.skipped} skipped` : '';
  say(`\nTimes: ${times.join(', ')}\n\n${total.passed} passed, ${total.failed} failed${skipped}`);
  return total.failed === 0 && total.passed > 0;
}

/** A part that cannot even begin counts as one failure; the others still run. @param {string} name */
async function part(name) {
  const run = parts[name];
  try {
    if (run) return await run({ root, scratch, say });
  } catch (error) {
    console.error(explain(error));
  }
  return { passed: 0, failed: 1, skipped: 0 };
}

let ok = false;
try {
  const asked = process.argv.slice(2);
  ok = await main(asked.length > 0 ? asked : Object.keys(parts));
} catch (error) {
  console.error(explain(error));
}
cleanUp();
process.exitCode = ok ? 0 : 1;
