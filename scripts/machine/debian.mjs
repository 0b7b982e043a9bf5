// @ts-check
import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { serverBinaries } from './postgresBinaries.mjs';
import { run } from './run.mjs';
import { Stop } from './stop.mjs';

/** @param {string} name */
const onPath = (name) =>
  (process.env.PATH ?? '').split(delimiter).some((dir) => dir && existsSync(join(dir, name)));

/**
 * What the machine itself must have: how to see that it is there, and Debian's packages that bring it.
 * @type {Record<'postgresql' | 'chromium' | 'numpy' | 'scipy', { name: string, present: () => boolean, packages: string[], otherwise: string }>}
 */
export const needs = {
  postgresql: {
    name: 'PostgreSQL',
    present: () => serverBinaries() !== null,
    packages: ['postgresql'],
    otherwise:
      'or set PG_BIN to the folder with its programs, or DATABASE_URL to a database that runs elsewhere',
  },
  chromium: {
    name: 'Chromium',
    present: () =>
      Boolean(process.env.CHROMIUM) ||
      ['chromium-headless-shell', 'chromium', 'chromium-browser', 'google-chrome'].some(onPath),
    packages: ['chromium-headless-shell', 'fonts-liberation'],
    otherwise: 'set CHROMIUM to the path of its program',
  },
  numpy: {
    name: 'numpy for Python 3',
    // Debian's own, so that figures compare between machines: another Python may carry a numpy that sorts otherwise
    present: () => spawnSync('/usr/bin/python3', ['-c', 'import numpy'], { stdio: 'ignore' }).status === 0,
    packages: ['python3-numpy'],
    otherwise: 'install it for /usr/bin/python3',
  },
  scipy: {
    name: 'scipy for Python 3',
    present: () => spawnSync('/usr/bin/python3', ['-c', 'import scipy'], { stdio: 'ignore' }).status === 0,
    packages: ['python3-scipy'],
    otherwise: 'install it for /usr/bin/python3',
  },
};

/**
 * Installs what is missing with apt-get where we are root, and says what to install where we are not.
 * @param {(keyof typeof needs)[]} wanted @param {(line: string) => void} say
 */
export async function ensurePrograms(wanted, say) {
  const missing = wanted.map((key) => needs[key]).filter((need) => !need.present());
  if (missing.length === 0) return;
  const packages = missing.flatMap((need) => need.packages);
  const names = missing.map((need) => need.name).join(' and ');
  if (process.getuid?.() !== 0 || !onPath('apt-get')) {
    const advice = missing.map((need) => `For ${need.name} you may also ${need.otherwise}.`).join('\n');
    throw new Stop(
      `${names} must be installed first. On Debian:\n  sudo apt-get install ${packages.join(' ')}\n${advice}`,
    );
  }
  say(`Installing ${names} (apt-get install ${packages.join(' ')}) …`);
  await apt('update');
  const install = () => apt('install', '--no-install-recommends', ...packages);
  await (packages.includes('postgresql') ? withoutDefaultCluster(install) : install());
  const still = missing.find((need) => !need.present());
  if (still)
    throw new Stop(`${still.name} is still not found after installing ${still.packages.join(' and ')}.`);
}

/** @param {string[]} args */
async function apt(...args) {
  const options = ['-qq', '-y', '-o', 'DPkg::Lock::Timeout=300', '-o', 'Dpkg::Use-Pty=0'];
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive', LC_ALL: 'C.UTF-8' };
  if (args[0] === 'install') await run('dpkg', ['--configure', '-a'], { env, quiet: true }); // after a killed install
  await run('apt-get', [...options, ...args], { env, quiet: true });
}

/**
 * Debian's package makes a cluster of its own that starts by itself on port 5432. We do not want it, so it is told
 * not to while we install; a machine that already has the package keeps its settings.
 * @param {() => Promise<void>} install
 */
async function withoutDefaultCluster(install) {
  const file = '/etc/postgresql-common/createcluster.conf';
  if (existsSync(file)) return install();
  await apt('install', '--no-install-recommends', 'postgresql-common');
  const before = existsSync(file) ? readFileSync(file, 'utf8') : '';
  writeFileSync(file, `${before}\ncreate_main_cluster = false\n`);
  try {
    await install();
  } finally {
    writeFileSync(file, before);
  }
}
