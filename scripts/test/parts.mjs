// @ts-check
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { ensureClient } from '../machine/client.mjs';
import { execute, tool } from './execute.mjs';

/** @typedef {{ passed: number, failed: number, skipped: number }} Count */
/** @typedef {{ root: string, scratch: string, say: (line: string) => void }} Place */

/** @param {string} root */
const quoted = (root) => root.replace(/[.*+?^${}()|[\]\\]/g, '\\$&');

/**
 * Format, lint and types; each is one test. Two at a time, for two cores.
 * @param {Place} place @returns {Promise<Count>}
 */
async function checks({ root, say }) {
  /** @type {[string, string, string[]][]} */
  const lanes = [
    ['eslint', tool(root, 'eslint/bin/eslint.js'), ['.', '--cache', '--cache-location', '.cache/eslint/']],
    [
      'prettier',
      tool(root, 'prettier/bin/prettier.cjs'),
      ['--check', '.', '--cache', '--cache-location', '.cache/prettier'],
    ],
    ...['tsconfig.json', 'tsconfig.server.json', 'tsconfig.shared.json'].map(
      (config) =>
        /** @type {[string, string, string[]]} */ ([
          `tsc -p ${config}`,
          tool(root, 'typescript/bin/tsc'),
          ['-p', config],
        ]),
    ),
  ];
  const count = { passed: 0, failed: 0, skipped: 0 };
  const lane = async () => {
    for (let next = lanes.shift(); next; next = lanes.shift()) {
      const [name, program, args] = next;
      const { ok, output } = await execute(program, args, { cwd: root, capture: true });
      say(`${ok ? 'PASS' : 'FAIL'} ${name}${ok ? '' : `\n${output}`}`);
      count[ok ? 'passed' : 'failed']++;
    }
  };
  await Promise.all([lane(), lane()]);
  return count;
}

/**
 * Runs jest and reads its own count. A file that cannot run at all counts as one failure.
 * @param {Place} place @param {string} name @param {string[]} args @returns {Promise<Count>}
 */
async function jest({ root, scratch, say }, name, args) {
  const report = join(scratch, `${name}.json`);
  const { ok } = await execute(
    tool(root, 'jest/bin/jest.js'),
    [...args, '--json', `--outputFile=${report}`],
    {
      cwd: root,
      env: { ...process.env, NODE_ENV: 'test', TMPDIR: scratch },
      discardOutput: true, // the same JSON again; what people read goes to standard error
    },
  );
  const count = read(report);
  if (!count) {
    say(`jest made no report for ${name}.`);
    return { passed: 0, failed: 1, skipped: 0 };
  }
  if (!ok && count.failed === 0) count.failed = 1; // such as a global set-up that failed
  if (ok && count.passed + count.failed === 0) {
    say(`No tests were found for ${name}.`);
    count.failed = 1;
  }
  return count;
}

/** @param {string} report @returns {Count | null} */
function read(report) {
  try {
    const r = JSON.parse(readFileSync(report, 'utf8'));
    return {
      passed: r.numPassedTests,
      failed: r.numFailedTests + r.numRuntimeErrorTestSuites,
      skipped: r.numPendingTests + r.numTodoTests,
    };
  } catch {
    return null;
  }
}

/** The parts of the suite, in the order in which they run. @type {Record<string, (place: Place) => Promise<Count>>} */
export const parts = {
  checks,
  unit: (place) =>
    jest(place, 'unit', [
      ...['--selectProjects', 'node', 'ui', 'web'],
      `--testPathPattern=^${quoted(place.root)}/(shared|components|hooks)/`,
    ]),
  api: (place) =>
    jest(place, 'api', [
      ...['--selectProjects', 'node'],
      `--testPathPattern=^${quoted(place.root)}/(server|workers|scripts|tests/api)/`,
    ]),
  e2e: async (place) => {
    await ensureClient(place.root, place.say);
    // One file at a time: each drives a browser, a server and a worker, which keep two cores busy. What a browser
    // leaves open must not keep the run from ending.
    return jest(place, 'e2e', ['--selectProjects', 'e2e', '--runInBand', '--forceExit']);
  },
};
