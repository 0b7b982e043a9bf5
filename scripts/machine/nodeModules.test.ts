import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { modulesMatchLock } from './nodeModules.mjs';

let dir: string;
beforeEach(() => {
  dir = mkdtempSync(join(tmpdir(), 'outswell-modules-'));
});
afterEach(() => rmSync(dir, { recursive: true, force: true }));

const a = { version: '1.0.0', integrity: 'sha512-a' };
const other = { version: '2.0.0', integrity: 'sha512-o', optional: true };

function matches(locked: object, installed: object | null): boolean {
  mkdirSync(join(dir, 'node_modules'));
  writeFileSync(
    join(dir, 'package-lock.json'),
    JSON.stringify({ packages: { '': { name: 'x' }, ...locked } }),
  );
  if (installed)
    writeFileSync(join(dir, 'node_modules', '.package-lock.json'), JSON.stringify({ packages: installed }));
  return modulesMatchLock(dir);
}

test.each([
  ['the same packages', { 'node_modules/a': a }, { 'node_modules/a': a }, true],
  [
    'an optional package left out',
    { 'node_modules/a': a, 'node_modules/o': other },
    { 'node_modules/a': a },
    true,
  ],
  ['an optional package in another version', { 'node_modules/o': other }, { 'node_modules/o': a }, false],
  ['a package left out', { 'node_modules/a': a }, {}, false],
  ['another version', { 'node_modules/a': a }, { 'node_modules/a': { ...a, version: '1.0.1' } }, false],
  [
    'the same version with other bytes',
    { 'node_modules/a': a },
    { 'node_modules/a': { ...a, integrity: 'x' } },
    false,
  ],
  ['an installation that was killed', { 'node_modules/a': a }, null, false],
])('%s', (_, locked, installed, expected) => {
  expect(matches(locked, installed)).toBe(expected);
});
