import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { clientSources } from './client.mjs';

let dir: string;
beforeEach(() => {
  dir = mkdtempSync(join(tmpdir(), 'outswell-client-'));
  for (const folder of ['app', 'shared/sky', 'server', 'assets/readme'])
    mkdirSync(join(dir, folder), { recursive: true });
  write('app/index.tsx', 'screen');
  write('shared/sky/frames.ts', 'frames');
});
afterEach(() => rmSync(dir, { recursive: true, force: true }));

const write = (path: string, text: string) => writeFileSync(join(dir, path), text);

function changes(act: () => void): boolean {
  const before = clientSources(dir);
  act();
  return clientSources(dir) !== before;
}

test.each<[string, () => void]>([
  ['a screen changed', () => write('app/index.tsx', 'other')],
  ['shared code changed', () => write('shared/sky/frames.ts', 'other')],
  ['a file was added', () => write('shared/sky/new.ts', '')],
  ['a file went', () => rmSync(join(dir, 'app/index.tsx'))],
  ['packages changed', () => write('package-lock.json', '{}')],
])('the client is built anew when %s', (_, act) => expect(changes(act)).toBe(true));

test.each<[string, () => void]>([
  ['nothing changed', () => {}],
  ['a file was written again as it was', () => write('app/index.tsx', 'screen')],
  ['the server changed', () => write('server/main.ts', 'other')],
  ['a test changed', () => write('shared/sky/frames.test.ts', 'other')],
  ['a picture for README changed', () => write('assets/readme/cube.jpg', 'other')],
])('the client is left as it is when %s', (_, act) => expect(changes(act)).toBe(false));
